import { exponent, productError, sumError, timesPowerOfTwo } from "./exact.js";
import { exp, log } from "./exp-log.js";

/** Cube root; error below 1 ulp. One Newton step with an exact residue from e^(ln x/3). */
export function cbrt(x: number): number {
  if (x === 0 || !Number.isFinite(x)) return x;
  const third = Math.floor(exponent(x) / 3);
  const m = timesPowerOfTwo(Math.abs(x), -3 * third);
  const t = exp(log(m) / 3);
  const square = t * t;
  const cube = square * t;
  const rest = m - cube - productError(square, t, cube) - productError(t, t, square) * t;
  const root = timesPowerOfTwo(t + rest / (3 * square), third);
  return x < 0 ? -root : root;
}

/** √(a² + b² + …) without overflow or underflow on the way, special values as ECMAScript's Math.hypot; error below 1 ulp. */
export function hypot(...values: number[]): number {
  let greatest = 0;
  for (const value of values) {
    if (Math.abs(value) === Number.POSITIVE_INFINITY) return Number.POSITIVE_INFINITY;
    greatest = Math.max(greatest, Math.abs(value));
  }
  if (greatest === 0 || Number.isNaN(greatest)) return values.some(Number.isNaN) ? Number.NaN : 0;
  const k = exponent(greatest);
  let sum = 0;
  let low = 0;
  for (const value of values) {
    const v = timesPowerOfTwo(value, -k);
    const square = v * v;
    const next = sum + square;
    low += sumError(sum, square, next) + productError(v, v, square);
    sum = next;
  }
  const root = Math.sqrt(sum);
  const square = root * root;
  return timesPowerOfTwo(root + (sum - square - productError(root, root, square) + low) / (2 * root), k);
}
