import { hermiteBounds, hermiteWeights } from "./hermite.js";
import { longestSegments } from "./longest-segments.js";
import type { NodePath } from "./node-path.js";
import { bendSurcharge, type SampledMotion } from "./sampled-motion.js";
import { spreadSamples } from "./spread-samples.js";
import { firstAfter, lastBefore, type TranslationKeys } from "./translation-keys.js";

/** Times that a segment is fitted to, at most, and how often they are weighted again. */
const FITTED = 14;
const REWEIGHTINGS = 5;
/** An error of this part of what is allowed needs no weighing, which might only weigh its rounding. */
const ENOUGH = 1e-3;

interface Segment {
  end: Float64Array;
  /** As stored, m/s. */
  fromTangent: Float64Array;
  toTangent: Float64Array;
  /** Greatest displacement at its end, and in it, m. */
  endError: number;
  error: number;
}

/**
 * Few translation keys, a cubic between each two, with which no point is further than `limit` m from the true motion, the
 * rotation being played as `path` says; undefined where not even a key on every time of the grid does it. Keys are where
 * the node has to be, the tangents at their sides fitted freely (least squares, weighted again towards the greatest error as a part
 * of what is allowed there); all rounded to float32. A parabola takes two keys.
 */
export function cubicTranslationKeys(
  motion: SampledMotion,
  path: NodePath,
  limit: number,
): TranslationKeys | undefined {
  const { time, last, interval } = motion;
  const { times, wanted } = path;
  const target = new Float64Array(4);
  const start = new Float64Array(3);
  const from = new Float64Array(3);
  const chosen = new Int32Array(FITTED);
  const bases = new Float64Array(4 * FITTED);
  const basis = new Float64Array(4);
  const weights = new Float64Array(FITTED);
  const tangents = new Float64Array(6);
  let startError = 0;

  const fitTangents = (count: number, low: Float64Array, high: Float64Array): void => {
    weights.fill(1);
    for (let round = 0; ; round++) {
      let aa = 0;
      let ab = 0;
      let bb = 0;
      tangents.fill(0);
      for (let n = 0; n < count; n++) {
        const k = 4 * chosen[n];
        const radius = Math.max(1e-9, limit - wanted[k + 3]);
        const w = weights[n] / (radius * radius);
        const h1 = bases[4 * n + 1];
        const h3 = bases[4 * n + 3];
        aa += w * h1 * h1;
        ab += w * h1 * h3;
        bb += w * h3 * h3;
        for (let i = 0; i < 3; i++) {
          const off = wanted[k + i] - bases[4 * n] * low[i] - bases[4 * n + 2] * high[i];
          tangents[i] += w * h1 * off;
          tangents[3 + i] += w * h3 * off;
        }
      }
      const determinant = aa * bb - ab * ab;
      for (let i = 0; i < 3; i++) {
        const a = tangents[i];
        const b = tangents[3 + i];
        // Without two times to fit to, the straight way.
        const open = count < 2 || !(determinant > 1e-12 * aa * bb);
        tangents[i] = open ? high[i] - low[i] : (bb * a - ab * b) / determinant;
        tangents[3 + i] = open ? high[i] - low[i] : (aa * b - ab * a) / determinant;
      }
      if (round === REWEIGHTINGS) return;
      let greatest = 0;
      let heaviest = 0;
      for (let n = 0; n < count; n++) {
        const k = 4 * chosen[n];
        let square = 0;
        for (let i = 0; i < 3; i++) {
          const d =
            bases[4 * n] * low[i] +
            bases[4 * n + 1] * tangents[i] +
            bases[4 * n + 2] * high[i] +
            bases[4 * n + 3] * tangents[3 + i] -
            wanted[k + i];
          square += d * d;
        }
        const error = Math.sqrt(square) / Math.max(1e-9, limit - wanted[k + 3]);
        greatest = Math.max(greatest, error);
        weights[n] *= error;
        heaviest = Math.max(heaviest, weights[n]);
      }
      if (greatest < ENOUGH) return;
      for (let n = 0; n < count; n++) weights[n] /= heaviest;
    }
  };

  const trial = (a: number, b: number): Segment | undefined => {
    const begin = time(a);
    const duration = time(b) - begin;
    const low = firstAfter(path, begin);
    const high = lastBefore(path, time(b));
    path.wantedInto(b, target);
    const end = Float64Array.from(target.subarray(0, 3), Math.fround);
    const endError = Math.sqrt(squaredDistance(end, target)) + target[3];
    if (endError > limit) return undefined;
    const count = spreadSamples(low, high, FITTED, chosen);
    for (let n = 0; n < count; n++) {
      hermiteWeights((times[chosen[n]] - begin) / duration, basis);
      bases.set(basis, 4 * n);
    }
    fitTangents(count, from, end);
    const fromTangent = Float64Array.from(tangents.subarray(0, 3), (m) => Math.fround(m / duration));
    const toTangent = Float64Array.from(tangents.subarray(3), (m) => Math.fround(m / duration));
    const m = fromTangent.map((rate) => rate * duration);
    const n = toTangent.map((rate) => rate * duration);
    const { second } = hermiteBounds(3, from, m, end, n);
    const surcharge = bendSurcharge(second / (duration * duration), Math.min(interval, duration));
    let error = Math.max(startError, endError) + surcharge;
    const holds = (k: number): boolean => {
      hermiteWeights((times[k] - begin) / duration, basis);
      let square = 0;
      for (let i = 0; i < 3; i++) {
        const d =
          basis[0] * from[i] + basis[1] * m[i] + basis[2] * end[i] + basis[3] * n[i] - wanted[4 * k + i];
        square += d * d;
      }
      error = Math.max(error, Math.sqrt(square) + wanted[4 * k + 3] + surcharge);
      return error <= limit;
    };
    if (error > limit) return undefined;
    if (low <= high && !holds((low + high) >> 1)) return undefined;
    for (let k = low; k <= high; k += 16) if (!holds(k)) return undefined;
    for (let k = low; k <= high; k++) if (!holds(k)) return undefined;
    return { end, fromTangent, toTangent, endError, error };
  };

  path.wantedInto(0, target);
  for (let i = 0; i < 3; i++) from[i] = start[i] = Math.fround(target[i]);
  startError = Math.sqrt(squaredDistance(start, target)) + target[3];
  if (startError > limit) return undefined;
  let error = 0;
  const segments: Segment[] = [];
  let good: Segment;
  const indices = longestSegments(
    last,
    (a, b) => {
      const fitting = trial(a, b);
      if (fitting) good = fitting;
      return fitting !== undefined;
    },
    () => {
      segments.push(good);
      from.set(good.end);
      startError = good.endError;
      error = Math.max(error, good.error);
    },
  );
  if (!indices) return undefined;
  const values = new Float32Array(9 * indices.length);
  values.set(start, 3);
  segments.forEach(({ end, fromTangent, toTangent }, i) => {
    values.set(fromTangent, 9 * i + 6);
    values.set(toTangent, 9 * (i + 1));
    values.set(end, 9 * (i + 1) + 3);
  });
  return { indices, interpolation: "CUBICSPLINE", values, error };
}

function squaredDistance(a: Float64Array, b: Float64Array): number {
  return (a[0] - b[0]) * (a[0] - b[0]) + (a[1] - b[1]) * (a[1] - b[1]) + (a[2] - b[2]) * (a[2] - b[2]);
}
