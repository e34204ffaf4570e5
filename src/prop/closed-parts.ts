import type { Surface } from "../gltf/surfaces.js";
import { cross, dot, length, subtract } from "../math/vec3.js";
import { placeKey, vertex } from "./vertex.js";

/** Triangles that hang together by edges, vertices at the same place made one. */
export interface Part {
  /** 3 numbers a vertex, m. */
  readonly positions: Float64Array;
  /** 3 indices a triangle. */
  readonly triangles: Uint32Array;
  /** Per triangle: index of the surface it comes from. */
  readonly owners: Uint32Array;
  /** Edges with a triangle on one side only (or any odd number). */
  readonly openEdges: number;
  /** Edges whose triangles do not face the same side of the surface. */
  readonly contraryEdges: number;
}

/**
 * The parts that surfaces are made of. A part is closed when every edge is run through as often one way as the other: then
 * the integrals over its inside are well defined. A part open in its own surface is joined with what is open in the others
 * (a solid painted with two materials, or split over two nodes). Triangles without an area are passed over, unless
 * more would be open without them (one can lie in a crack between edges of different length).
 *
 * @param surfaces in the order in which `owners` count them; places that are to be one must be equal to the last bit
 */
export function findParts(surfaces: readonly Pick<Surface, "positions" | "triangles">[]): {
  closed: Part[];
  open: Part[];
} {
  const parts = surfaces.flatMap((surface, owner) =>
    connectedParts(weld([{ ...surface, owners: new Uint32Array(surface.triangles.length / 3).fill(owner) }])),
  );
  const closed = parts.filter(isClosed);
  const open = parts.filter((part) => !isClosed(part));
  if (new Set(open.map((part) => part.owners[0])).size < 2) return { closed, open };
  const joined = connectedParts(weld(open));
  return {
    closed: [...closed, ...joined.filter(isClosed)],
    open: joined.filter((part) => !isClosed(part)),
  };
}

/** Twice a triangle's area over the square of its longer side at a corner: what rounding makes of three points on a line. */
const SLIVER = 1e-14;

type Triangles = Pick<Part, "positions" | "triangles" | "owners">;

const isClosed = (part: Part) => part.openEdges === 0 && part.contraryEdges === 0;

/** One mesh of all, one vertex at each place, without triangles of which two corners fall together. */
function weld(meshes: readonly Triangles[]): Triangles {
  const indexOf = new Map<string, number>();
  const positions: number[] = [];
  const triangles: number[] = [];
  const owners: number[] = [];
  for (const mesh of meshes) {
    const known = new Map<number, number>();
    const welded = (index: number): number => {
      const before = known.get(index);
      if (before !== undefined) return before;
      const key = placeKey(mesh.positions, index);
      let at = indexOf.get(key);
      if (at === undefined) {
        at = indexOf.size;
        indexOf.set(key, at);
        positions.push(...vertex(mesh.positions, index));
      }
      known.set(index, at);
      return at;
    };
    for (let t = 0; t < mesh.owners.length; t++) {
      const a = welded(mesh.triangles[3 * t]);
      const b = welded(mesh.triangles[3 * t + 1]);
      const c = welded(mesh.triangles[3 * t + 2]);
      if (a === b || b === c || c === a) continue;
      triangles.push(a, b, c);
      owners.push(mesh.owners[t]);
    }
  }
  return {
    positions: Float64Array.from(positions),
    triangles: Uint32Array.from(triangles),
    owners: Uint32Array.from(owners),
  };
}

function connectedParts(mesh: Triangles): Part[] {
  const slim = withoutSlivers(mesh);
  const parts = split(slim);
  if (slim === mesh || parts.every(isClosed)) return parts;
  const withSlivers = split(mesh);
  return faultyEdges(withSlivers) < faultyEdges(parts) ? withSlivers : parts;
}

const faultyEdges = (parts: readonly Part[]) =>
  parts.reduce((sum, part) => sum + part.openEdges + part.contraryEdges, 0);

/** The mesh without the triangles whose three corners lie on a line. */
function withoutSlivers(mesh: Triangles): Triangles {
  const keep = Array.from(mesh.owners.keys()).filter((t) => !isSliver(mesh, t));
  return keep.length === mesh.owners.length ? mesh : pick(mesh, keep);
}

function pick(mesh: Triangles, which: readonly number[]): Triangles {
  const triangles = new Uint32Array(3 * which.length);
  which.forEach((t, i) => {
    triangles.set(mesh.triangles.subarray(3 * t, 3 * t + 3), 3 * i);
  });
  return { positions: mesh.positions, triangles, owners: Uint32Array.from(which, (t) => mesh.owners[t]) };
}

function isSliver({ positions, triangles }: Triangles, t: number): boolean {
  const a = vertex(positions, triangles[3 * t]);
  const u = subtract(vertex(positions, triangles[3 * t + 1]), a);
  const v = subtract(vertex(positions, triangles[3 * t + 2]), a);
  return length(cross(u, v)) <= SLIVER * Math.max(dot(u, u), dot(v, v));
}

interface Edge {
  triangle: number;
  uses: number;
  /** Uses from the lower to the higher vertex less uses the other way. */
  balance: number;
}

function split(mesh: Triangles): Part[] {
  const { triangles, owners } = mesh;
  const vertices = mesh.positions.length / 3;
  const edges = new Map<number, Edge>();
  const group = Uint32Array.from(owners.keys());
  const root = (t: number) => {
    while (group[t] !== t) {
      group[t] = group[group[t]];
      t = group[t];
    }
    return t;
  };
  for (let corner = 0; corner < triangles.length; corner++) {
    const t = Math.floor(corner / 3);
    const from = triangles[corner];
    const to = triangles[corner % 3 === 2 ? corner - 2 : corner + 1];
    const key = Math.min(from, to) * vertices + Math.max(from, to);
    const edge = edges.get(key);
    if (edge) {
      edge.uses++;
      edge.balance += from < to ? 1 : -1;
      // The lower number is the root, so that parts come in the order of their first triangle.
      const a = root(t);
      const b = root(edge.triangle);
      group[Math.max(a, b)] = Math.min(a, b);
    } else edges.set(key, { triangle: t, uses: 1, balance: from < to ? 1 : -1 });
  }
  const members = new Map<number, { triangles: number[]; openEdges: number; contraryEdges: number }>();
  for (let t = 0; t < owners.length; t++) {
    const part = members.get(root(t));
    if (part) part.triangles.push(t);
    else members.set(root(t), { triangles: [t], openEdges: 0, contraryEdges: 0 });
  }
  for (const edge of edges.values()) {
    if (edge.balance === 0) continue;
    const part = members.get(root(edge.triangle))!;
    if (edge.uses % 2 === 1) part.openEdges++;
    else part.contraryEdges++;
  }
  return Array.from(members.values(), (part) => ({
    ...pick(mesh, part.triangles),
    openEdges: part.openEdges,
    contraryEdges: part.contraryEdges,
  }));
}
