/** Directions and orientations drawn evenly. `next` gives even numbers from 0 to 1. */

import { cos, sin } from "../math/elementary.js";
import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";

const TURN = 2 * Math.PI;

/** A unit vector, even over the sphere (Archimedes: equal heights cut off equal areas); two numbers. */
export function evenDirection(next: () => number): Vec3 {
  const height = 2 * next() - 1;
  const angle = TURN * next();
  const radius = Math.sqrt((1 - height) * (1 + height));
  return [radius * cos(angle), radius * sin(angle), height];
}

/** A rotation, even over all of them (Shoemake, Uniform Random Rotations, Graphics Gems III, 1992, III.6); three numbers. */
export function evenOrientation(next: () => number): Quat {
  const share = next();
  const first = TURN * next();
  const second = TURN * next();
  const small = Math.sqrt(1 - share);
  const large = Math.sqrt(share);
  return [small * sin(first), small * cos(first), large * sin(second), large * cos(second)];
}
