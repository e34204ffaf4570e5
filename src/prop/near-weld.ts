import { after, eachEdge } from "./edges.js";
import { boxOf, diagonal } from "./vertex.js";
import { type Triangles, weld } from "./weld.js";

/**
 * The mesh with the vertices of open edges moved together where they lie within `tolerance` of one another and are not the
 * ends of one edge (what is thin stays so): each goes to the nearest of those that stay, so none goes further than the tolerance.
 */
export function nearWeld(mesh: Triangles, tolerance: number): Triangles {
  const { positions } = mesh;
  const { rim, isEdge } = rimOf(mesh);
  const moved = positions.slice();
  const cells = new Cells(positions, tolerance);
  for (const v of rim) {
    const near = cells.nearest(v);
    if (near !== undefined && !isEdge(v, near)) moved.set(positions.subarray(3 * near, 3 * near + 3), 3 * v);
    else cells.add(v);
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

/** Vertices by cells of the tolerance's size: what is near lies in the same or a neighbouring one. */
class Cells {
  readonly #cells = new Map<number, number[]>();
  readonly #low: readonly number[];
  readonly #rows: number;

  constructor(
    readonly positions: Float64Array,
    readonly tolerance: number,
  ) {
    const box = boxOf(positions);
    this.#low = box.low;
    this.#rows = Math.ceil(diagonal(box) / tolerance) + 3;
  }

  add(v: number): void {
    const key = this.#key(this.#row(v, 0), this.#row(v, 1), this.#row(v, 2));
    const cell = this.#cells.get(key);
    if (cell) cell.push(v);
    else this.#cells.set(key, [v]);
  }

  nearest(v: number): number | undefined {
    const [x, y, z] = [this.#row(v, 0), this.#row(v, 1), this.#row(v, 2)];
    let nearest: number | undefined;
    let least = this.tolerance * this.tolerance;
    for (let i = x - 1; i <= x + 1; i++)
      for (let j = y - 1; j <= y + 1; j++)
        for (let k = z - 1; k <= z + 1; k++)
          for (const other of this.#cells.get(this.#key(i, j, k)) ?? []) {
            const square = this.#squareBetween(v, other);
            if (square > least) continue;
            least = square;
            nearest = other;
          }
    return nearest;
  }

  #row(v: number, axis: number): number {
    return 1 + Math.floor((this.positions[3 * v + axis] - this.#low[axis]) / this.tolerance);
  }

  #key(i: number, j: number, k: number): number {
    return (i * this.#rows + j) * this.#rows + k;
  }

  #squareBetween(v: number, other: number): number {
    let square = 0;
    for (let i = 0; i < 3; i++) {
      const d = this.positions[3 * v + i] - this.positions[3 * other + i];
      square += d * d;
    }
    return square;
  }
}
