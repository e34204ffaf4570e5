/** Reading vertices and triangles out of arrays of 3 numbers each. */

import { length, type Vec3 } from "../math/vec3.js";

export const vertex = (positions: Float64Array, index: number): Vec3 => [
  positions[3 * index],
  positions[3 * index + 1],
  positions[3 * index + 2],
];

/** m² */
export function triangleArea(positions: Float64Array, triangles: Uint32Array, t: number): number {
  const a = 3 * triangles[3 * t];
  const b = 3 * triangles[3 * t + 1];
  const c = 3 * triangles[3 * t + 2];
  const ux = positions[b] - positions[a];
  const uy = positions[b + 1] - positions[a + 1];
  const uz = positions[b + 2] - positions[a + 2];
  const vx = positions[c] - positions[a];
  const vy = positions[c + 1] - positions[a + 1];
  const vz = positions[c + 2] - positions[a + 2];
  const nx = uy * vz - uz * vy;
  const ny = uz * vx - ux * vz;
  const nz = ux * vy - uy * vx;
  return Math.sqrt(nx * nx + ny * ny + nz * nz) / 2;
}

export interface Box {
  readonly low: readonly number[];
  readonly high: readonly number[];
}

/** Bounding box of a list of vertices. */
export function boxOf(positions: Float64Array): Box {
  let [lowX, lowY, lowZ] = [Infinity, Infinity, Infinity];
  let [highX, highY, highZ] = [-Infinity, -Infinity, -Infinity];
  for (let v = 0; v < positions.length; v += 3) {
    const x = positions[v];
    const y = positions[v + 1];
    const z = positions[v + 2];
    if (x < lowX) lowX = x;
    if (x > highX) highX = x;
    if (y < lowY) lowY = y;
    if (y > highY) highY = y;
    if (z < lowZ) lowZ = z;
    if (z > highZ) highZ = z;
  }
  return { low: [lowX, lowY, lowZ], high: [highX, highY, highZ] };
}

/** Length of a box's diagonal. */
export const diagonal = ({ low, high }: Box): number =>
  length([high[0] - low[0], high[1] - low[1], high[2] - low[2]]);
