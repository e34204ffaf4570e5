/** How unlike two candidates are, by what was drawn for them. */

import { atan2 } from "../math/elementary.js";
import { angleBetween, type Quat } from "../math/quat.js";
import { cross, dot, length, type Vec3 } from "../math/vec3.js";

/** One thing drawn, as it is compared. */
export type Feature =
  /** Share of the chance that lies below the number, 0 to 1. */
  | { kind: "quantile"; value: number }
  | { kind: "word"; value: string }
  /** A unit vector. */
  | { kind: "direction"; value: Vec3 }
  /** A side round an axis, in turns. */
  | { kind: "phase"; value: number }
  | { kind: "orientation"; value: Quat };

/** By key path. */
export type Features = ReadonlyMap<string, Feature>;

/**
 * Euclidean: the root of the sum of squares over everything drawn for both, each between 0 and 1. Numbers count by their quantiles, words by
 * being the same or not, sides and orientations by the angle between them over π. What was drawn for one alone (within a choice that fell
 * otherwise) counts for nothing: the choice itself does.
 */
export function drawDistance(a: Features, b: Features): number {
  let sum = 0;
  for (const [key, feature] of a) {
    const other = b.get(key);
    if (!other) continue;
    const d = difference(feature, other);
    sum += d * d;
  }
  return Math.sqrt(sum);
}

function difference(a: Feature, b: Feature): number {
  if (a.kind === "quantile" && b.kind === "quantile") return Math.abs(a.value - b.value);
  if (a.kind === "word" && b.kind === "word") return a.value === b.value ? 0 : 1;
  if (a.kind === "direction" && b.kind === "direction")
    return atan2(length(cross(a.value, b.value)), dot(a.value, b.value)) / Math.PI;
  if (a.kind === "phase" && b.kind === "phase") {
    const turn = Math.abs(a.value - b.value);
    return 2 * Math.min(turn, 1 - turn);
  }
  if (a.kind === "orientation" && b.kind === "orientation") return angleBetween(a.value, b.value) / Math.PI;
  return 1;
}
