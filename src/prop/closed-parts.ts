import type { Surface } from "../gltf/surfaces.js";

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
 * (a solid painted with two materials, or split over two nodes). Triangles without an area are passed over, unless it
 * takes them to close a part (one that lies in a crack between edges of different length).
 *
 * @param surfaces in the order in which `owners` count them; places that are to be one must be equal to the last bit
 */
export function findParts(surfaces: readonly Pick<Surface, "positions" | "triangles">[]): {
  closed: Part[];
  open: Part[];
} {
  const closed: Part[] = [];
  let left: Triangles[] = [];
  surfaces.forEach((surface, owner) => {
    const whole = { ...surface, owners: new Uint32Array(surface.triangles.length / 3).fill(owner) };
    const parts = connectedParts(weld([whole]));
    closed.push(...parts.filter(isClosed));
    left.push(...parts.filter((part) => !isClosed(part)));
  });
  if (new Set(left.map((part) => part.owners[0])).size > 1) {
    const parts = connectedParts(weld(left));
    closed.push(...parts.filter(isClosed));
    left = parts.filter((part) => !isClosed(part));
  }
  return { closed, open: left as Part[] };
}

type Triangles = Pick<Part, "positions" | "triangles" | "owners">;

const isClosed = (part: Part) => part.openEdges === 0 && part.contraryEdges === 0;

/** One mesh of all, one vertex at each place, without triangles of which two corners fall together. */
function weld(meshes: readonly Triangles[]): Triangles {
  const indexOf = new Map<string, number>();
  const positions: number[] = [];
  const triangles: number[] = [];
  const owners: number[] = [];
  for (const mesh of meshes) {
    const corners = Uint32Array.from(mesh.triangles, (vertex) => {
      const [x, y, z] = mesh.positions.subarray(3 * vertex, 3 * vertex + 3);
      const key = `${x},${y},${z}`; // −0 and 0 give the same text
      let index = indexOf.get(key);
      if (index === undefined) {
        index = indexOf.size;
        indexOf.set(key, index);
        positions.push(x, y, z);
      }
      return index;
    });
    for (let t = 0; t < corners.length; t += 3) {
      const [a, b, c] = corners.subarray(t, t + 3);
      if (a === b || b === c || c === a) continue;
      triangles.push(a, b, c);
      owners.push(mesh.owners[t / 3]);
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
  if (slim.triangles.length === mesh.triangles.length || parts.every(isClosed)) return parts;
  const withSlivers = split(mesh);
  return withSlivers.every(isClosed) ? withSlivers : parts;
}

/** The mesh without the triangles whose three corners lie on a line. */
function withoutSlivers(mesh: Triangles): Triangles {
  const keep = Array.from(mesh.owners.keys()).filter((t) => !isSliver(mesh, t));
  return keep.length === mesh.owners.length ? mesh : pick(mesh, keep);
}

const pick = (mesh: Triangles, which: readonly number[]): Triangles => ({
  positions: mesh.positions,
  triangles: Uint32Array.from(which.flatMap((t) => [...mesh.triangles.subarray(3 * t, 3 * t + 3)])),
  owners: Uint32Array.from(which, (t) => mesh.owners[t]),
});

function isSliver({ positions, triangles }: Triangles, t: number): boolean {
  const [a, b, c] = triangles.subarray(3 * t, 3 * t + 3);
  const edge = (from: number, to: number, i: number) => positions[3 * to + i] - positions[3 * from + i];
  const u = [edge(a, b, 0), edge(a, b, 1), edge(a, b, 2)];
  const v = [edge(a, c, 0), edge(a, c, 1), edge(a, c, 2)];
  const n = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
  const square = (w: number[]) => w[0] * w[0] + w[1] * w[1] + w[2] * w[2];
  return Math.sqrt(square(n)) <= 1e-14 * Math.max(square(u), square(v));
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
      const [low, high] = [root(t), root(edge.triangle)].sort((a, b) => a - b);
      group[high] = low;
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
