import { exponent, productError, sumError, timesPowerOfTwo } from "./exact.js";

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
