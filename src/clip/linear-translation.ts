import { EndFit, FITTED, fittedSample } from "./fit-end.js";
import { longestWithin } from "./longest-segments.js";
import type { NodePath } from "./node-path.js";
import type { SampledMotion } from "./sampled-motion.js";
import { firstAfter, lastBefore, type TranslationKeys } from "./translation-keys.js";

/** A segment that does not fit has an error above 1, however little. */
const BEYOND = 1 + 1e-9;

/**
 * Few translation keys, straight lines between them, with which no point is further than `limit` m from the true motion,
 * the rotation being played as `path` says; undefined where not even a key on every time of the grid does it. The first and
 * the last key are where the node has to be, rounded to float32; the others, with `offCurve`, beside that, chosen as the
 * linear rotation keys are.
 *
 * The displacement of the worst point is at most |Δc| + 2·reach·sin(θ/2): Δc that of the played centre of mass, θ the
 * angle between played and true rotation. It is that much where Δc is square to the axis of θ.
 */
export function linearTranslationKeys(
  motion: SampledMotion,
  path: NodePath,
  limit: number,
  offCurve: boolean,
): TranslationKeys | undefined {
  const { time, last } = motion;
  const { times, wanted } = path;
  const from = new Float64Array(4);
  const target = new Float64Array(4);
  const to = new Float64Array(3);
  const good = new Float64Array(3);
  const fit = new EndFit();
  const values: number[] = [];
  let error = 0;
  let worst = 0;
  let moved = 0;
  let goodWorst = 0;
  // Of the segments tried, which mostly start where the one before did: where that is, and the first time compared after it.
  let begun = -1;
  let first = 0;

  /** What is left where the rotation alone moves points by `by`, m. */
  const left = (by: number): number => Math.max(1e-9, limit - by);

  /** Moves `to` from the target to where the segment's greatest error, as a part of what is allowed, is least. */
  const fitEnd = (start: number, duration: number, low: number, high: number): void => {
    for (let n = 0; n < FITTED; n++) {
      const k = fittedSample(n, low, high);
      const share = (times[k] - start) / duration;
      const weight = limit / left(wanted[4 * k + 3]);
      const x = from[0] + share * (target[0] - from[0]) - wanted[4 * k];
      const y = from[1] + share * (target[1] - from[1]) - wanted[4 * k + 1];
      const z = from[2] + share * (target[2] - from[2]) - wanted[4 * k + 2];
      fit.set(n, weight * x, weight * y, weight * z, weight * share, weight * share);
    }
    const weight = limit / left(target[3]);
    fit.set(FITTED, 0, 0, 0, weight, weight);
    fit.solve();
    for (let i = 0; i < 3; i++) to[i] = target[i] + fit.shift[i];
  };

  /** Remembers the greatest displacement of those at the times `low` to `high` compared. */
  const look = (low: number, high: number, start: number, duration: number): void => {
    const fx = from[0];
    const fy = from[1];
    const fz = from[2];
    const rx = (to[0] - fx) / duration;
    const ry = (to[1] - fy) / duration;
    const rz = (to[2] - fz) / duration;
    for (let k = low; k <= high; k++) {
      const t = times[k] - start;
      const x = fx + t * rx - wanted[4 * k];
      const y = fy + t * ry - wanted[4 * k + 1];
      const z = fz + t * rz - wanted[4 * k + 2];
      const displacement = Math.sqrt(x * x + y * y + z * z) + wanted[4 * k + 3];
      if (displacement > worst) {
        worst = displacement;
        moved = wanted[4 * k + 3];
      }
    }
  };

  /** That displacement as a part of what is allowed, of both what the rotation leaves. */
  const part = (): number => (worst - moved) / left(moved);

  /**
   * Greatest error of a segment, as a part of what is allowed; only of its middle or its later part where that is too great. Where the
   * segment fits, its first quarter is left out: the error with which the key before starts it says nothing of its length.
   */
  const misfit = (a: number, b: number): number => {
    const start = time(a);
    const duration = time(b) - start;
    if (a !== begun) {
      begun = a;
      first = firstAfter(path, start);
    }
    const low = first;
    const high = lastBefore(path, time(b));
    path.wantedInto(b, target);
    for (let i = 0; i < 3; i++) to[i] = target[i];
    if (offCurve && b < last && b > a + 1 && low <= high) fitEnd(start, duration, low, high);
    let square = 0;
    for (let i = 0; i < 3; i++) {
      to[i] = Math.fround(to[i]);
      square += (to[i] - target[i]) * (to[i] - target[i]);
    }
    worst = Math.sqrt(square) + target[3];
    moved = target[3];
    // Nearly always the error is great about the middle.
    if (low <= high) look((low + high) >> 1, (low + high) >> 1, start, duration);
    if (worst > limit) return Math.max(part(), BEYOND);
    const early = low + Math.floor((high - low + 1) / 4);
    look(early, high, start, duration);
    if (worst > limit) return Math.max(part(), BEYOND);
    const error = Math.min(part(), 1);
    look(low, early - 1, start, duration);
    if (worst > limit) return Math.max(part(), BEYOND);
    good.set(to);
    goodWorst = worst;
    return error;
  };

  path.wantedInto(0, from);
  let square = 0;
  for (let i = 0; i < 3; i++) {
    const stored = Math.fround(from[i]);
    square += (stored - from[i]) * (stored - from[i]);
    from[i] = stored;
  }
  error = Math.sqrt(square) + from[3];
  if (error > limit) return undefined;
  values.push(from[0], from[1], from[2]);
  const indices = longestWithin(last, misfit, () => {
    from.set(good);
    values.push(good[0], good[1], good[2]);
    error = Math.max(error, goodWorst);
  });
  return indices && { indices, interpolation: "LINEAR", values: Float32Array.from(values), error };
}
