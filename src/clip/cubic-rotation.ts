import { TangentFitter } from "./fit-tangents.js";
import { hermiteBounds, hermiteWeights } from "./hermite.js";
import { longestSegments } from "./longest-segments.js";
import { type RotationKeys, samplesBetween } from "./rotation-keys.js";
import { bendSurcharge, type SampledMotion } from "./sampled-motion.js";
import { spreadSamples } from "./spread-samples.js";
import { fromOrigin } from "./time-grid.js";

/**
 * Cosine of half the largest step between keys: just under 180°, beyond which importers that lay neighbouring keys into one
 * hemisphere turn one round.
 */
const LEAST_DOT = 0.005;
/** Samples that a segment is fitted to, at most. */
const FITTED = 14;

/** A segment: what is stored of it, the tangents per second, and what it may add between the times compared. */
interface Segment {
  end: Float64Array;
  fromTangent: Float64Array;
  toTangent: Float64Array;
  surcharge: number;
}

/**
 * Few rotation keys with which glTF's cubic spline never moves a point within the reach further than `limit` m from where it
 * should be, relative to the centre of mass, at or between the times compared; undefined where not even a key on every
 * time of the grid does it. Keys are the true rotation, the tangents at their sides fitted freely, so that only the rotation
 * itself is continuous; all as rounded to float32.
 *
 * Between the times compared a bound of the played rotation's second derivative counts: for the unit quaternion q = h/|h| the angular
 * velocity is 2|Ph′|/|h| and the angular acceleration 2|Ph″ − 2 (q·h′) Ph′/|h||/|h|, with P = I − qqᵀ, hence
 * at most 2|h″|/|h| + 2|h′|²/|h|²; the cubic's derivatives are bounded over the whole segment.
 */
export function cubicRotationKeys(motion: SampledMotion, limit: number): RotationKeys | undefined {
  const { last, time } = motion;
  const segments: Segment[] = [];
  const start = new Float64Array(4);
  const pose = new Float64Array(7);
  motion.poseInto(0, pose);
  for (let i = 0; i < 4; i++) start[i] = Math.fround(pose[3 + i]);
  const from = start.slice();
  const trial = segmentTrial(motion, limit);
  let good: Segment;
  const indices = longestSegments(
    last,
    (a, b) => {
      const fitting = trial(from, a, b);
      if (fitting) good = fitting;
      return fitting !== undefined;
    },
    () => {
      segments.push(good);
      from.set(good.end);
    },
  );
  if (!indices) return undefined;

  const values = new Float32Array(12 * indices.length);
  values.set(start, 4);
  segments.forEach(({ end, fromTangent, toTangent }, i) => {
    values.set(fromTangent, 12 * i + 8);
    values.set(toTangent, 12 * (i + 1));
    values.set(end, 12 * (i + 1) + 4);
  });
  const keyTime = (key: number) => time(indices[key]);
  return {
    indices,
    interpolation: "CUBICSPLINE",
    values,
    surcharges: segments.map(({ surcharge }) => surcharge),
    played: splines(values, keyTime),
  };
}

/** Tries segments: answers the one from the stored key `from` at grid time `a` to `b`, or undefined where it does not hold `limit`. */
function segmentTrial(
  motion: SampledMotion,
  limit: number,
): (from: Float64Array, a: number, b: number) => Segment | undefined {
  const { body, rotations, time, sampleIndex, interval } = motion;
  const far = fromOrigin(body);
  const fitter = new TangentFitter(FITTED);
  const chosen = new Int32Array(FITTED);
  const shares = new Float64Array(FITTED);
  const targets = new Float64Array(4 * FITTED);
  const pose = new Float64Array(7);
  const tangents = new Float64Array(8);
  const basis = new Float64Array(4);

  return (from, a, b) => {
    const start = time(a);
    const duration = time(b) - start;
    const { low, high } = samplesBetween(motion, a, b);
    motion.poseInto(b, pose);
    const end = Float64Array.from(pose.subarray(3), Math.fround);
    let dot = 0;
    for (let i = 0; i < 4; i++) dot += from[i] * end[i];
    if (dot < LEAST_DOT) return undefined;
    const count = spreadSamples(low, high, FITTED, chosen);
    for (let n = 0; n < count; n++) {
      shares[n] = (time(sampleIndex(chosen[n])) - start) / duration;
      for (let i = 0; i < 4; i++) targets[4 * n + i] = rotations[4 * chosen[n] + i];
    }
    fitter.fit(count, shares, targets, from, end, tangents);
    // As they come back from a file.
    const fromTangent = Float64Array.from(tangents.subarray(0, 4), (m) => Math.fround(m / duration));
    const toTangent = Float64Array.from(tangents.subarray(4), (m) => Math.fround(m / duration));
    const m = fromTangent.map((rate) => rate * duration);
    const n = toTangent.map((rate) => rate * duration);

    const { first, second } = hermiteBounds(4, from, m, end, n);
    const gap = Math.min(interval, duration);
    /** With |h| at least `size`. */
    const surchargeAt = (size: number): number => {
      const bend =
        (4 * first * first) / (size * size) + (2 * second) / size + (2 * first * first) / (size * size);
      return bendSurcharge((far * bend) / (duration * duration), gap);
    };
    /** Square of the sine of half the angle at which the furthest points are as far off as is left. */
    const squaredSine = (surcharge: number): number => {
      const left = limit - surcharge;
      if (left < 0) return -1;
      const sine = left / (2 * body.reach);
      return sine < 1 ? sine * sine : Number.POSITIVE_INFINITY;
    };
    let least = 1;
    const lenient = squaredSine(surchargeAt(2));
    let worst = 0;
    const holds = (sample: number): boolean => {
      hermiteWeights((time(sampleIndex(sample)) - start) / duration, basis);
      let square = 0;
      let along = 0;
      const k = 4 * sample;
      for (let i = 0; i < 4; i++) {
        const h = basis[0] * from[i] + basis[1] * m[i] + basis[2] * end[i] + basis[3] * n[i];
        square += h * h;
        along += h * rotations[k + i];
      }
      if (!(along > 0)) return false;
      // The part of h across the true quaternion, and so the sine of half the angle between them, without cancellation.
      let across = 0;
      for (let i = 0; i < 4; i++) {
        const h = basis[0] * from[i] + basis[1] * m[i] + basis[2] * end[i] + basis[3] * n[i];
        const d = h - along * rotations[k + i];
        across += d * d;
      }
      worst = Math.max(worst, across / square);
      least = Math.min(least, square);
      return worst <= lenient;
    };
    if (low <= high && !holds((low + high) >> 1)) return undefined;
    // Coarsely first: most segments that do not hold show it there.
    for (let k = low; k <= high; k += 16) if (!holds(k)) return undefined;
    for (let k = low; k <= high; k++) if (!holds(k)) return undefined;

    // Between samples |h| is not less than this: its slope is at most `first`.
    const size = Math.sqrt(least) - (first * gap) / (2 * duration);
    if (!(size > 0.1)) return undefined;
    const surcharge = surchargeAt(size);
    const allowed = squaredSine(surcharge);
    if (worst > allowed || offBy(pose, end) > allowed) return undefined;
    return { end, fromTangent, toTangent, surcharge };
  };
}

/** Square of the sine of half the angle between the true rotation of a pose and a stored one. */
function offBy(pose: Float64Array, stored: Float64Array): number {
  let along = 0;
  let square = 0;
  for (let i = 0; i < 4; i++) {
    along += stored[i] * pose[3 + i];
    square += stored[i] * stored[i];
  }
  let across = 0;
  for (let i = 0; i < 4; i++) across += (stored[i] - along * pose[3 + i]) * (stored[i] - along * pose[3 + i]);
  return across / square;
}

/** The spline from key to key, made unit. */
function splines(values: Float32Array, keyTime: (key: number) => number): RotationKeys["played"] {
  const basis = new Float64Array(4);
  return (segment) => {
    const start = keyTime(segment);
    const duration = keyTime(segment + 1) - start;
    const p = 12 * segment;
    return (t, out) => {
      hermiteWeights((t - start) / duration, basis);
      let square = 0;
      for (let i = 0; i < 4; i++) {
        out[i] =
          basis[0] * values[p + 4 + i] +
          basis[1] * duration * values[p + 8 + i] +
          basis[2] * values[p + 16 + i] +
          basis[3] * duration * values[p + 12 + i];
        square += out[i] * out[i];
      }
      const size = Math.sqrt(square);
      for (let i = 0; i < 4; i++) out[i] /= size;
    };
  };
}
