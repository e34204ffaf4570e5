import { RequestError } from "../math/request-error.js";
import { extremePoints } from "./extremes.js";
import { convexHull } from "./hull.js";
import { type MassProperties, scaleDensity } from "./mass.js";
import type { Substance } from "./mass-of-parts.js";
import type { Notes } from "./notes.js";
import { solidIntegrals } from "./solid.js";
import { triangleArea } from "./vertex.js";
import type { Triangles } from "./weld.js";

/**
 * The convex hull of all meshes as one solid, of the density that has the greatest area.
 *
 * @param substances by surface, as `owners` of the meshes count them
 * @throws RequestError at ["model"] where all lies in one plane
 */
export function massOfHull(
  meshes: readonly Triangles[],
  substances: readonly Substance[],
  notes: Notes,
): MassProperties {
  const points = extremePoints(meshes);
  const hull = convexHull(points);
  if (!hull)
    throw new RequestError(
      ["model"],
      "is flat: its convex hull encloses nothing",
      "state solid: surface (and wall, m): then it is a thin surface",
    );
  const areas = new Map<number, number>();
  for (const { positions, triangles, owners } of meshes)
    owners.forEach((owner, t) => {
      const { density } = substances[owner];
      areas.set(density, (areas.get(density) ?? 0) + triangleArea(positions, triangles, t));
    });
  const [[density]] = [...areas].sort(([, a], [, b]) => b - a);
  if (areas.size > 1) notes.add(`${density} kg/m³`, MIXED);
  return scaleDensity(solidIntegrals(points, hull.triangles), density);
}

const MIXED = () =>
  "the hull is of several densities: weighed as that of the greatest area throughout; state one density, or mass";
