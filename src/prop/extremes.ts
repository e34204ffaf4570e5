import type { Surface } from "../gltf/surfaces.js";
import { placeKey, vertex } from "./vertex.js";

/** The points that can touch first or reach furthest: every vertex, each place once, 3 numbers a point. */
export function extremePoints(surfaces: readonly Pick<Surface, "positions">[]): Float64Array {
  const seen = new Set<string>();
  const points: number[] = [];
  for (const { positions } of surfaces)
    for (let index = 0; index < positions.length / 3; index++) {
      const key = placeKey(positions, index);
      if (seen.has(key)) continue;
      seen.add(key);
      points.push(...vertex(positions, index));
    }
  return Float64Array.from(points);
}
