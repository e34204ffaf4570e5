import { cos, sin } from "../math/elementary.js";
import type { GreatCircle } from "./great-circle.js";
import type { SampledMotion } from "./sampled-motion.js";
import { spreadSamples } from "./spread-samples.js";

/** Samples that a segment is fitted to, at most, its end apart; and how often they are weighted again. */
const FITTED = 11;
const REWEIGHTINGS = 6;
/** Numbers a fitted sample: residual across the circle (4), along it, and what each moves by with the end's. */
const ROW = 7;

/**
 * Moves the end of a great circle, which starts in a given key and ends in the true rotation, to where the circle's greatest error is
 * least: least squares over a few samples, weighted again towards the greatest (Lawson's algorithm, e.g. Cline, SIAM J.
 * Numer. Anal. 9, 604, 1972). The error is linear in the end's small displacement ε: at the share s of the angle φ, the part
 * of ε along the circle moves a point by s, that across it by sin sφ / sin φ.
 */
export function endFitter(motion: SampledMotion) {
  const { rotations, time, sampleIndex } = motion;
  const chosen = new Int32Array(FITTED);
  const rows = new Float64Array(ROW * (FITTED + 1));
  const weights = new Float64Array(FITTED + 1);
  const shift = new Float64Array(4);

  /** Changes `end`; the samples `low` to `high` lie between the grid times `a` and `b`. */
  return (circle: GreatCircle, a: number, b: number, low: number, high: number, end: Float64Array): void => {
    const { from, side, angle } = circle;
    const start = time(a);
    const duration = time(b) - start;
    const sinAngle = sin(angle);
    const cosAngle = cos(angle);
    const count = spreadSamples(low, high, FITTED, chosen);
    for (let n = 0; n < count; n++) {
      const share = (time(sampleIndex(chosen[n])) - start) / duration;
      const c = cos(share * angle);
      const s = sin(share * angle);
      const k = 4 * chosen[n];
      const row = ROW * n;
      let along = 0;
      let radial = 0;
      for (let i = 0; i < 4; i++) {
        const r = c * from[i] + s * side[i] - rotations[k + i];
        rows[row + i] = r;
        along += r * (c * side[i] - s * from[i]);
        radial += r * (c * from[i] + s * side[i]);
      }
      for (let i = 0; i < 4; i++)
        rows[row + i] -= along * (c * side[i] - s * from[i]) + radial * (c * from[i] + s * side[i]);
      rows[row + 4] = along;
      rows[row + 5] = share;
      rows[row + 6] = angle > 1e-6 ? s / sinAngle : share;
      weights[n] = 1;
    }
    // The end itself starts without an error.
    rows.fill(0, ROW * count, ROW * count + 5);
    rows.fill(1, ROW * count + 5, ROW * count + 7);
    weights[count] = 1;

    let shiftAlong = 0;
    for (let round = 0; ; round++) {
      let across = 0;
      let inLine = 0;
      shift.fill(0);
      shiftAlong = 0;
      for (let n = 0; n <= count; n++) {
        const row = ROW * n;
        const w = weights[n];
        const share = rows[row + 5];
        const g = rows[row + 6];
        across += w * g * g;
        inLine += w * share * share;
        shiftAlong -= w * share * rows[row + 4];
        for (let i = 0; i < 4; i++) shift[i] -= w * g * rows[row + i];
      }
      for (let i = 0; i < 4; i++) shift[i] /= across;
      shiftAlong /= inLine;
      if (round === REWEIGHTINGS) break;
      let greatest = 0;
      for (let n = 0; n <= count; n++) {
        const row = ROW * n;
        const g = rows[row + 6];
        const r = rows[row + 4] + rows[row + 5] * shiftAlong;
        let square = r * r;
        for (let i = 0; i < 4; i++) {
          const d = rows[row + i] + g * shift[i];
          square += d * d;
        }
        weights[n] *= Math.sqrt(square);
        greatest = Math.max(greatest, weights[n]);
      }
      if (!(greatest > 0)) break;
      for (let n = 0; n <= count; n++) weights[n] /= greatest;
    }

    let square = 0;
    for (let i = 0; i < 4; i++) {
      end[i] += shift[i] + shiftAlong * (cosAngle * side[i] - sinAngle * from[i]);
      square += end[i] * end[i];
    }
    const size = Math.sqrt(square);
    for (let i = 0; i < 4; i++) end[i] /= size;
  };
}
