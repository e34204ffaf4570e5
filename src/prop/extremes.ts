import { Places } from "./places.js";
import type { Triangles } from "./weld.js";

/** The points that can touch first or reach furthest: every vertex of welded meshes, each place once, 3 numbers a point. */
export function extremePoints(meshes: readonly Pick<Triangles, "positions">[]): Float64Array {
  if (meshes.length === 1) return meshes[0].positions;
  const places = new Places(meshes.reduce((sum, { positions }) => sum + positions.length / 3, 0));
  for (const { positions } of meshes) places.numbers(positions);
  return places.positions;
}
