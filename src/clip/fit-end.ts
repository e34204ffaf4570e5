/** Samples within a segment that its end is fitted to. */
export const FITTED = 5;
/** Weighted solutions a fit. */
const ROUNDS = 2;
/** A sample never weighs less than this part of the heaviest: where the greatest error is may change from fit to fit. */
const LEAST_WEIGHT = 0.01;
/** Numbers a row: three components of an error, what the first two and the third move by with the end's. */
const ROW = 5;

/**
 * Finds where a segment's end should be moved for the greatest error to be least, the errors being linear in that: least squares
 * over a few samples and the end, weighted again towards the greatest (Lawson's algorithm, e.g. Cline, SIAM J. Numer. Anal. 9,
 * 604, 1972). Each fit starts with the weights of the one before: errors lie alike in all segments of a motion.
 */
export class EndFit {
  /** The end's shift. */
  readonly shift = new Float64Array(3);
  private readonly rows = new Float64Array(ROW * (FITTED + 1));
  private readonly weights = new Float64Array(FITTED + 1).fill(1);

  /** Says of sample `n`, or of the end as number `FITTED`, what its error is with an end not shifted. */
  set(n: number, x: number, y: number, z: number, gain: number, gainOfZ: number): void {
    const { rows } = this;
    const row = ROW * n;
    rows[row] = x;
    rows[row + 1] = y;
    rows[row + 2] = z;
    rows[row + 3] = gain;
    rows[row + 4] = gainOfZ;
  }

  solve(): void {
    const { rows, weights, shift } = this;
    let x = 0;
    let y = 0;
    let z = 0;
    let greatest = 0;
    for (let round = 0; round < ROUNDS; round++) {
      let sum = 0;
      let sumOfZ = 0;
      x = y = z = 0;
      for (let n = 0, row = 0; n <= FITTED; n++, row += ROW) {
        const w = weights[n] * rows[row + 3];
        const wz = weights[n] * rows[row + 4];
        sum += w * rows[row + 3];
        sumOfZ += wz * rows[row + 4];
        x -= w * rows[row];
        y -= w * rows[row + 1];
        z -= wz * rows[row + 2];
      }
      x /= sum;
      y /= sum;
      z /= sumOfZ;
      greatest = 0;
      for (let n = 0, row = 0; n <= FITTED; n++, row += ROW) {
        const dx = rows[row] + rows[row + 3] * x;
        const dy = rows[row + 1] + rows[row + 3] * y;
        const dz = rows[row + 2] + rows[row + 4] * z;
        const weight = weights[n] * Math.sqrt(dx * dx + dy * dy + dz * dz);
        weights[n] = weight;
        if (weight > greatest) greatest = weight;
      }
      // No errors, nothing to weigh.
      if (!(greatest > 0)) break;
    }
    const least = LEAST_WEIGHT * greatest;
    for (let n = 0; n <= FITTED; n++) weights[n] = greatest > 0 ? Math.max(weights[n], least) / greatest : 1;
    shift[0] = x;
    shift[1] = y;
    shift[2] = z;
  }
}

/** Of the samples `low` to `high` the one that is fitted as number `n`; the same may come twice. */
export const fittedSample = (n: number, low: number, high: number): number =>
  low + Math.round(((n + 0.5) * (high - low)) / FITTED);
