/**
 * Carlson's symmetric elliptic integrals of real arguments, to rounding: Carlson, Numerical Algorithms 10, 13, 1995, and DLMF §19.36(i).
 * Each duplication quarters the spread of the arguments; the rest is a Taylor polynomial about their mean, of the seventh degree.
 */

import { atan, log } from "../math/elementary.js";

/** First factor of the stopping rule for an error of 1e-17: (3r)^(-1/8) and (r/4)^(-1/8), with terms up to the seventh degree. */
const SPREAD_F = 117;
const SPREAD_J = 159;

/** R_F(x, y, z) = ½∫₀^∞ dt / √((t+x)(t+y)(t+z)); none negative, at most one zero. */
export function carlsonF(x0: number, y0: number, z0: number): number {
  let [x, y, z] = [x0, y0, z0];
  const mean = (x + y + z) / 3;
  let a = mean;
  let q = SPREAD_F * Math.max(Math.abs(mean - x), Math.abs(mean - y), Math.abs(mean - z));
  let power = 1;
  while (q >= a) {
    const rx = Math.sqrt(x);
    const ry = Math.sqrt(y);
    const rz = Math.sqrt(z);
    const lambda = rx * (ry + rz) + ry * rz;
    x = (x + lambda) / 4;
    y = (y + lambda) / 4;
    z = (z + lambda) / 4;
    a = (a + lambda) / 4;
    q /= 4;
    power /= 4;
  }
  const X = ((mean - x0) * power) / a;
  const Y = ((mean - y0) * power) / a;
  const Z = -X - Y;
  const e2 = X * Y - Z * Z;
  const e3 = X * Y * Z;
  // DLMF 19.36.1
  const sum =
    1 -
    e2 / 10 +
    e3 / 14 +
    (e2 * e2) / 24 -
    (3 * e2 * e3) / 44 -
    (5 * e2 * e2 * e2) / 208 +
    (3 * e3 * e3) / 104 +
    (e2 * e2 * e3) / 16;
  return sum / Math.sqrt(a);
}

/** R_J(x, y, z, p) = (3/2)∫₀^∞ dt / ((t+p) √((t+x)(t+y)(t+z))); x, y, z not negative, at most one zero, p positive. */
export function carlsonJ(x0: number, y0: number, z0: number, p0: number): number {
  let [x, y, z, p] = [x0, y0, z0, p0];
  const mean = (x + y + z + 2 * p) / 5;
  let delta = (p - x) * (p - y) * (p - z);
  let a = mean;
  let q = SPREAD_J * Math.max(Math.abs(mean - x), Math.abs(mean - y), Math.abs(mean - z), Math.abs(mean - p));
  let power = 1;
  let sum = 0;
  while (q >= a) {
    const rx = Math.sqrt(x);
    const ry = Math.sqrt(y);
    const rz = Math.sqrt(z);
    const rp = Math.sqrt(p);
    const lambda = rx * (ry + rz) + ry * rz;
    const d = (rp + rx) * (rp + ry) * (rp + rz);
    sum += (power / d) * oneAndMore(delta / (d * d));
    x = (x + lambda) / 4;
    y = (y + lambda) / 4;
    z = (z + lambda) / 4;
    p = (p + lambda) / 4;
    a = (a + lambda) / 4;
    delta /= 64;
    q /= 4;
    power /= 4;
  }
  const X = ((mean - x0) * power) / a;
  const Y = ((mean - y0) * power) / a;
  const Z = ((mean - z0) * power) / a;
  const P = (-X - Y - Z) / 2;
  const e2 = X * Y + X * Z + Y * Z - 3 * P * P;
  const e3 = X * Y * Z + 2 * e2 * P + 4 * P * P * P;
  const e4 = (2 * X * Y * Z + e2 * P + 3 * P * P * P) * P;
  const e5 = X * Y * Z * P * P;
  // DLMF 19.36.2
  const series =
    1 -
    (3 * e2) / 14 +
    e3 / 6 +
    (9 * e2 * e2) / 88 -
    (3 * e4) / 22 -
    (9 * e2 * e3) / 52 +
    (3 * e5) / 26 -
    (e2 * e2 * e2) / 16 +
    (3 * e3 * e3) / 40 +
    (3 * e2 * e4) / 20 +
    (45 * e2 * e2 * e3) / 272 -
    (9 * (e3 * e4 + e2 * e5)) / 68;
  return (power * series) / (a * Math.sqrt(a)) + 6 * sum;
}

/** R_C(1, 1 + e) for e > -1 (DLMF 19.6.15), by its Maclaurin series where the quotient has no digits. */
function oneAndMore(e: number): number {
  if (Math.abs(e) < 0.01) {
    let sum = 0;
    for (let k = 8; k >= 0; k--) sum = 1 / (2 * k + 1) - e * sum;
    return sum;
  }
  const root = Math.sqrt(Math.abs(e));
  return e > 0 ? atan(root) / root : log((1 + root) / Math.sqrt(1 + e)) / root;
}
