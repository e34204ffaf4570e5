/** The orientation in which directions of the prop lie along directions of the world. */

import { type Mat3, multiply, transpose } from "../math/mat3.js";
import { between, fromMatrix, multiply as multiplyQuat, type Quat } from "../math/quat.js";
import { addScaled, cross, dot, length, negate, normalize, perpendicular, type Vec3 } from "../math/vec3.js";
import { UP } from "./world-directions.js";

/** A direction of the prop (model frame) and the direction of the world it lies along, both unit vectors. */
export interface DirectionPair {
  prop: Vec3;
  world: Vec3;
}

/** Below this sine two directions count as one, and a second pair decides nothing. */
const PARALLEL_SINE = 1e-9;

/**
 * The rotation from the modelled pose (model frame → world) that lays the first pair's directions upon each other exactly and the second's
 * as nearly as the first leaves free (the TRIAD construction: Black, AIAA Journal 2, 1350, 1964). With one pair, the smallest turn that
 * does it; where any half turn would, the one about the axis nearest the world's up.
 */
export function facingRotation(first: DirectionPair, second?: DirectionPair): Quat {
  if (second) {
    const propNormal = cross(first.prop, second.prop);
    const worldNormal = cross(first.world, second.world);
    if (length(propNormal) > PARALLEL_SINE && length(worldNormal) > PARALLEL_SINE)
      return fromMatrix(multiply(transpose(frame(first.world, worldNormal)), frame(first.prop, propNormal)));
  }
  if (1 + dot(first.prop, first.world) > 1e-14) return between(first.prop, first.world);
  const square = addScaled(UP, first.prop, -dot(UP, first.prop));
  const axis = length(square) > PARALLEL_SINE ? normalize(square) : perpendicular(first.prop);
  // half a turn about it, and what is left to the world's direction where the two are only nearly opposite
  return multiplyQuat(between(negate(first.prop), first.world), [axis[0], axis[1], axis[2], 0]);
}

/** Rows: the unit vector, the one square to it and to the normal, the unit normal. */
function frame(along: Vec3, normal: Vec3): Mat3 {
  // the product of two almost parallel vectors is short, and as much of it as is rounding leans along them
  const n = normalize(addScaled(normal, along, -dot(normal, along)));
  return [along, cross(n, along), n];
}
