import { isClosed, type Part, split } from "./split.js";
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
  const longer = Math.max(ux * ux + uy * uy + uz * uz, vx * vx + vy * vy + vz * vz);
  return nx * nx + ny * ny + nz * nz <= SLIVER * SLIVER * longer * longer;
}
