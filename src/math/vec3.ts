/** Vectors of three numbers: small pure functions, no state. */

/** [x, y, z] */
export type Vec3 = readonly [number, number, number];

export const ZERO: Vec3 = [0, 0, 0];

export const add = (a: Vec3, b: Vec3): Vec3 => [a[0] + b[0], a[1] + b[1], a[2] + b[2]];

export const subtract = (a: Vec3, b: Vec3): Vec3 => [a[0] - b[0], a[1] - b[1], a[2] - b[2]];

export const scale = (a: Vec3, s: number): Vec3 => [a[0] * s, a[1] * s, a[2] * s];

/** a + s·b */
export const addScaled = (a: Vec3, b: Vec3, s: number): Vec3 => [
  a[0] + b[0] * s,
  a[1] + b[1] * s,
  a[2] + b[2] * s,
];

export const negate = (a: Vec3): Vec3 => [-a[0], -a[1], -a[2]];

export const dot = (a: Vec3, b: Vec3): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];

export const cross = (a: Vec3, b: Vec3): Vec3 => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
];

/** Length, safe against overflow and underflow by scaling with the greatest component. */
export function length(a: Vec3): number {
  const greatest = Math.max(Math.abs(a[0]), Math.abs(a[1]), Math.abs(a[2]));
  if (greatest === 0 || !Number.isFinite(greatest)) return greatest;
  if (isModerate(greatest)) return Math.sqrt(dot(a, a));
  const s = divide(a, greatest);
  return greatest * Math.sqrt(dot(s, s));
}

export const distance = (a: Vec3, b: Vec3): number => length(subtract(a, b));

/** The unit vector along `a`; the zero vector stays zero. */
export function normalize(a: Vec3): Vec3 {
  const greatest = Math.max(Math.abs(a[0]), Math.abs(a[1]), Math.abs(a[2]));
  if (greatest === 0) return ZERO;
  // The length of a tiny vector has too few digits to divide by.
  const s = isModerate(greatest) ? a : divide(a, greatest);
  return divide(s, length(s));
}

/** A unit vector at right angles to `a` (any one, but always the same for the same `a`). */
export function perpendicular(a: Vec3): Vec3 {
  const x = Math.abs(a[0]);
  const y = Math.abs(a[1]);
  const z = Math.abs(a[2]);
  const other: Vec3 = x <= y && x <= z ? [1, 0, 0] : y <= z ? [0, 1, 0] : [0, 0, 1];
  return normalize(cross(a, other));
}

const divide = (a: Vec3, d: number): Vec3 => [a[0] / d, a[1] / d, a[2] / d];

/** Whether squares neither overflow nor lose digits. */
const isModerate = (x: number): boolean => x > 1e-100 && x < 1e100;
