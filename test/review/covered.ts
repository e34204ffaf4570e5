/** Silhouettes by brute force: whether each point of a fine grid lies in any triangle, and in how many rings. */

import type { Surface } from "../../src/gltf/surfaces.js";
import { type Quat, rotate } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";

export interface Grid {
  /** Points a side; the grid's middle is the picture's origin. */
  readonly points: number;
  /** Between points, m. */
  readonly step: number;
}

const at = ({ points, step }: Grid, i: number) => (i - points / 2 + 0.5) * step;

/** 1 for each point that a triangle covers. */
export function coveredByTriangles(
  surfaces: readonly Surface[],
  scale: number,
  centre: Vec3,
  rotation: Quat,
  grid: Grid,
): Uint8Array {
  const covered = new Uint8Array(grid.points * grid.points);
  for (const { positions, triangles } of surfaces) {
    const corner = (v: number) =>
      rotate(rotation, [0, 1, 2].map((k) => positions[3 * v + k] * scale - centre[k]) as unknown as Vec3);
    const flat: Vec3[] = Array.from({ length: positions.length / 3 }, (_, v) => corner(v));
    for (let t = 0; t < triangles.length; t += 3)
      cover(covered, grid, [flat[triangles[t]], flat[triangles[t + 1]], flat[triangles[t + 2]]]);
  }
  return covered;
}

function cover(covered: Uint8Array, grid: Grid, corners: Vec3[]): void {
  const index = (value: number) => value / grid.step + grid.points / 2 - 0.5;
  const range = (k: 0 | 1) => [
    Math.max(0, Math.ceil(index(Math.min(...corners.map((c) => c[k]))))),
    Math.min(grid.points - 1, Math.floor(index(Math.max(...corners.map((c) => c[k]))))),
  ];
  const [[fromX, toX], [fromY, toY]] = [range(0), range(1)];
  for (let j = fromY; j <= toY; j++)
    for (let i = fromX; i <= toX; i++) {
      const [x, y] = [at(grid, i), at(grid, j)];
      const sides = corners.map((c, k) => {
        const d = corners[(k + 1) % 3];
        return (d[0] - c[0]) * (y - c[1]) - (d[1] - c[1]) * (x - c[0]);
      });
      if (sides.every((side) => side >= 0) || sides.every((side) => side <= 0))
        covered[j * grid.points + i] = 1;
    }
}

/** 1 for each point that lies in an odd number of rings. */
export function coveredByRings(rings: readonly ArrayLike<number>[], grid: Grid): Uint8Array {
  const covered = new Uint8Array(grid.points * grid.points);
  for (let j = 0; j < grid.points; j++) {
    const y = at(grid, j);
    const crossings: number[] = [];
    for (const ring of rings)
      for (let a = 0; a < ring.length; a += 2) {
        const b = (a + 2) % ring.length;
        if (ring[a + 1] > y === ring[b + 1] > y) continue;
        crossings.push(ring[a] + ((y - ring[a + 1]) / (ring[b + 1] - ring[a + 1])) * (ring[b] - ring[a]));
      }
    for (let i = 0; i < grid.points; i++)
      covered[j * grid.points + i] = crossings.filter((x) => x < at(grid, i)).length % 2;
  }
  return covered;
}

/** Intersection over union. */
export function overlap(a: Uint8Array, b: Uint8Array): number {
  let both = 0;
  let either = 0;
  a.forEach((value, i) => {
    both += value & b[i];
    either += value | b[i];
  });
  return both / either;
}

/** Whether some point no more than so many steps from the point `i` has that value. */
export function within(
  covered: Uint8Array,
  { points }: Grid,
  i: number,
  steps: number,
  value: number,
): boolean {
  const column = i % points;
  const row = (i - column) / points;
  for (let dy = -steps; dy <= steps; dy++)
    for (let dx = -steps; dx <= steps; dx++) {
      const [x, y] = [column + dx, row + dy];
      if (dx * dx + dy * dy > steps * steps || x < 0 || y < 0 || x >= points || y >= points) continue;
      if (covered[y * points + x] === value) return true;
    }
  return false;
}
