/** Reading vertices out of arrays of 3 numbers each. */

import type { Vec3 } from "../math/vec3.js";

export const vertex = (positions: Float64Array, index: number): Vec3 => [
  positions[3 * index],
  positions[3 * index + 1],
  positions[3 * index + 2],
];

/** The same text for the same place, to the last bit; 0 and −0 are one. */
export const placeKey = (positions: Float64Array, index: number): string =>
  `${positions[3 * index]},${positions[3 * index + 1]},${positions[3 * index + 2]}`;
