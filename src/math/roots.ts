import { exponent, productError, timesPowerOfTwo } from "./elementary/exact.js";

/**
 * Real roots of a·x² + b·x + c, ascending; a double root once; none where a = b = 0; a root beyond the largest double is left
 * out. The discriminant is exact before it is rounded (Kahan, On the Cost of Floating-Point Computation Without Extra-Precise
 * Arithmetic, 2004) and nothing cancels after it (Goldberg, ACM Computing Surveys 23, 5, 1991, section 1.4).
 */
export function quadraticRoots(a: number, b: number, c: number): number[] {
  if (a === 0) return b === 0 ? [] : finiteAscending([-c / b]);
  if (c === 0) return finiteAscending(b === 0 ? [0] : [0, -b / a]);
  // x = 2^k·u with 2^2k near |c/a|, then all three by one power: neither products nor their errors leave a double's range.
  const k = Math.round((exponent(c) - exponent(a)) / 2);
  const shift = Math.max(exponent(c), b === 0 ? Number.NEGATIVE_INFINITY : exponent(b) + k);
  const p = timesPowerOfTwo(a, 2 * k - shift);
  const q = timesPowerOfTwo(b, k - shift) / 2;
  const r = timesPowerOfTwo(c, -shift);
  const square = q * q;
  const product = p * r;
  const discriminant = square - product + (productError(q, q, square) - productError(p, r, product));
  if (discriminant < 0) return [];
  if (discriminant === 0) return finiteAscending([timesPowerOfTwo(-q / p, k)]);
  const sum = -(q + (q < 0 ? -1 : 1) * Math.sqrt(discriminant));
  return finiteAscending([timesPowerOfTwo(sum / p, k), timesPowerOfTwo(r / sum, k)]);
}

/**
 * A root of the continuous function `f` between `lo` and `hi`, to within `tolerance` (same unit as `lo`) or the last two
 * digits of a double, whichever is more. Inverse quadratic interpolation where it is safe, else bisection
 * (Chandrupatla, Advances in Engineering Software 28, 145, 1997).
 * @throws RangeError where f(lo) and f(hi) have the same sign or are no numbers.
 */
export function findRoot(f: (x: number) => number, lo: number, hi: number, tolerance = 0): number {
  let [x1, x2] = [hi, lo];
  let [f1, f2] = [f(x1), f(x2)];
  if (f2 === 0) return x2;
  if (f1 === 0) return x1;
  if (!(f1 < 0 !== f2 < 0) || Number.isNaN(f1 + f2))
    throw new RangeError(
      `no root is known to lie between ${lo} and ${hi}: the function is ${f2} and ${f1} there, which must differ in sign`,
    );
  let t = 0.5;
  for (;;) {
    const x = x1 + t * (x2 - x1);
    const value = f(x);
    let [x3, f3] = [x1, f1];
    if (value < 0 !== f1 < 0) {
      [x3, f3] = [x2, f2];
      [x2, f2] = [x1, f1];
    }
    [x1, f1] = [x, value];
    const best = Math.abs(f2) < Math.abs(f1) ? x2 : x1;
    if (value === 0) return x;
    const near =
      (2 * Number.EPSILON * Math.abs(best) + Number.MIN_VALUE + 0.5 * tolerance) / Math.abs(x2 - x1);
    if (near > 0.5) return best;
    const xi = (x1 - x2) / (x3 - x2);
    const phi = (f1 - f2) / (f3 - f2);
    const smooth = phi < Math.sqrt(xi) && 1 - phi < Math.sqrt(1 - xi);
    t = smooth
      ? (f1 / (f2 - f1)) * (f3 / (f2 - f3)) + ((x3 - x1) / (x2 - x1)) * (f1 / (f3 - f1)) * (f2 / (f3 - f2))
      : 0.5;
    t = Math.min(1 - near, Math.max(near, t));
  }
}

const finiteAscending = (roots: number[]): number[] => roots.filter(Number.isFinite).sort((a, b) => a - b);
