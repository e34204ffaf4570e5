/** Reading vertices and triangles out of arrays of 3 numbers each. */

import { cross, length, subtract, type Vec3 } from "../math/vec3.js";

export const vertex = (positions: Float64Array, index: number): Vec3 => [
  positions[3 * index],
  positions[3 * index + 1],
  positions[3 * index + 2],
];

/** m² */
export function triangleArea(positions: Float64Array, triangles: Uint32Array, t: number): number {
  const a = vertex(positions, triangles[3 * t]);
  const b = vertex(positions, triangles[3 * t + 1]);
  const c = vertex(positions, triangles[3 * t + 2]);
  return length(cross(subtract(b, a), subtract(c, a))) / 2;
}

export interface Box {
  readonly low: readonly number[];
  readonly high: readonly number[];
}

/** Bounding box of the vertices that `triangles` use; of a point list without. */
export function boxOf(positions: Float64Array, triangles?: Uint32Array): Box {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  const count = triangles ? triangles.length : positions.length / 3;
  for (let n = 0; n < count; n++) {
    const at = 3 * (triangles ? triangles[n] : n);
    for (let i = 0; i < 3; i++) {
      const value = positions[at + i];
      if (value < low[i]) low[i] = value;
      if (value > high[i]) high[i] = value;
    }
  }
  return { low, high };
}

/** Length of a box's diagonal. */
export const diagonal = ({ low, high }: Box): number =>
  length([high[0] - low[0], high[1] - low[1], high[2] - low[2]]);
