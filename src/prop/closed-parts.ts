import { isClosed, type Part, split } from "./split.js";
import { triangleArea } from "./vertex.js";
import { pick, type Triangles, weld } from "./weld.js";

/**
 * The parts that meshes are made of. A part open in its own mesh is joined with what is open in the others (a solid painted
 * with two materials, or split over two nodes). Triangles without an area are passed over, unless more would be open without
 * them (one can lie in a crack between edges of different length).
 *
 * @param meshes each welded; places of several that are to be one must be equal to the last bit
 */
export function findParts(meshes: readonly Triangles[]): { closed: Part[]; open: Part[] } {
  const parts = meshes.flatMap(connectedParts);
  const closed = parts.filter(isClosed);
  const open = parts.filter((part) => !isClosed(part));
  if (new Set(open.map((part) => part.owners[0])).size < 2) return { closed, open };
  const joined = connectedParts(weld(open));
  return {
    closed: [...closed, ...joined.filter(isClosed)],
    open: joined.filter((part) => !isClosed(part)),
  };
}

/** Parts of a welded mesh, with or without its triangles that have no area. */
export function connectedParts(mesh: Triangles): Part[] {
  const slim = withoutSlivers(mesh);
  const parts = split(slim);
  if (slim === mesh || parts.every(isClosed)) return parts;
  const withSlivers = split(mesh);
  return faultyEdges(withSlivers) < faultyEdges(parts) ? withSlivers : parts;
}

/** Edges at which parts are open or face contrary ways. */
export const faultyEdges = (parts: readonly Part[]): number =>
  parts.reduce((sum, part) => sum + part.openEdges + part.contraryEdges, 0);

/** Twice a triangle's area over the square of its longer side at a corner: what rounding makes of three points on a line. */
const SLIVER = 1e-14;

/** The mesh without the triangles whose three corners lie on a line. */
function withoutSlivers(mesh: Triangles): Triangles {
  const { positions, triangles } = mesh;
  const keep = new Uint32Array(mesh.owners.length);
  let count = 0;
  for (let t = 0; t < keep.length; t++) if (!isSliver(positions, triangles, t)) keep[count++] = t;
  return count === keep.length ? mesh : pick(mesh, keep.subarray(0, count));
}

function isSliver(positions: Float64Array, triangles: Uint32Array, t: number): boolean {
  const longer = Math.max(
    squaredSide(positions, triangles, 3 * t, 1),
    squaredSide(positions, triangles, 3 * t, 2),
  );
  return 2 * triangleArea(positions, triangles, t) <= SLIVER * longer;
}

/** From a triangle's first corner, at `first`, to the one `next` after it, squared. */
function squaredSide(positions: Float64Array, triangles: Uint32Array, first: number, next: number): number {
  const a = 3 * triangles[first];
  const b = 3 * triangles[first + next];
  const x = positions[b] - positions[a];
  const y = positions[b + 1] - positions[a + 1];
  const z = positions[b + 2] - positions[a + 2];
  return x * x + y * y + z * z;
}
