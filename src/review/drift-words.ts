/** How far two poses are from each other, in words. */

import { angleBetween } from "../math/quat.js";
import { distance } from "../math/vec3.js";
import type { DriftPose } from "./drift-layers.js";
import { fixed } from "./figures.js";

/** Less than this is none: m, degrees. */
export const UNSEEN_METRES = 5e-5;
export const UNSEEN_DEGREES = 0.05;

export function apartText(before: DriftPose, now: DriftPose): string {
  const far = distance(before.centerOfMass, now.centerOfMass);
  const angle = degreesBetween(before, now);
  const length = far < 1 ? `${Number((far * 1000).toPrecision(2))} mm` : `${fixed(far, 2)} m`;
  const said = [
    ...(far < UNSEEN_METRES ? [] : [`${length} apart`]),
    ...(angle < UNSEEN_DEGREES ? [] : [`turned by ${fixed(angle, 1)}°`]),
  ];
  return said.length > 0 ? said.join(", ") : "as it was";
}

export const degreesBetween = (a: DriftPose, b: DriftPose): number =>
  (angleBetween(a.rotation, b.rotation) * 180) / Math.PI;
