import type { Surface } from "../gltf/surfaces.js";

/**
 * The points that can touch first or reach furthest: every distinct vertex that a triangle uses, 3 numbers a point, in
 * the order in which they first come.
 */
export function extremePoints(surfaces: readonly Pick<Surface, "positions" | "triangles">[]): Float64Array {
  const seen = new Set<string>();
  const points: number[] = [];
  for (const { positions, triangles } of surfaces) {
    for (const vertex of triangles) {
      const [x, y, z] = positions.subarray(3 * vertex, 3 * vertex + 3);
      const key = `${x},${y},${z}`;
      if (seen.has(key)) continue;
      seen.add(key);
      points.push(x, y, z);
    }
  }
  return Float64Array.from(points);
}
