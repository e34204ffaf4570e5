import { EndFit, FITTED, fittedSample } from "./fit-end.js";
import { longestWithin } from "./longest-segments.js";
import type { NodePath } from "./node-path.js";
import type { SampledMotion } from "./sampled-motion.js";
import { firstAfter, lastBefore, type TranslationKeys } from "./translation-keys.js";

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
  let goodWorst = 0;

  /** Of what the rotation alone moves points by: the inverse of what is left, as a part of the limit. */
  const weightOf = (moved: number): number => limit / Math.max(1e-9, limit - moved);

  /** Moves `to` from the target to where the segment's greatest error, as a part of what is allowed, is least. */
  const fitEnd = (start: number, duration: number, low: number, high: number): void => {
    for (let n = 0; n < FITTED; n++) {
      const k = fittedSample(n, low, high);
      const share = (times[k] - start) / duration;
      const weight = weightOf(wanted[4 * k + 3]);
      const x = from[0] + share * (target[0] - from[0]) - wanted[4 * k];
      const y = from[1] + share * (target[1] - from[1]) - wanted[4 * k + 1];
      const z = from[2] + share * (target[2] - from[2]) - wanted[4 * k + 2];
      fit.set(n, weight * x, weight * y, weight * z, weight * share, weight * share);
    }
    const weight = weightOf(target[3]);
    fit.set(FITTED, 0, 0, 0, weight, weight);
    fit.solve();
    for (let i = 0; i < 3; i++) to[i] = target[i] + fit.shift[i];
  };

  /**
   * Greatest displacement, as a part of what is allowed; the middle's alone where that is too great. Where the segment fits, its
   * first quarter is left out: the error with which the key before starts it says nothing of its length.
   */
  const misfit = (a: number, b: number): number => {
    const start = time(a);
    const duration = time(b) - start;
    const low = firstAfter(path, start);
    const high = lastBefore(path, time(b));
    path.wantedInto(b, target);
    to.set(target.subarray(0, 3));
    if (offCurve && b < last && b > a + 1 && low <= high) fitEnd(start, duration, low, high);
    let square = 0;
    for (let i = 0; i < 3; i++) {
      to[i] = Math.fround(to[i]);
      square += (to[i] - target[i]) * (to[i] - target[i]);
    }
    let worst = Math.sqrt(square) + target[3];
    const displacement = (k: number): number => {
      const share = (times[k] - start) / duration;
      const x = from[0] + share * (to[0] - from[0]) - wanted[4 * k];
      const y = from[1] + share * (to[1] - from[1]) - wanted[4 * k + 1];
      const z = from[2] + share * (to[2] - from[2]) - wanted[4 * k + 2];
      return Math.sqrt(x * x + y * y + z * z) + wanted[4 * k + 3];
    };
    // Nearly always the error is great about the middle.
    if (low <= high) worst = Math.max(worst, displacement((low + high) >> 1));
    if (worst > limit) return worst / limit;
    const early = low + Math.floor((high - low + 1) / 4);
    let atFirst = 0;
    for (let k = low; k < early; k++) atFirst = Math.max(atFirst, displacement(k));
    for (let k = early; k <= high; k++) worst = Math.max(worst, displacement(k));
    const all = Math.max(worst, atFirst);
    if (all > limit) return all / limit;
    good.set(to);
    goodWorst = all;
    return worst / limit;
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
    values.push(...good);
    error = Math.max(error, goodWorst);
  });
  return indices && { indices, interpolation: "LINEAR", values: Float32Array.from(values), error };
}
