import { after, eachEdge } from "./edges.js";
import { type Triangles, weld } from "./weld.js";

/**
 * The mesh with the vertices of open edges moved together where they lie within `tolerance` of one another and are not the
 * ends of one edge (what is thin stays so): each goes to the nearest of those that stay, so none goes further than the tolerance.
 */
export function nearWeld(mesh: Triangles, tolerance: number): Triangles {
  const { positions } = mesh;
  const { rim, isEdge } = rimOf(mesh);
  const moved = positions.slice();
  // Cells of the tolerance's size: what is near lies in the same or a neighbouring one.
  const cells = new Map<string, number[]>();
  const cellOf = (v: number, i: number) => Math.floor(positions[3 * v + i] / tolerance);
  for (const v of rim) {
    const [x, y, z] = [cellOf(v, 0), cellOf(v, 1), cellOf(v, 2)];
    const near = nearestOf(positions, v, around(cells, x, y, z), tolerance);
    if (near !== undefined && !isEdge(v, near)) {
      moved.set(positions.subarray(3 * near, 3 * near + 3), 3 * v);
      continue;
    }
    const key = `${x},${y},${z}`;
    const cell = cells.get(key);
    if (cell) cell.push(v);
    else cells.set(key, [v]);
  }
  return weld([{ ...mesh, positions: moved }]);
}

/** The vertices of edges that are not closed, ascending, and which two of them an edge joins. */
function rimOf({ triangles, positions }: Triangles) {
  const count = positions.length / 3;
  const onRim = new Uint8Array(count);
  eachEdge(triangles, count, (first, link) => {
    let balance = 0;
    for (let h = first; h >= 0; h = link[h]) balance += triangles[h] === triangles[first] ? 1 : -1;
    if (balance !== 0) onRim[triangles[first]] = onRim[triangles[after(first)]] = 1;
  });
  const keyOf = (a: number, b: number) => Math.min(a, b) * count + Math.max(a, b);
  const edges = new Set<number>();
  for (let h = 0; h < triangles.length; h++) {
    const [from, to] = [triangles[h], triangles[after(h)]];
    if (onRim[from] && onRim[to]) edges.add(keyOf(from, to));
  }
  const rim: number[] = [];
  for (let v = 0; v < count; v++) if (onRim[v]) rim.push(v);
  return { rim, isEdge: (a: number, b: number) => edges.has(keyOf(a, b)) };
}

function* around(cells: Map<string, number[]>, x: number, y: number, z: number): Generator<number> {
  for (let i = x - 1; i <= x + 1; i++)
    for (let j = y - 1; j <= y + 1; j++)
      for (let k = z - 1; k <= z + 1; k++) yield* cells.get(`${i},${j},${k}`) ?? [];
}

function nearestOf(
  positions: Float64Array,
  v: number,
  candidates: Iterable<number>,
  tolerance: number,
): number | undefined {
  let nearest: number | undefined;
  let least = tolerance * tolerance;
  for (const other of candidates) {
    let square = 0;
    for (let i = 0; i < 3; i++) {
      const d = positions[3 * v + i] - positions[3 * other + i];
      square += d * d;
    }
    if (square > least) continue;
    least = square;
    nearest = other;
  }
  return nearest;
}
