/** Primitive modes that have triangles (glTF 2.0, 3.7.2.1); the third and last are fans. */
const TRIANGLES = 4;
const STRIP = 5;

/** Whether a primitive of that mode has triangles: points and lines have none. */
export const hasTriangles = (mode: number): boolean => mode >= TRIANGLES;

/**
 * Vertex numbers, three a triangle, of a primitive: a list, strip or fan, through `indices` or straight through
 * `vertexCount` vertices. Triangles that name a vertex twice (as strips do to hang together) are left out, as is an
 * unfinished last one.
 */
export function triangleList(
  mode: number,
  indices: ArrayLike<number> | undefined,
  vertexCount: number,
): Uint32Array {
  const length = indices ? indices.length : vertexCount;
  const count = mode === TRIANGLES ? Math.floor(length / 3) : Math.max(0, length - 2);
  const list = new Uint32Array(count * 3);
  let used = 0;
  for (let i = 0; i < count; i++) {
    // Orders of corners as the specification states them.
    const odd = i & 1;
    let a = mode === TRIANGLES ? 3 * i : mode === STRIP ? i : i + 1;
    let b = mode === TRIANGLES ? a + 1 : mode === STRIP ? i + 1 + odd : i + 2;
    let c = mode === TRIANGLES ? a + 2 : mode === STRIP ? i + 2 - odd : 0;
    if (indices) {
      a = indices[a];
      b = indices[b];
      c = indices[c];
    }
    if (a === b || b === c || c === a) continue;
    list[used++] = a;
    list[used++] = b;
    list[used++] = c;
  }
  return list.subarray(0, used);
}
