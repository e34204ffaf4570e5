/** Few triangles for many: corners that lie in one cell of a grid become one (Rossignac & Borrel, Multi-resolution 3D approximations, 1993). */

export interface TriangleMesh {
  positions: Float64Array;
  triangles: Uint32Array;
}

/** Cells along the longest edge of the bounding box, tried one after the other. */
const CELLS = [4096, 64, 48, 36, 27, 20, 15, 11, 8, 6, 4];

/** @param corners three a triangle, 9 numbers each */
export function simplified(corners: Float64Array, mostTriangles: number): TriangleMesh {
  let mesh: TriangleMesh = {
    positions: corners,
    triangles: Uint32Array.from({ length: corners.length / 3 }, (_, i) => i),
  };
  for (const cells of CELLS) {
    mesh = clustered(mesh, cells);
    if (mesh.triangles.length / 3 <= mostTriangles) break;
  }
  return mesh;
}

function clustered({ positions, triangles }: TriangleMesh, cells: number): TriangleMesh {
  const { low, edge } = bounds(positions);
  const cell = edge / cells || 1;
  const known = new Map<number, number>();
  const sums: number[] = [];
  const counts: number[] = [];
  const numbers = Uint32Array.from({ length: positions.length / 3 }, (_, i) => {
    const at = (axis: number) => Math.round((positions[3 * i + axis] - low[axis]) / cell);
    const key = (at(0) * 8192 + at(1)) * 8192 + at(2);
    const number = known.get(key) ?? counts.length;
    if (number === counts.length) {
      known.set(key, number);
      sums.push(0, 0, 0);
      counts.push(0);
    }
    for (let axis = 0; axis < 3; axis++) sums[3 * number + axis] += positions[3 * i + axis];
    counts[number]++;
    return number;
  });
  return {
    positions: Float64Array.from(sums, (sum, i) => sum / counts[Math.floor(i / 3)]),
    triangles: renumbered(triangles, numbers, counts.length),
  };
}

/** Triangles that still are one, each once. */
function renumbered(triangles: Uint32Array, numbers: Uint32Array, count: number): Uint32Array {
  const seen = new Set<string>();
  const left: number[] = [];
  for (let i = 0; i < triangles.length; i += 3) {
    const [a, b, c] = [numbers[triangles[i]], numbers[triangles[i + 1]], numbers[triangles[i + 2]]];
    if (a === b || b === c || c === a) continue;
    const key = keyOf(a, b, c, count);
    if (seen.has(key)) continue;
    seen.add(key);
    left.push(a, b, c);
  }
  return Uint32Array.from(left);
}

function keyOf(a: number, b: number, c: number, count: number): string {
  const [first, second, third] = [a, b, c].sort((x, y) => x - y);
  return `${first * count + second} ${third}`;
}

function bounds(positions: Float64Array): { low: number[]; edge: number } {
  const low = [0, 1, 2].map(() => Number.POSITIVE_INFINITY);
  const high = low.map((value) => -value);
  for (let i = 0; i < positions.length; i++) {
    low[i % 3] = Math.min(low[i % 3], positions[i]);
    high[i % 3] = Math.max(high[i % 3], positions[i]);
  }
  return { low, edge: Math.max(0, ...high.map((value, axis) => value - low[axis])) };
}
