import { cos, sin } from "../math/elementary.js";
import { GreatCircle } from "./great-circle.js";
import { longestSegments } from "./longest-segments.js";
import type { SampledFlight } from "./sampled-flight.js";
import { STRIDE } from "./time-grid.js";

/** Rotation keys on the times of a flight's grid. */
export interface RotationKeys {
  /** Grid index of each key. */
  indices: number[];
  /** As a player has them: rounded to float32, then made unit; 4 numbers a key. */
  played: Float64Array;
  /** As stored. */
  values: Float32Array;
}

/** Cosine of half the largest step between keys: just under 90°, since some players take the chord for the arc. */
const LEAST_DOT = 0.7072;

/**
 * The fewest rotation keys found with which slerp never moves a point within the reach further than `limit` m from where
 * it should be, relative to the centre of mass, at any sample or key; undefined where not even a key on every time of
 * the grid does it. Each key is the true rotation, rounded to float32.
 */
export function rotationKeys(flight: SampledFlight, limit: number): RotationKeys | undefined {
  const { rotations, step, time, last, samples } = flight;
  const bound = chordBound(limit, flight.body.reach);
  const circle = new GreatCircle();
  const pose = new Float64Array(7);
  const first = new Float64Array(4);
  const second = new Float64Array(4);
  let firstIndex = -1;

  const chordAt = (sample: number, c: number, s: number): number => {
    const { from, side } = circle;
    const k = 4 * sample;
    const x = c * from[0] + s * side[0] - rotations[k];
    const y = c * from[1] + s * side[1] - rotations[k + 1];
    const z = c * from[2] + s * side[2] - rotations[k + 2];
    const w = c * from[3] + s * side[3] - rotations[k + 3];
    return x * x + y * y + z * z + w * w;
  };

  const fits = (a: number, b: number): boolean => {
    if (a !== firstIndex) {
      flight.poseInto(a, pose);
      roundedInto(pose, 3, first);
      firstIndex = a;
    }
    flight.poseInto(b, pose);
    roundedInto(pose, 3, second);
    if (squaredChord(pose, 3, second, 0) > bound) return false;
    if (circle.set(first, 0, second, 0) < LEAST_DOT) return false;

    const low = Math.floor(a / STRIDE) + 1;
    const high = b === last ? samples - 2 : Math.ceil(b / STRIDE) - 1;
    if (low > high) return true;
    const start = time(a);
    const speed = circle.angle / (time(b) - start);
    // Nearly always the error is greatest about the middle, and most segments tried are too long.
    const middle = (low + high) >> 1;
    const there = (middle * STRIDE * step - start) * speed;
    if (chordAt(middle, cos(there), sin(there)) > bound) return false;

    const angle = (low * STRIDE * step - start) * speed;
    const turn = STRIDE * step * speed;
    const cosTurn = cos(turn);
    const sinTurn = sin(turn);
    let c = cos(angle);
    let s = sin(angle);
    for (let k = low; k <= high; k++) {
      if (chordAt(k, c, s) > bound) return false;
      const next = c * cosTurn - s * sinTurn;
      s = s * cosTurn + c * sinTurn;
      c = next;
    }
    return true;
  };

  const indices = longestSegments(last, fits);
  if (!indices) return undefined;
  const played = new Float64Array(4 * indices.length);
  const values = new Float32Array(4 * indices.length);
  indices.forEach((index, key) => {
    flight.poseInto(index, pose);
    roundedInto(pose, 3, second);
    played.set(second, 4 * key);
    values.set(pose.subarray(3), 4 * key);
  });
  return { indices, played, values };
}

/**
 * Square of the chord |q − q′| between unit quaternions at which the points at distance `reach` from the axis of the rotation
 * between them are `limit` m apart: 2·reach·sin(θ/2) = limit, |q − q′| = 2 sin(θ/4).
 */
function chordBound(limit: number, reach: number): number {
  const s = limit / (2 * reach);
  // Also where the reach is 0: any rotation will do.
  if (!(s < 1)) return Number.POSITIVE_INFINITY;
  return (2 * s * s) / (1 + Math.sqrt(1 - s * s));
}

function squaredChord(a: Float64Array, aOffset: number, b: Float64Array, bOffset: number): number {
  let sum = 0;
  for (let i = 0; i < 4; i++) {
    const d = a[aOffset + i] - b[bOffset + i];
    sum += d * d;
  }
  return sum;
}

/** The quaternion in `q` at `offset` as it comes back from a file: rounded to float32, then made unit. */
function roundedInto(q: Float64Array, offset: number, out: Float64Array): void {
  let square = 0;
  for (let i = 0; i < 4; i++) {
    out[i] = Math.fround(q[offset + i]);
    square += out[i] * out[i];
  }
  const size = Math.sqrt(square);
  for (let i = 0; i < 4; i++) out[i] /= size;
}
