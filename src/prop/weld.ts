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
  const places = new Places(meshes.reduce((sum, { positions }) => sum + positions.length / 3, 0));
  const welded = new Uint32Array(corners);
  const owners = new Uint32Array(corners / 3);
  let count = 0;
  for (const { positions, triangles, owners: from } of meshes) {
    const numbers = places.numbers(positions);
    for (let t = 0; t < from.length; t++) {
      const a = numbers[triangles[3 * t]];
      const b = numbers[triangles[3 * t + 1]];
      const c = numbers[triangles[3 * t + 2]];
      if (a === b || b === c || c === a) continue;
      welded[3 * count] = a;
      welded[3 * count + 1] = b;
      welded[3 * count + 2] = c;
      owners[count++] = from[t];
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
