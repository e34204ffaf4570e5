/** Solutions of x = g(x, λ) followed from λ = 0 to λ = 1, round folds too. */

import { solveLinear } from "./linear.js";

/** Arc lengths, in units of the whole way in λ and of 1 + |start| in x. */
const FIRST_STEP = 1 / 32;
const GREATEST_STEP = 1 / 4;
const LEAST_STEP = 1e-8;
const MOST_STEPS = 4000;
/** Newton rounds of one step; a step that takes more is halved. */
const ROUNDS = 5;
/** A correction of more than this share of the step may have jumped to another branch. */
const STRAY = 0.1;
/** Cosine of the most that the curve may bend in one step. */
const STRAIGHT = 0.95;
const CONVERGED = 1e-10;
const FINISHED = 1e-13;
const DIFFERENCE = 1e-7;

type Map = (x: readonly number[], lambda: number) => number[];

/**
 * The solution at λ = 1 that the one at λ = 0 turns into, by pseudo-arclength continuation (Keller 1977; Allgower & Georg, Numerical
 * Continuation Methods, 1990, chapters 2 and 6): steps along the curve in (x, λ), so that it is followed where it turns back in λ; Jacobians by
 * forward differences, the end by Newton's method at λ = 1.
 *
 * @param g may throw where it has no answer: the step is then halved
 * @param start the solution at λ = 0
 * @returns x at λ = 1, or undefined where the curve does not get there
 * @throws what g threw where that is what ended the way
 */
export function continueToOne(g: Map, start: readonly number[]): number[] | undefined {
  const units = start.map((value) => 1 + Math.abs(value));
  const toX = (y: readonly number[]): number[] => units.map((unit, i) => y[i] * unit);
  const residual = (y: readonly number[]): number[] => {
    const x = toX(y);
    return g(x, y[x.length]).map((value, i) => (value - x[i]) / units[i]);
  };
  const n = start.length;
  let y = [...start.map((value, i) => value / units[i]), 0];
  let tangent = nextTangent(residual, y, [...start.map(() => 0), 1]);
  let step = FIRST_STEP;
  for (let count = 0; count < MOST_STEPS && tangent; count++) {
    let failure: unknown;
    try {
      const along = tangent;
      const guess = y.map((value, i) => value + step * along[i]);
      const solved = newton(residual, guess, along, CONVERGED, STRAY * step);
      const turned = solved && nextTangent(residual, solved, along);
      if (solved && turned && inner(turned, along) > STRAIGHT) {
        if (solved[n] < 1) {
          y = solved;
          tangent = turned;
          step = Math.min(GREATEST_STEP, step * 1.5);
          continue;
        }
        const crossing = between(y, solved, (1 - y[n]) / (solved[n] - y[n]));
        const end = newton(residual, crossing, unit(n), FINISHED, step / 2);
        if (end) return toX(end);
      }
    } catch (error) {
      failure = error;
    }
    step /= 2;
    if (step < LEAST_STEP) {
      if (failure) throw failure;
      return undefined;
    }
  }
  return undefined;
}

/** Newton's method on the residual, at right angles to `fixed`, within `stray` of the guess; undefined where it does not settle. */
function newton(
  residual: (y: readonly number[]) => number[],
  guess: readonly number[],
  fixed: readonly number[],
  tolerance: number,
  stray: number,
): number[] | undefined {
  let y = [...guess];
  let least = Number.POSITIVE_INFINITY;
  for (let round = 0; round < ROUNDS + (tolerance < CONVERGED ? ROUNDS : 0); round++) {
    const value = residual(y);
    const correction = solveLinear([...jacobian(residual, y, value), fixed], [...value.map((v) => -v), 0]);
    if (!correction) return undefined;
    y = y.map((v, i) => v + correction[i]);
    const size = largest(correction);
    if (!(largest(y.map((v, i) => v - guess[i])) <= stray)) return undefined;
    // Rounding in g can hold corrections above the bar: once small, they are done when they no longer shrink.
    if (size < tolerance || (size < CONVERGED && size >= least / 2)) return y;
    least = size;
  }
  return undefined;
}

/** The unit tangent of the curve, on the side of the last one. */
function nextTangent(
  residual: (y: readonly number[]) => number[],
  y: readonly number[],
  last: readonly number[],
): number[] | undefined {
  const rows = jacobian(residual, y, residual(y));
  const tangent = solveLinear([...rows, last], [...rows.map(() => 0), 1]);
  if (!tangent) return undefined;
  const size = Math.sqrt(inner(tangent, tangent));
  return tangent.map((value) => value / size);
}

/** Rows of the derivatives by every component of y, λ last. */
function jacobian(
  residual: (y: readonly number[]) => number[],
  y: readonly number[],
  value: readonly number[],
): number[][] {
  const columns = y.map((_, j) =>
    residual(y.map((v, i) => (i === j ? v + DIFFERENCE : v))).map((v, i) => (v - value[i]) / DIFFERENCE),
  );
  return value.map((_, i) => columns.map((column) => column[i]));
}

const between = (a: readonly number[], b: readonly number[], share: number): number[] =>
  a.map((value, i) => value + share * (b[i] - value));
const unit = (n: number): number[] => [...new Array<number>(n).fill(0), 1];
const inner = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, value, i) => sum + value * b[i], 0);
const largest = (v: readonly number[]): number => Math.max(...v.map(Math.abs));
