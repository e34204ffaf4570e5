import { after, eachEdge } from "./edges.js";
import { Groups } from "./groups.js";
import { pick, type Triangles } from "./weld.js";

/** Triangles that hang together by edges, one vertex at each place. */
export interface Part extends Triangles {
  /** Edges with a triangle on one side only (or any odd number). */
  readonly openEdges: number;
  /** Edges whose triangles do not face the same side of the surface. */
  readonly contraryEdges: number;
  /** Edges at which more than two triangles meet. */
  readonly crowdedEdges: number;
  /** Two vertices an edge: the edges that are run through once more this way than the other. They make closed loops. */
  readonly rim: readonly number[];
}

/** Whether every edge is run through as often one way as the other: the integrals over the inside are well defined. */
export const isClosed = (part: Part): boolean => part.rim.length === 0;

/** The parts of a welded mesh, in the order of their first triangles. */
export function split(mesh: Triangles): Part[] {
  const { triangles, owners } = mesh;
  const group = new Groups(owners.length);
  // Edges that are not plain, as triples: a half edge, uses, balance.
  const odd: number[] = [];
  eachEdge(triangles, mesh.positions.length / 3, (first, link) => {
    let uses = 1;
    let balance = 1;
    for (let h = link[first]; h >= 0; h = link[h]) {
      uses++;
      balance += triangles[h] === triangles[first] ? 1 : -1;
      group.join((first / 3) | 0, (h / 3) | 0);
    }
    if (uses !== 2 || balance !== 0) odd.push(first, uses, balance);
  });
  if (group.size === 1) return [{ ...mesh, ...faultsOf(odd, triangles) }];
  const { firsts, which } = group.members();
  const oddOf = new Map<number, number[]>();
  for (let n = 0; n < odd.length; n += 3) {
    const first = group.first(Math.trunc(odd[n] / 3));
    const list = oddOf.get(first);
    if (list) list.push(odd[n], odd[n + 1], odd[n + 2]);
    else oddOf.set(first, odd.slice(n, n + 3));
  }
  const renumber = renumbering(mesh.positions.length / 3);
  return firsts.map((first, n) => {
    const faults = faultsOf(oddOf.get(first) ?? [], triangles);
    const number = renumber();
    const part = pick(mesh, which[n]);
    return {
      triangles: part.triangles.map(number),
      owners: part.owners,
      ...faults,
      rim: faults.rim.map(number),
      positions: number.places(mesh.positions),
    };
  });
}

function faultsOf(odd: readonly number[], triangles: Uint32Array) {
  const faults = { openEdges: 0, contraryEdges: 0, crowdedEdges: 0, rim: [] as number[] };
  for (let n = 0; n < odd.length; n += 3) {
    const [first, uses, balance] = [odd[n], odd[n + 1], odd[n + 2]];
    if (uses > 2) faults.crowdedEdges++;
    if (uses % 2 === 1) faults.openEdges++;
    else if (balance !== 0) faults.contraryEdges++;
    const [from, to] = [triangles[first], triangles[after(first)]];
    for (let k = 0; k < Math.abs(balance); k++) faults.rim.push(...(balance > 0 ? [from, to] : [to, from]));
  }
  return faults;
}

/** Numbers for the vertices of one part after another, so that each has a list of its own. */
function renumbering(vertexCount: number) {
  const usedBy = new Int32Array(vertexCount).fill(-1);
  const numbers = new Uint32Array(vertexCount);
  let part = -1;
  return () => {
    part++;
    const vertices: number[] = [];
    const number = (v: number): number => {
      if (usedBy[v] !== part) {
        usedBy[v] = part;
        numbers[v] = vertices.length;
        vertices.push(v);
      }
      return numbers[v];
    };
    const places = (positions: Float64Array): Float64Array => {
      const own = new Float64Array(3 * vertices.length);
      vertices.forEach((v, n) => {
        for (let i = 0; i < 3; i++) own[3 * n + i] = positions[3 * v + i];
      });
      return own;
    };
    return Object.assign(number, { places });
  };
}
