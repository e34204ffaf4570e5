import { type MassProperties, scaleDensity } from "./mass.js";
import type { Substance } from "./mass-of-parts.js";
import { sheetIntegrals } from "./sheet.js";
import { pick, type Triangles } from "./weld.js";

/** Thin surfaces, and how much of them counts: half, where both sides of one surface are there. */
export interface Walls {
  readonly mesh: Triangles;
  readonly share: number;
}

/** Bodies of thin surfaces, one for each mesh and surface with an area: mass = density × wall × area, inertia of the surface. `wall` in m. */
export function massOfWalls(
  walls: readonly Walls[],
  substances: readonly Substance[],
  wall: number,
): MassProperties[] {
  return walls
    .flatMap(({ mesh, share }) =>
      byOwner(mesh).map(({ positions, triangles, owners }) =>
        scaleDensity(sheetIntegrals(positions, triangles), substances[owners[0]].density * wall * share),
      ),
    )
    .filter(({ mass }) => mass > 0);
}

function byOwner(mesh: Triangles): Triangles[] {
  const groups = new Map<number, number[]>();
  mesh.owners.forEach((owner, t) => {
    const group = groups.get(owner);
    if (group) group.push(t);
    else groups.set(owner, [t]);
  });
  return groups.size === 1 ? [mesh] : Array.from(groups.values(), (which) => pick(mesh, which));
}
