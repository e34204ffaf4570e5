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
  const { positions, edges, starts, sides, normals, groups } = solid;
  const [right, up] = toMatrix(rotation);
  const [x, y, z] = rotateBack(rotation, [0, 0, 1]);
  const contour = growing(1024);
  /** 1 for a triangle that is counter-clockwise in the picture, −1 for one that is not; edge on it may be either. */
  const facing = (t: number) =>
    normals[3 * t] * x + normals[3 * t + 1] * y + normals[3 * t + 2] * z >= 0 ? 1 : -1;
  const look = (e: number): void => {
    let weight = 0;
    for (let s = starts[e]; s < starts[e + 1]; s++)
      weight += sides[s] >= 0 ? facing(sides[s]) : -facing(~sides[s]);
    if (weight === 0) return;
    const a = 3 * edges[2 * e];
    const b = 3 * edges[2 * e + 1];
    contour.add(
      right[0] * positions[a] + right[1] * positions[a + 1] + right[2] * positions[a + 2],
      up[0] * positions[a] + up[1] * positions[a + 1] + up[2] * positions[a + 2],
      right[0] * positions[b] + right[1] * positions[b + 1] + right[2] * positions[b + 2],
      up[0] * positions[b] + up[1] * positions[b + 1] + up[2] * positions[b + 2],
      weight,
    );
  };
  if (!groups) {
    for (let e = 0; e + 1 < starts.length; e++) look(e);
    return contour.all();
  }
  const { loose, order, size, cones } = groups;
  for (let i = 0; i < loose.length; i++) look(loose[i]);
  for (let g = 0; 4 * g < cones.length; g++) {
    const along = cones[4 * g] * x + cones[4 * g + 1] * y + cones[4 * g + 2] * z;
    // all face the viewer, or none does: the edges fall out
    if (Math.abs(along) > cones[4 * g + 3]) continue;
    const end = Math.min(order.length, (g + 1) * size);
    for (let i = g * size; i < end; i++) look(order[i]);
  }
  return contour.all();
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
