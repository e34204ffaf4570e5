import { withoutDoubles } from "./doubles.js";
import { isInside } from "./inside.js";
import { type Part, split } from "./split.js";
import { vertex } from "./vertex.js";
import type { Triangles } from "./weld.js";

/**
 * A closed part without its two-sided faces: these bound nothing, but would weigh nothing as part of a solid. One layer of
 * each piece of them is a thin surface, unless it lies within the solid that is left. `repeats`: faces left out for being there
 * already, looking the same way.
 */
export function withoutLayers(part: Part): { solids: Part[]; layers: Triangles[]; repeats: number } {
  // Two-sided faces meet four at an edge, but for a single triangle.
  const found = part.crowdedEdges > 0 || part.owners.length === 2 ? withoutDoubles(part) : undefined;
  if (!found) return { solids: [part], layers: [], repeats: 0 };
  const solids = found.single.owners.length > 0 ? split(found.single) : [];
  const layers = split(found.sheets).filter(
    (layer) => !solids.some((solid) => isInside(middleOf(layer), solid.positions, solid.triangles)),
  );
  const repeats = part.owners.length - found.single.owners.length - 2 * found.sheets.owners.length;
  return { solids, layers, repeats };
}

/** The middle of the first triangle. */
function middleOf({ positions, triangles }: Triangles) {
  const [a, b, c] = [0, 1, 2].map((k) => vertex(positions, triangles[k]));
  return [(a[0] + b[0] + c[0]) / 3, (a[1] + b[1] + c[1]) / 3, (a[2] + b[2] + c[2]) / 3] as const;
}
