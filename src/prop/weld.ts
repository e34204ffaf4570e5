import { Places } from "./places.js";

/** Triangles, and which surface each is of. */
export interface Triangles {
  /** 3 numbers a vertex, m. */
  readonly positions: Float64Array;
  /** 3 vertex numbers a triangle. */
  readonly triangles: Uint32Array;
  /** Per triangle: number of its surface. */
  readonly owners: Uint32Array;
}

/** One mesh of all, one vertex at each place, without triangles of which two corners fall together. */
export function weld(meshes: readonly Triangles[]): Triangles {
  const corners = meshes.reduce((sum, { triangles }) => sum + triangles.length, 0);
  const lists = new Set(meshes.map(({ positions }) => positions));
  const vertices = [...lists].reduce((sum, positions) => sum + positions.length / 3, 0);
  const places = new Places(Math.min(vertices, corners));
  // Meshes may share one list of vertices: what it became is looked up once.
  const known = new Map<Float64Array, Int32Array>();
  const welded = new Uint32Array(corners);
  const owners = new Uint32Array(corners / 3);
  let count = 0;
  for (const { positions, triangles, owners: from } of meshes) {
    let numbers = known.get(positions);
    if (!numbers) {
      numbers = new Int32Array(positions.length / 3).fill(-1);
      known.set(positions, numbers);
    }
    for (let corner = 0; corner < triangles.length; corner++) {
      const vertex = triangles[corner];
      let number = numbers[vertex];
      if (number < 0) {
        number = places.number(positions, vertex);
        numbers[vertex] = number;
      }
      welded[3 * count + (corner % 3)] = number;
      if (corner % 3 < 2) continue;
      const [a, b] = [welded[3 * count], welded[3 * count + 1]];
      if (a === b || b === number || number === a) continue;
      owners[count++] = from[(corner - 2) / 3];
    }
  }
  return {
    positions: places.positions,
    triangles: welded.subarray(0, 3 * count),
    owners: owners.subarray(0, count),
  };
}

/** The mesh of the triangles that are named, vertices as they are. */
export function pick(mesh: Triangles, which: ArrayLike<number>): Triangles {
  const triangles = new Uint32Array(3 * which.length);
  const owners = new Uint32Array(which.length);
  for (let i = 0; i < which.length; i++) {
    const t = which[i];
    for (let k = 0; k < 3; k++) triangles[3 * i + k] = mesh.triangles[3 * t + k];
    owners[i] = mesh.owners[t];
  }
  return { positions: mesh.positions, triangles, owners };
}
