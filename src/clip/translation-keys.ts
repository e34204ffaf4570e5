import type { NodePath } from "./node-path.js";

/** Translation keys on the times of a motion's grid. */
export interface TranslationKeys {
  /** Grid index of each key. */
  indices: number[];
  interpolation: "LINEAR" | "CUBICSPLINE";
  /** As stored. */
  values: Float32Array;
  /** Greatest displacement of any point, by both channels together, at or between the times compared, apart from the motion's own surcharge, m. */
  error: number;
}

/** Of the times compared the first that is later than `t`. */
export function firstAfter({ times, count }: NodePath, t: number): number {
  let low = 0;
  for (let high = count; low < high; ) {
    const middle = (low + high) >> 1;
    if (times[middle] <= t) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Of the times compared the last that is earlier than `t`. */
export function lastBefore({ times, count }: NodePath, t: number): number {
  let low = 0;
  for (let high = count; low < high; ) {
    const middle = (low + high) >> 1;
    if (times[middle] < t) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}
