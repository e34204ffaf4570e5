import { firstFour, placesOnGrid } from "./hull-exact.js";
import { HullSides } from "./hull-sides.js";

/** A convex polytope round a cloud of points. */
export interface Hull {
  /** Indices of the points that are its corners, ascending. */
  corners: Uint32Array;
  /** Its triangles, three such indices each, counter-clockwise from outside; a flat side of more corners is several. */
  triangles: Uint32Array;
}

/** Of the cloud's greatest coordinate: a point that is no further outside is left out. */
const SLACK = 1e-13;

/**
 * The convex hull of points (3 numbers each): none is further outside it than 1e-13 of their greatest coordinate. Undefined where all lie in one
 * plane, to as much.
 *
 * Quickhull (Barber, Dobkin & Huhdanpaa, ACM Trans. Mathematical Software 22, 469, 1996). Which sides a new corner sees is decided exactly, on
 * places rounded to a grid: rounding can neither tear the hull nor fold it.
 */
export function convexHull(points: Float64Array): Hull | undefined {
  const places = placesOnGrid(points);
  let size = 0;
  for (const value of places) size = Math.max(size, Math.abs(value));
  const start = firstFour(places, SLACK * size);
  if (!start) return undefined;
  const hull = new HullSides(places, size, SLACK * size);
  const open = hull.tetrahedron(start);
  for (let p = 0; p < places.length / 3; p++) hull.assign(p, open);
  for (let side = open.pop(); side !== undefined; side = open.pop()) {
    if (!hull.isOpen(side)) continue;
    for (const made of hull.extend(side)) open.push(made);
  }
  const triangles = hull.triangles();
  const isCorner = new Uint8Array(places.length / 3);
  for (const corner of triangles) isCorner[corner] = 1;
  const corners = Uint32Array.from(isCorner.keys()).filter((i) => isCorner[i] === 1);
  return { corners, triangles };
}
