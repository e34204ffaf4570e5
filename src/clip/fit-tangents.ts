import { cos, sin } from "../math/elementary.js";
import { GreatCircle } from "./great-circle.js";
import { hermiteWeights } from "./hermite.js";

/** Unknowns: the four numbers of each of the two tangents. */
const SIZE = 8;
/**
 * Keeps what the samples leave open, the tangents' parts along the quaternions of a short segment, near those of the great
 * circle; a part of the matrix's trace. Between 1e-6 and 1e-11 it makes no difference to the number of keys.
 */
const DAMPING = 1e-10;
const REWEIGHTINGS = 5;
/** rad: errors well below count alike, being rounding. */
const ENOUGH = 1e-6;

/**
 * Tangents with which the unit quaternions of a cubic spline segment come nearest to given ones in the sense of the greatest angle:
 * least squares of Σ w |(I − qqᵀ)h|²/(q·h)², h the spline and q the given quaternion, weighted again towards the greatest
 * (Lawson's algorithm, e.g. Cline, SIAM J. Numer. Anal. 9, 604, 1972). Not the spline but its direction is played, so that
 * all eight numbers help, those along the quaternion too.
 *
 * @param shares of the segment, ascending between 0 and 1; the first `count` count
 * @param targets unit quaternions there
 * @param from first key, with `to`, the last one, in one hemisphere
 * @param tangents written: of the start (4), of the end (4), scaled by the segment's length
 */
export class TangentFitter {
  readonly #matrix = new Float64Array(SIZE * SIZE);
  readonly #right = new Float64Array(SIZE);
  readonly #bases: Float64Array;
  readonly #weights: Float64Array;
  readonly #along: Float64Array;
  readonly #circle = new GreatCircle();
  /** Tangents of the great circle. */
  readonly #even = new Float64Array(SIZE);

  constructor(most: number) {
    this.#bases = new Float64Array(4 * most);
    this.#weights = new Float64Array(most);
    this.#along = new Float64Array(most);
  }

  fit(
    count: number,
    shares: Float64Array,
    targets: Float64Array,
    from: Float64Array,
    to: Float64Array,
    tangents: Float64Array,
  ): void {
    const bases = this.#bases;
    const weights = this.#weights;
    const along = this.#along;
    const basis = new Float64Array(4);
    this.#circle.set(from, 0, to, 0);
    const { angle, side } = this.#circle;
    for (let i = 0; i < 4; i++) {
      this.#even[i] = angle * side[i];
      this.#even[4 + i] = angle * (cos(angle) * side[i] - sin(angle) * from[i]);
    }
    for (let n = 0; n < count; n++) {
      hermiteWeights(shares[n], basis);
      bases.set(basis, 4 * n);
      weights[n] = 1;
      along[n] = 1;
    }
    for (let round = 0; ; round++) {
      this.#solve(count, targets, from, to, tangents);
      if (round === REWEIGHTINGS) return;
      let heaviest = 0;
      for (let n = 0; n < count; n++) {
        const b = 4 * n;
        let square = 0;
        let d = 0;
        for (let i = 0; i < 4; i++) {
          const h =
            bases[b] * from[i] +
            bases[b + 1] * tangents[i] +
            bases[b + 2] * to[i] +
            bases[b + 3] * tangents[4 + i];
          square += h * h;
          d += h * targets[b + i];
        }
        along[n] = Math.max(0.1, d);
        // Not below the noise, which would else be weighed.
        weights[n] *= ENOUGH + Math.sqrt(Math.max(0, square - d * d)) / along[n];
        heaviest = Math.max(heaviest, weights[n]);
      }
      for (let n = 0; n < count; n++) weights[n] /= heaviest;
    }
  }

  #solve(
    count: number,
    targets: Float64Array,
    from: Float64Array,
    to: Float64Array,
    out: Float64Array,
  ): void {
    const m = this.#matrix;
    const right = this.#right;
    const bases = this.#bases;
    m.fill(0);
    right.fill(0);
    for (let n = 0; n < count; n++) {
      const b = 4 * n;
      const w = this.#weights[n] / (this.#along[n] * this.#along[n]);
      const h1 = bases[b + 1];
      const h3 = bases[b + 3];
      const aa = w * h1 * h1;
      const ab = w * h1 * h3;
      const bb = w * h3 * h3;
      let radial = 0;
      for (let i = 0; i < 4; i++) radial += targets[b + i] * (bases[b] * from[i] + bases[b + 2] * to[i]);
      for (let i = 0; i < 4; i++) {
        const qi = targets[b + i];
        const off = bases[b] * from[i] + bases[b + 2] * to[i] - radial * qi;
        right[i] -= w * h1 * off;
        right[4 + i] -= w * h3 * off;
        for (let j = 0; j <= i; j++) {
          const p = (i === j ? 1 : 0) - qi * targets[b + j];
          m[SIZE * i + j] += aa * p;
          m[SIZE * (4 + i) + 4 + j] += bb * p;
          m[SIZE * (4 + i) + j] += ab * p;
          if (i !== j) m[SIZE * (4 + j) + i] += ab * p;
        }
      }
    }
    let trace = 0;
    for (let i = 0; i < SIZE; i++) trace += m[(SIZE + 1) * i];
    const damping = DAMPING * trace + 1e-300;
    for (let i = 0; i < SIZE; i++) {
      m[(SIZE + 1) * i] += damping;
      right[i] += damping * this.#even[i];
    }
    solveCholesky(m, right, out);
  }
}

/** Solves a symmetric positive definite system of `SIZE` unknowns, whose lower half is given and spent. */
function solveCholesky(m: Float64Array, right: Float64Array, out: Float64Array): void {
  for (let j = 0; j < SIZE; j++) {
    const row = SIZE * j;
    for (let i = j; i < SIZE; i++) {
      let sum = m[SIZE * i + j];
      for (let k = 0; k < j; k++) sum -= m[SIZE * i + k] * m[row + k];
      // Rounding may take a pivot the damping alone keeps above 0.
      m[SIZE * i + j] = i === j ? Math.sqrt(Math.max(sum, 1e-300)) : sum / m[row + j];
    }
  }
  for (let i = 0; i < SIZE; i++) {
    let sum = right[i];
    for (let k = 0; k < i; k++) sum -= m[SIZE * i + k] * out[k];
    out[i] = sum / m[(SIZE + 1) * i];
  }
  for (let i = SIZE - 1; i >= 0; i--) {
    let sum = out[i];
    for (let k = i + 1; k < SIZE; k++) sum -= m[SIZE * k + i] * out[k];
    out[i] = sum / m[(SIZE + 1) * i];
  }
}
