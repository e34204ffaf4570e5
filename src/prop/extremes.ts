import type { Surface } from "../gltf/surfaces.js";
import { Places } from "./places.js";

/** The points that can touch first or reach furthest: every vertex, each place once, 3 numbers a point. */
export function extremePoints(surfaces: readonly Pick<Surface, "positions">[]): Float64Array {
  const places = new Places(surfaces.reduce((sum, { positions }) => sum + positions.length / 3, 0));
  for (const { positions } of surfaces)
    for (let index = 0; index < positions.length / 3; index++) places.number(positions, index);
  return places.positions;
}
