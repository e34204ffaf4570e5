import type { SampledMotion } from "./sampled-motion.js";
import type { Values } from "./track.js";

/** Rotation keys on the times of a motion's grid, and what a player makes of them. */
export interface RotationKeys {
  /** Grid index of each key. */
  indices: number[];
  interpolation: "LINEAR" | "CUBICSPLINE";
  /** As stored. */
  values: Values;
  /** The played rotation of the segment between keys `segment` and `segment` + 1: a function of time, s, to a unit quaternion. */
  played(segment: number): (t: number, out: Float64Array) => void;
  /** What each segment's own bend can add to a displacement between the times compared, m. */
  surcharges: number[];
}

/**
 * Square of the chord |q − q′| between unit quaternions at which the points at distance `reach` from the axis of the rotation
 * between them are `limit` m apart: 2·reach·sin(θ/2) = limit, |q − q′| = 2 sin(θ/4). Negative where `limit` is.
 */
export function squaredChordAt(limit: number, reach: number): number {
  if (limit < 0) return -1;
  const s = limit / (2 * reach);
  // Also where the reach is 0: any rotation will do.
  if (!(s < 1)) return Number.POSITIVE_INFINITY;
  return (2 * s * s) / (1 + Math.sqrt(1 - s * s));
}

/** Square of the chord between two quaternions. */
export function squaredChord(a: Float64Array, aOffset: number, b: Float64Array, bOffset: number): number {
  let sum = 0;
  for (let i = 0; i < 4; i++) {
    const d = a[aOffset + i] - b[bOffset + i];
    sum += d * d;
  }
  return sum;
}

/** The samples strictly between two times of the grid. */
export function samplesBetween(
  { stride, last, samples }: SampledMotion,
  a: number,
  b: number,
): { low: number; high: number } {
  return { low: Math.floor(a / stride) + 1, high: b === last ? samples - 2 : Math.ceil(b / stride) - 1 };
}
