/** Places as whole numbers, on which the side of a plane is decided exactly. */

import { exponent, timesPowerOfTwo } from "../math/elementary/exact.js";
import { cross, dot, length, subtract, type Vec3 } from "../math/vec3.js";
import { vertex } from "./vertex.js";

/** Digits of the greatest coordinate, binary: what is rounded away is 1e-15 of the size. */
const DIGITS = 50;

/** Rounding of the determinant in doubles, as a share of the sum of its terms' sizes (Shewchuk, Adaptive Precision Floating-Point Arithmetic, 1997). */
const FILTER = 8e-16;

/** The points (3 numbers each) in a unit of their own, all coordinates whole and of 50 binary digits at most. */
export function placesOnGrid(points: Float64Array): Float64Array {
  let greatest = 0;
  for (const value of points) greatest = Math.max(greatest, Math.abs(value));
  const shift = greatest === 0 ? 0 : DIGITS - 1 - exponent(greatest);
  return points.map((value) => Math.round(timesPowerOfTwo(value, shift)));
}

/** 1 where point d lies on the side of the plane abc from which a, b, c go counter-clockwise, -1 on the other, 0 in it; exact. */
export function sideOf(places: Float64Array, a: number, b: number, c: number, d: number): number {
  // differences of whole numbers of 50 digits are exact
  const side = (from: number, to: number, axis: number) => places[3 * to + axis] - places[3 * from + axis];
  const [bx, by, bz] = [side(a, b, 0), side(a, b, 1), side(a, b, 2)];
  const [cx, cy, cz] = [side(a, c, 0), side(a, c, 1), side(a, c, 2)];
  const [dx, dy, dz] = [side(a, d, 0), side(a, d, 1), side(a, d, 2)];
  const determinant = dx * (by * cz - bz * cy) + dy * (bz * cx - bx * cz) + dz * (bx * cy - by * cx);
  const terms =
    Math.abs(dx) * (Math.abs(by * cz) + Math.abs(bz * cy)) +
    Math.abs(dy) * (Math.abs(bz * cx) + Math.abs(bx * cz)) +
    Math.abs(dz) * (Math.abs(bx * cy) + Math.abs(by * cx));
  if (Math.abs(determinant) > FILTER * terms) return Math.sign(determinant);
  const [ux, uy, uz, vx, vy, vz, wx, wy, wz] = [bx, by, bz, cx, cy, cz, dx, dy, dz].map(BigInt);
  const exact = wx * (uy * vz - uz * vy) + wy * (uz * vx - ux * vz) + wz * (ux * vy - uy * vx);
  return exact > 0n ? 1 : exact < 0n ? -1 : 0;
}

/** Four points that span a body; undefined where all lie in one plane, to `slack`. */
export function firstFour(
  places: Float64Array,
  slack: number,
): readonly [number, number, number, number] | undefined {
  const count = places.length / 3;
  if (count < 4) return undefined;
  const furthest = (measure: (p: Vec3) => number): { at: Vec3; index: number; value: number } => {
    let index = 0;
    let value = -1;
    for (let i = 0; i < count; i++) {
      const here = measure(vertex(places, i));
      if (here > value) [index, value] = [i, here];
    }
    return { at: vertex(places, index), index, value };
  };
  const origin = vertex(places, 0);
  const a = furthest((p) => length(subtract(p, origin)));
  const b = furthest((p) => length(subtract(p, a.at)));
  const ab = subtract(b.at, a.at);
  const c = furthest((p) => length(cross(ab, subtract(p, a.at))));
  if (c.value <= slack * b.value) return undefined;
  const normal = cross(ab, subtract(c.at, a.at));
  const d = furthest((p) => Math.abs(dot(normal, subtract(p, a.at))));
  if (d.value <= slack * c.value) return undefined;
  return [a.index, b.index, c.index, d.index];
}
