import { log } from "../math/elementary.js";

/** Chance of less than three standard deviations below the mean, Φ(−3). */
const TAIL = 0.0013498980316300946;

/**
 * A bell curve's value in standard deviations, cut at ±3, by the share 0 ≤ quantile ≤ 1 of the cut curve that lies below it.
 */
export function cutNormal(quantile: number): number {
  return Math.max(-3, Math.min(3, normalQuantile(TAIL + quantile * (1 - 2 * TAIL))));
}

/** Wichura, Algorithm AS 241 (PPND16), Applied Statistics 37, 477, 1988, without its branch for the far tails (p < 1e-11). */
function normalQuantile(p: number): number {
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (q * polynomial(CENTRE_OVER, r)) / polynomial(CENTRE_UNDER, r);
  }
  const r = Math.sqrt(-log(q < 0 ? p : 1 - p)) - 1.6;
  return (Math.sign(q) * polynomial(SIDE_OVER, r)) / polynomial(SIDE_UNDER, r);
}

/** Coefficients from the highest power down. */
const polynomial = (coefficients: readonly number[], x: number): number =>
  coefficients.reduce((sum, coefficient) => sum * x + coefficient, 0);

const CENTRE_OVER = [
  2509.0809287301227, 33430.57558358813, 67265.7709270087, 45921.95393154987, 13731.69376550946,
  1971.5909503065513, 133.14166789178438, 3.3871328727963665,
];
const CENTRE_UNDER = [
  5226.495278852854, 28729.085735721943, 39307.89580009271, 21213.794301586597, 5394.196021424751,
  687.1870074920579, 42.31333070160091, 1,
];
const SIDE_OVER = [
  0.0007745450142783414, 0.022723844989269184, 0.2417807251774506, 1.2704582524523684, 3.6478483247632045,
  5.769497221460691, 4.630337846156546, 1.4234371107496835,
];
const SIDE_UNDER = [
  1.0507500716444169e-9, 0.0005475938084995345, 0.015198666563616457, 0.14810397642748008, 0.6897673349851,
  1.6763848301838038, 2.053191626637759, 1,
];
