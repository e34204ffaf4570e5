/** When a take counts as missing, and how that is told. */

import type { Measured } from "./measures.js";
import { angle, metres } from "./words.js";

/** As `tossbake bake` tells it: further from the mark than this, in m or rad. */
const METRES = 1e-4;
const RADIANS = (0.01 * Math.PI) / 180;

/** "its mark by 23 mm and its pose by 4.0°"; undefined for a take that does what was asked. */
export function missedWords({ miss, missAngle }: Pick<Measured, "miss" | "missAngle">): string | undefined {
  const ways = [
    ...(miss !== null && miss > METRES ? [`its mark by ${metres(miss)}`] : []),
    ...(missAngle !== null && missAngle > RADIANS ? [`its pose by ${angle(missAngle)}`] : []),
  ];
  return ways.length > 0 ? ways.join(" and ") : undefined;
}
