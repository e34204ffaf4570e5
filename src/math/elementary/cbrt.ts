import { exponent, productError, timesPowerOfTwo } from "./exact.js";
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
