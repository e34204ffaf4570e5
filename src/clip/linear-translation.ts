import { longestSegments } from "./longest-segments.js";
import type { NodePath } from "./node-path.js";
import type { SampledMotion } from "./sampled-motion.js";
import { spreadSamples } from "./spread-samples.js";
import { firstAfter, lastBefore, type TranslationKeys } from "./translation-keys.js";

/** Samples that a segment is fitted to, at most, its end apart; and how often they are weighted again. */
const FITTED = 11;
const REWEIGHTINGS = 6;

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
  const chosen = new Int32Array(FITTED);
  const residuals = new Float64Array(3 * (FITTED + 1));
  const shares = new Float64Array(FITTED + 1);
  const radii = new Float64Array(FITTED + 1);
  const weights = new Float64Array(FITTED + 1);
  const values: number[] = [];
  let error = 0;
  let worst = 0;
  let goodWorst = 0;

  /** Moves `to` from the target to where the segment's greatest error, as a part of what is allowed, is least. */
  const fitEnd = (start: number, duration: number, low: number, high: number): void => {
    const count = spreadSamples(low, high, FITTED, chosen);
    for (let n = 0; n < count; n++) {
      const k = chosen[n];
      const share = (times[k] - start) / duration;
      for (let i = 0; i < 3; i++)
        residuals[3 * n + i] = from[i] + share * (target[i] - from[i]) - wanted[4 * k + i];
      shares[n] = share;
      radii[n] = Math.max(1e-9, limit - wanted[4 * k + 3]);
      weights[n] = 1;
    }
    residuals.fill(0, 3 * count, 3 * count + 3);
    shares[count] = 1;
    radii[count] = Math.max(1e-9, limit - target[3]);
    weights[count] = 1;
    let x = 0;
    let y = 0;
    let z = 0;
    for (let round = 0; ; round++) {
      let sum = 0;
      x = y = z = 0;
      for (let n = 0; n <= count; n++) {
        const w = (weights[n] * shares[n]) / (radii[n] * radii[n]);
        sum += w * shares[n];
        x -= w * residuals[3 * n];
        y -= w * residuals[3 * n + 1];
        z -= w * residuals[3 * n + 2];
      }
      x /= sum;
      y /= sum;
      z /= sum;
      if (round === REWEIGHTINGS) break;
      let greatest = 0;
      for (let n = 0; n <= count; n++) {
        const dx = residuals[3 * n] + shares[n] * x;
        const dy = residuals[3 * n + 1] + shares[n] * y;
        const dz = residuals[3 * n + 2] + shares[n] * z;
        weights[n] *= Math.sqrt(dx * dx + dy * dy + dz * dz) / radii[n];
        greatest = Math.max(greatest, weights[n]);
      }
      if (!(greatest > 0)) break;
      for (let n = 0; n <= count; n++) weights[n] /= greatest;
    }
    to[0] = target[0] + x;
    to[1] = target[1] + y;
    to[2] = target[2] + z;
  };

  const fits = (a: number, b: number): boolean => {
    const start = time(a);
    const duration = time(b) - start;
    const low = firstAfter(path, start);
    const high = lastBefore(path, time(b));
    path.wantedInto(b, target);
    to.set(target.subarray(0, 3));
    if (offCurve && b < last && low <= high) fitEnd(start, duration, low, high);
    let square = 0;
    for (let i = 0; i < 3; i++) {
      to[i] = Math.fround(to[i]);
      square += (to[i] - target[i]) * (to[i] - target[i]);
    }
    worst = Math.sqrt(square) + target[3];
    if (worst > limit) return false;
    const displacement = (k: number): number => {
      const share = (times[k] - start) / duration;
      const x = from[0] + share * (to[0] - from[0]) - wanted[4 * k];
      const y = from[1] + share * (to[1] - from[1]) - wanted[4 * k + 1];
      const z = from[2] + share * (to[2] - from[2]) - wanted[4 * k + 2];
      return Math.sqrt(x * x + y * y + z * z) + wanted[4 * k + 3];
    };
    // Half the segments tried are too long; most of those show it about the middle.
    if (low <= high && displacement((low + high) >> 1) > limit) return false;
    for (let k = low; k <= high; k++) {
      worst = Math.max(worst, displacement(k));
      if (worst > limit) return false;
    }
    good.set(to);
    goodWorst = worst;
    return true;
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
  const indices = longestSegments(last, fits, () => {
    from.set(good);
    values.push(...good);
    error = Math.max(error, goodWorst);
  });
  return indices && { indices, interpolation: "LINEAR", values: Float32Array.from(values), error };
}
