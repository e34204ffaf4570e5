import { acos, cos, sin } from "../math/elementary.js";
import { rotationEndFitter } from "./fit-rotation.js";
import { GreatCircle } from "./great-circle.js";
import { longestSegments, longestWithin } from "./longest-segments.js";
import { type RotationKeys, samplesBetween, squaredChord, squaredChordAt } from "./rotation-keys.js";
import { bendSurcharge, type SampledMotion } from "./sampled-motion.js";
import { slerps } from "./slerps.js";
import type { RotationStore } from "./store-rotation.js";
import { fromOrigin } from "./time-grid.js";

/** Cosine of half the largest step between keys: just under 90°, since some players take the chord for the arc. */
const LEAST_DOT = 0.7072;
const LARGEST_ANGLE = acos(LEAST_DOT);
const BEYOND = 1.001;

/**
 * Few rotation keys with which slerp never moves a point within the reach further than `limit` m from where it should be,
 * relative to the centre of mass, at or between the times compared; undefined where not even a key on every time of the
 * grid does it. The first and the last key are the true rotation as `store` rounds it.
 *
 * With `offCurve` the others lie beside the true curve: each segment starts where the one before ended, and ends where its greatest
 * error is least. So a chord runs outside the curve at its ends and inside about its middle, and can be up to √2 longer
 * than one between points of the curve.
 */
export function linearRotationKeys(
  motion: SampledMotion,
  limit: number,
  store: RotationStore,
  offCurve: boolean,
): RotationKeys | undefined {
  const { body, rotations, time, last, sampleIndex, interval } = motion;
  const far = fromOrigin(body);
  const scaling = 2 * store.lengthError * far;
  const circle = new GreatCircle();
  const fitEnd = rotationEndFitter(motion);
  const pose = new Float64Array(7);
  const key = new Float64Array(4);
  const first = new Float64Array(4);
  const second = new Float64Array(4);
  // The last segment that did fit.
  const good = { stored: new Float64Array(4), played: new Float64Array(4), surcharge: 0 };
  const stored: number[] = [];
  const played: number[] = [];
  const surcharges: number[] = [];

  /** Square of the greatest chord at the samples `low` to `high`, at least one. */
  const greatestChord = (start: number, speed: number, low: number, high: number): number => {
    const { from, side } = circle;
    const f0 = from[0];
    const f1 = from[1];
    const f2 = from[2];
    const f3 = from[3];
    const s0 = side[0];
    const s1 = side[1];
    const s2 = side[2];
    const s3 = side[3];
    let t = time(sampleIndex(low));
    let c = cos((t - start) * speed);
    let s = sin((t - start) * speed);
    let way = 0;
    let cosWay = 1;
    let sinWay = 0;
    let greatest = 0;
    for (let k = low; ; k++) {
      const x = c * f0 + s * s0 - rotations[4 * k];
      const y = c * f1 + s * s1 - rotations[4 * k + 1];
      const z = c * f2 + s * s2 - rotations[4 * k + 2];
      const w = c * f3 + s * s3 - rotations[4 * k + 3];
      const square = x * x + y * y + z * z + w * w;
      if (square > greatest) greatest = square;
      if (k === high) return greatest;
      const next = time(sampleIndex(k + 1));
      if (next - t !== way) {
        way = next - t;
        cosWay = cos(way * speed);
        sinWay = sin(way * speed);
      }
      t = next;
      const turned = c * cosWay - s * sinWay;
      s = s * cosWay + c * sinWay;
      c = turned;
    }
  };

  /**
   * Greatest chord, as a part of what is allowed; the middle's alone where that is too great. Where the segment fits, its first
   * quarter is left out: the error with which the key before starts it says nothing of its length.
   */
  const error = (a: number, b: number): number => {
    const start = time(a);
    const duration = time(b) - start;
    const { low, high } = samplesBetween(motion, a, b);
    motion.poseInto(b, pose);
    for (let i = 0; i < 4; i++) second[i] = pose[3 + i];
    if (circle.set(first, 0, second, 0) < LEAST_DOT) return Math.max(squaredStep(circle.angle), BEYOND);
    if (offCurve && b < last && b > a + 1 && low <= high) fitEnd(circle, a, b, low, high, second);
    store.store(second, 0, key, second);
    if (circle.set(first, 0, second, 0) < LEAST_DOT) return Math.max(squaredStep(circle.angle), BEYOND);

    const speed = circle.angle / duration;
    const surcharge = bendSurcharge(far * 4 * speed * speed, Math.min(interval, duration)) + scaling;
    const bound = squaredChordAt(limit - surcharge, body.reach);
    if (bound < 0) return Number.POSITIVE_INFINITY;
    let greatest = squaredChord(pose, 3, second, 0);
    if (greatest > bound) return Math.sqrt(greatest / bound);
    if (low <= high) {
      // Nearly always the error is great about the middle, and many segments tried are too long.
      const middle = greatestChord(start, speed, (low + high) >> 1, (low + high) >> 1);
      if (middle > bound) return Math.sqrt(middle / bound);
      const early = low + ((high - low) >> 2);
      greatest = Math.max(greatest, greatestChord(start, speed, early, high));
      if (greatest > bound) return Math.sqrt(greatest / bound);
      if (early > low) {
        const atFirst = greatestChord(start, speed, low, early - 1);
        if (atFirst > bound) return Math.sqrt(atFirst / bound);
      }
    }
    good.stored.set(key);
    good.played.set(second);
    good.surcharge = surcharge;
    return Math.max(bound > 0 ? Math.sqrt(greatest / bound) : 0, fullness(circle.angle));
  };

  motion.poseInto(0, pose);
  store.store(pose, 3, key, first);
  if (squaredChord(pose, 3, first, 0) > squaredChordAt(limit - scaling, body.reach)) return undefined;
  stored.push(...key);
  played.push(...first);
  const taken = (): void => {
    first.set(good.played);
    for (let i = 0; i < 4; i++) {
      stored.push(good.stored[i]);
      played.push(good.played[i]);
    }
    surcharges.push(good.surcharge);
  };
  const indices = offCurve
    ? longestWithin(last, error, taken)
    : longestSegments(last, (a, b) => error(a, b) <= 1, taken);
  if (!indices) return undefined;
  const values = store.create(stored.length);
  values.set(stored);
  return {
    indices,
    interpolation: "LINEAR",
    values,
    surcharges,
    played: slerps(Float64Array.from(played), (k) => time(indices[k])).played,
  };
}

/** Square of a step of half the angle `angle`, as a part of the greatest. */
const squaredStep = (angle: number): number => (angle * angle) / (LARGEST_ANGLE * LARGEST_ANGLE);

/** The 16th power of a step of half the angle `angle`, likewise, 1 at most: near 1 only where hardly a longer one is allowed. */
function fullness(angle: number): number {
  const square = squaredStep(angle);
  const fourth = square * square;
  return Math.min(1, fourth * fourth * fourth * fourth);
}
