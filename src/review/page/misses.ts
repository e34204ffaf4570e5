/** When a take counts as missing, and how that is told. */

import { MISS_METRES, MISS_RADIANS } from "../../record/throw-summary.js";
import type { Measured } from "./measures.js";
import { angle, metres } from "./words.js";

/** "its mark by 23 mm and its pose by 4.0°"; undefined for a take that does what was asked. */
export function missedWords({ miss, missAngle }: Pick<Measured, "miss" | "missAngle">): string | undefined {
  const ways = [
    ...(miss !== null && miss > MISS_METRES ? [`its mark by ${metres(miss)}`] : []),
    ...(missAngle !== null && missAngle > MISS_RADIANS ? [`its pose by ${angle(missAngle)}`] : []),
  ];
  return ways.length > 0 ? ways.join(" and ") : undefined;
}
