import { type Quat, rotateBack, toMatrix } from "../math/quat.js";
import type { Solid } from "./solid.js";

/** Directed segments of a picture's plane, x right, y up. */
export interface Contour {
  count: number;
  /** 4 numbers a segment: from x, y to x, y, m. */
  readonly ends: Float64Array;
  /** How often each counts. */
  readonly weights: Int32Array;
}

/**
 * The edges at which the number of triangles that lie over each other changes, seen from the picture's +z: a point of the plane is
 * covered as many times as the segments wind round it.
 *
 * Each triangle, turned round so that it is counter-clockwise in the picture, winds once round its own points. In the sum of all, an
 * edge between two triangles that lie on either side of it falls out; what stays are the edges where the surface turns away
 * from the viewer, and the rims of open surfaces. Nothing here asks that a mesh be closed or its triangles agree.
 */
export function contourOf(solid: Solid, rotation: Quat): Contour {
  const { positions, edges, starts, sides } = solid;
  const facing = facingOf(solid, rotation);
  const [right, up] = toMatrix(rotation);
  const contour = growing(1024);
  for (let e = 0; e + 1 < starts.length; e++) {
    let weight = 0;
    for (let s = starts[e]; s < starts[e + 1]; s++)
      weight += sides[s] >= 0 ? facing[sides[s]] : -facing[~sides[s]];
    if (weight === 0) continue;
    const a = 3 * edges[2 * e];
    const b = 3 * edges[2 * e + 1];
    contour.add(
      right[0] * positions[a] + right[1] * positions[a + 1] + right[2] * positions[a + 2],
      up[0] * positions[a] + up[1] * positions[a + 1] + up[2] * positions[a + 2],
      right[0] * positions[b] + right[1] * positions[b + 1] + right[2] * positions[b + 2],
      up[0] * positions[b] + up[1] * positions[b + 1] + up[2] * positions[b + 2],
      weight,
    );
  }
  return contour.all();
}

/** 1 for each triangle that is counter-clockwise in the picture, −1 for the others; edge on it may be either. */
export function facingOf({ normals }: Pick<Solid, "normals">, rotation: Quat): Int8Array {
  const [x, y, z] = rotateBack(rotation, [0, 0, 1]);
  const facing = new Int8Array(normals.length / 3);
  for (let t = 0, n = 0; t < facing.length; t++, n += 3)
    facing[t] = normals[n] * x + normals[n + 1] * y + normals[n + 2] * z >= 0 ? 1 : -1;
  return facing;
}

function growing(room: number) {
  let ends = new Float64Array(4 * room);
  let weights = new Int32Array(room);
  let count = 0;
  return {
    add(fromX: number, fromY: number, toX: number, toY: number, weight: number): void {
      if (count === weights.length) {
        const [oldEnds, oldWeights] = [ends, weights];
        ends = new Float64Array(2 * oldEnds.length);
        ends.set(oldEnds);
        weights = new Int32Array(2 * oldWeights.length);
        weights.set(oldWeights);
      }
      ends[4 * count] = fromX;
      ends[4 * count + 1] = fromY;
      ends[4 * count + 2] = toX;
      ends[4 * count + 3] = toY;
      weights[count++] = weight;
    },
    all: (): Contour => ({ count, ends, weights }),
  };
}
