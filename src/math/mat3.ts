/** 3×3 matrices as three rows. */

import { cross, dot, type Vec3 } from "./vec3.js";

/** A 3×3 matrix as three rows. */
export type Mat3 = readonly [Vec3, Vec3, Vec3];

export const multiplyVector = (m: Mat3, v: Vec3): Vec3 => [dot(m[0], v), dot(m[1], v), dot(m[2], v)];

export const transpose = (m: Mat3): Mat3 => [
  [m[0][0], m[1][0], m[2][0]],
  [m[0][1], m[1][1], m[2][1]],
  [m[0][2], m[1][2], m[2][2]],
];

export function multiply(a: Mat3, b: Mat3): Mat3 {
  const columns = transpose(b);
  const row = (r: Vec3): Vec3 => [dot(r, columns[0]), dot(r, columns[1]), dot(r, columns[2])];
  return [row(a[0]), row(a[1]), row(a[2])];
}

export const determinant = (m: Mat3): number => dot(m[0], cross(m[1], m[2]));

export const add = (a: Mat3, b: Mat3): Mat3 => map(a, (value, i, j) => value + b[i][j]);

export const scale = (a: Mat3, s: number): Mat3 => map(a, (value) => value * s);

/** A matrix made of `f(value, row, column)` for each entry of `m`. */
export function map(m: Mat3, f: (value: number, row: number, column: number) => number): Mat3 {
  const row = (i: number): Vec3 => [f(m[i][0], i, 0), f(m[i][1], i, 1), f(m[i][2], i, 2)];
  return [row(0), row(1), row(2)];
}

export const diagonal = (v: Vec3): Mat3 => [
  [v[0], 0, 0],
  [0, v[1], 0],
  [0, 0, v[2]],
];

/** Solves m·x = v; undefined where the determinant is zero. */
export function solve(m: Mat3, v: Vec3): Vec3 | undefined {
  const c0 = cross(m[1], m[2]);
  const d = dot(m[0], c0);
  if (d === 0 || !Number.isFinite(d)) return undefined;
  const c1 = cross(m[2], m[0]);
  const c2 = cross(m[0], m[1]);
  return [
    (c0[0] * v[0] + c1[0] * v[1] + c2[0] * v[2]) / d,
    (c0[1] * v[0] + c1[1] * v[1] + c2[1] * v[2]) / d,
    (c0[2] * v[0] + c1[2] * v[1] + c2[2] * v[2]) / d,
  ];
}
