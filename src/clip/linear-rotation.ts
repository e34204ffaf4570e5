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

  const chordAt = (sample: number, c: number, s: number): number => {
    const { from, side } = circle;
    const k = 4 * sample;
    const x = c * from[0] + s * side[0] - rotations[k];
    const y = c * from[1] + s * side[1] - rotations[k + 1];
    const z = c * from[2] + s * side[2] - rotations[k + 2];
    const w = c * from[3] + s * side[3] - rotations[k + 3];
    return x * x + y * y + z * z + w * w;
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
      const middle = (low + high) >> 1;
      const there = (time(sampleIndex(middle)) - start) * speed;
      const chord = chordAt(middle, cos(there), sin(there));
      if (chord > bound) return Math.sqrt(chord / bound);
      const angle = (time(sampleIndex(low)) - start) * speed;
      let c = cos(angle);
      let s = sin(angle);
      let turn = 0;
      let cosTurn = 1;
      let sinTurn = 0;
      const early = low + ((high - low) >> 2);
      let atFirst = 0;
      for (let k = low; ; k++) {
        const chord = chordAt(k, c, s);
        if (k < early) atFirst = Math.max(atFirst, chord);
        else greatest = Math.max(greatest, chord);
        if (k === high) break;
        const way = (time(sampleIndex(k + 1)) - time(sampleIndex(k))) * speed;
        if (way !== turn) {
          turn = way;
          cosTurn = cos(turn);
          sinTurn = sin(turn);
        }
        const next = c * cosTurn - s * sinTurn;
        s = s * cosTurn + c * sinTurn;
        c = next;
      }
      if (atFirst > bound || greatest > bound) return Math.sqrt(Math.max(atFirst, greatest) / bound);
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
    stored.push(...good.stored);
    played.push(...good.played);
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
