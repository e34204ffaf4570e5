/** Solutions x = g(x, λ) followed from λ = 0, where g does not depend on x, to λ = 1. */

import { solveLinear } from "../math/linear.js";

/** One step of the whole way at the most, and the least before it is given up. */
const FIRST_STEP = 1 / 4;
const LEAST_STEP = 1 / 1024;
const NEWTON_ROUNDS = 12;
/** Corrections below this, relative to 1 + |x|, are rounding. */
const CONVERGED = 1e-13;
/** A first correction of more than this, relative to 1 + |x|, may have jumped to another solution: take a smaller step. */
const GREATEST_CORRECTION = 0.25;

/**
 * Follows the solution of x = g(x, λ) from λ = 0 to 1 by natural-parameter continuation with Newton's method at each step, the Jacobian by
 * forward differences (Allgower & Georg, Numerical Continuation Methods, 1990, ch. 2).
 *
 * @param g may throw (no answer there): the step is then halved
 * @returns x at λ = 1, or undefined where the branch cannot be followed to the end
 * @throws what g threw where its own failure is what stopped the way
 */
export function continueFixedPoint(
  g: (x: readonly number[], lambda: number) => number[],
  start: readonly number[],
): number[] | undefined {
  let x = [...start];
  let previous: { x: number[]; lambda: number } | undefined;
  let lambda = 0;
  let step = FIRST_STEP;
  while (lambda < 1) {
    const next = Math.min(1, lambda + step);
    const guess = previous ? extrapolate(previous, { x, lambda }, next) : x;
    let solved: number[] | undefined;
    let failure: unknown;
    try {
      solved = newton((y) => g(y, next), guess);
    } catch (error) {
      failure = error;
    }
    if (solved) {
      previous = { x, lambda };
      x = solved;
      lambda = next;
      step = Math.min(FIRST_STEP, step * 2);
    } else {
      step /= 2;
      if (step < LEAST_STEP) {
        if (failure) throw failure;
        return undefined;
      }
    }
  }
  return x;
}

function newton(g: (x: readonly number[]) => number[], guess: readonly number[]): number[] | undefined {
  let x = [...guess];
  let least = Number.POSITIVE_INFINITY;
  for (let round = 0; round < NEWTON_ROUNDS; round++) {
    const value = g(x);
    const residual = value.map((v, i) => v - x[i]);
    const correction = solveLinear(
      jacobian(g, x, value),
      residual.map((r) => -r),
    );
    if (!correction) return undefined;
    const size = Math.max(...correction.map((c, i) => Math.abs(c) / (1 + Math.abs(x[i]))));
    if (!Number.isFinite(size) || (round === 0 && size > GREATEST_CORRECTION)) return undefined;
    x = x.map((v, i) => v + correction[i]);
    if (size < CONVERGED) return x;
    // rounding in g itself can hold the corrections above the bar: once small, they are done when they stop shrinking
    if (size < 1e-11 && size >= least / 2) return x;
    least = Math.min(least, size);
  }
  return undefined;
}

/** Of g(x) − x, by forward differences. */
function jacobian(
  g: (x: readonly number[]) => number[],
  x: readonly number[],
  value: readonly number[],
): number[][] {
  const columns = x.map((v, j) => {
    const h = 1e-7 * (1 + Math.abs(v));
    const moved = x.map((w, i) => (i === j ? w + h : w));
    return g(moved).map((w, i) => (w - value[i]) / h - (i === j ? 1 : 0));
  });
  return value.map((_, i) => columns.map((column) => column[i]));
}

function extrapolate(
  a: { x: number[]; lambda: number },
  b: { x: number[]; lambda: number },
  lambda: number,
): number[] {
  const s = (lambda - b.lambda) / (b.lambda - a.lambda);
  return b.x.map((v, i) => v + s * (v - a.x[i]));
}
