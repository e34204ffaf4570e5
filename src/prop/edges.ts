/**
 * Calls `visit` once for each edge of a mesh. A half edge `h` runs from corner `h` to the next corner of triangle ⌊h / 3⌋;
 * those of one edge are `first`, `link[first]`, … up to a number below 0.
 *
 * The half edges are listed by their lower vertex, and each list by the higher one: no hash table, and the same order always.
 */
export function eachEdge(
  triangles: Uint32Array,
  vertexCount: number,
  visit: (first: number, link: Int32Array) => void,
): void {
  const link = new Int32Array(triangles.length);
  const head = new Int32Array(vertexCount).fill(-1);
  for (let h = triangles.length - 1; h >= 0; h -= 3) {
    // Corner h is the third of its triangle.
    const [a, b, c] = [triangles[h - 2], triangles[h - 1], triangles[h]];
    const third = Math.min(a, c);
    link[h] = head[third];
    head[third] = h;
    const second = Math.min(b, c);
    link[h - 1] = head[second];
    head[second] = h - 1;
    const first = Math.min(a, b);
    link[h - 2] = head[first];
    head[first] = h - 2;
  }
  const seenBy = new Int32Array(vertexCount).fill(-1);
  const last = new Int32Array(vertexCount);
  const firsts: number[] = [];
  for (let low = 0; low < vertexCount; low++) {
    let edges = 0;
    for (let h = head[low], next = 0; h >= 0; h = next) {
      next = link[h];
      link[h] = -1;
      const from = triangles[h];
      const high = from === low ? triangles[after(h)] : from;
      if (seenBy[high] === low) link[last[high]] = h;
      else {
        seenBy[high] = low;
        firsts[edges++] = h;
      }
      last[high] = h;
    }
    for (let e = 0; e < edges; e++) visit(firsts[e], link);
  }
}

/** The corner after corner `h`, in the same triangle. */
export const after = (h: number): number => (h % 3 === 2 ? h - 2 : h + 1);
