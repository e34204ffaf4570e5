/** Which earlier take moves most like a take: for the report, over the takes made in one run. */

import { type Flight, fly } from "../flight/flight.js";
import type { Launch } from "../flight/launch.js";
import { PackedRows } from "../math/packed-rows.js";
import { vantageForest } from "../math/vantage-forest.js";
import type { Vec3 } from "../math/vec3.js";

/** Moments compared, a second; each take is held at its last pose when the other goes on. */
const SAMPLES_PER_SECOND = 60;
/** Numbers of a moment: the centre of mass, and the turn of the principal frame. */
const POSE = 7;
/** Indices of the moments by which takes are put in order; those that may be nearest are then compared at all. The last is any take's end, in which it stays. */
const KEPT = [0, 6, 12, 20, 30, 42, 60, Number.POSITIVE_INFINITY];
/** Takes whose points never part by more than this, m, move the same: the first of them speaks for all. */
export const SAME_MOTION = 1e-9;

/** A take's flight, or a chain's flights one after the other and the prop standing still between them: plain data, times in s. */
export interface Course {
  duration: number;
  parts: readonly { start: number; launch: Launch }[];
}

export interface Nearest {
  take: number;
  /** m: the greatest distance of a point of the prop at any moment. */
  distance: number;
}

/** What a take is compared by. */
export interface Compared {
  course: Course;
  /** `poseSamples` of it. */
  samples: Float64Array;
}

/** @param flights of a throw's take, or of a chain's, with when they start within the clip, s */
export function compared(duration: number, flights: readonly { start: number; flight: Flight }[]): Compared {
  const parts = flights.map(({ start, flight }) => ({ start, launch: flight.launch }));
  return { course: { duration, parts }, samples: sampled(duration, flights) };
}

/** Of a course alone: its flights are flown again. */
export function poseSamples({ duration, parts }: Course): Float64Array {
  return sampled(
    duration,
    parts.map(({ start, launch }) => ({ start, flight: fly(launch) })),
  );
}

/**
 * Answers, take by take, the nearest of those it was shown before; of several at one distance the earliest. It keeps about 700 bytes a take, from which
 * the flights of the few that may be nearest are flown again.
 *
 * @param reach of the prop, m: a point's displacement is at most that of the centre of mass plus 2·reach·sin(θ/2) for a turn by θ
 */
export function nearestFinder(
  reach: number,
): (take: number, course: Course, samples?: Float64Array) => Nearest | null {
  const numbers: number[] = [];
  const courses = new PackedRows();
  const poses = new PackedRows();
  const forest = vantageForest((a, b) =>
    keptDistance(poses.block(a), poses.start(a), poses.block(b), poses.start(b), reach),
  );
  return (take, course, samples = poseSamples(course)) => {
    const kept = keptPoses(samples);
    const nearest = numbers.length === 0 ? null : find(samples, kept);
    if (!nearest || nearest.distance > SAME_MOTION) {
      numbers.push(take);
      courses.push(packed(course));
      poses.push(kept);
      forest.add(numbers.length - 1);
    }
    return nearest;
  };

  function find(samples: Float64Array, kept: Float64Array): Nearest {
    const near = (index: number) => keptDistance(kept, 0, poses.block(index), poses.start(index), reach);
    const whole = (index: number, limit: number) =>
      greatestDistance(samples, poseSamples(unpacked(courses.row(index))), reach, limit);
    let best = 0;
    forest.search(near, Number.POSITIVE_INFINITY, (index, distance) => {
      best = index;
      return distance;
    });
    let distance = whole(best, Number.POSITIVE_INFINITY);
    const others: { index: number; bound: number }[] = [];
    forest.search(near, distance, (index, bound) => {
      if (index !== best) others.push({ index, bound });
      return distance;
    });
    others.sort((a, b) => a.bound - b.bound || a.index - b.index);
    for (const { index, bound } of others) {
      if (bound > distance) break;
      const other = whole(index, distance);
      if (other < distance || (other === distance && index < best)) {
        best = index;
        distance = other;
      }
    }
    return { take: numbers[best], distance };
  }
}

/** Numbers of a part of a packed course. */
const PART = 21;

function packed({ duration, parts }: Course): Float64Array {
  const row = [duration];
  for (const { start, launch } of parts) {
    const { centerOfMass, velocity, gravity, orientation, spin, moments } = launch;
    row.push(
      start,
      launch.duration,
      ...centerOfMass,
      ...velocity,
      ...gravity,
      ...orientation,
      ...spin,
      ...moments,
    );
  }
  return Float64Array.from(row);
}

function unpacked(row: Float64Array): Course {
  const parts = [];
  for (let at = 1; at < row.length; at += PART) {
    const three = (from: number): Vec3 => [row[from], row[from + 1], row[from + 2]];
    const launch: Launch = {
      duration: row[at + 1],
      centerOfMass: three(at + 2),
      velocity: three(at + 5),
      gravity: three(at + 8),
      orientation: [row[at + 11], row[at + 12], row[at + 13], row[at + 14]],
      spin: three(at + 15),
      moments: three(at + 18),
    };
    parts.push({ start: row[at], launch });
  }
  return { duration: row[0], parts };
}

function keptPoses(samples: Float64Array): Float64Array {
  const kept = new Float64Array(POSE * KEPT.length);
  KEPT.forEach((moment, i) => {
    const at = Math.min(POSE * moment, samples.length - POSE);
    kept.set(samples.subarray(at, at + POSE), POSE * i);
  });
  return kept;
}

/** Centre of mass and orientation, seven numbers a moment. */
function sampled(duration: number, flights: readonly { start: number; flight: Flight }[]): Float64Array {
  const count = Math.ceil(duration * SAMPLES_PER_SECOND) + 1;
  const samples = new Float64Array(POSE * count);
  for (let i = 0; i < count; i++) {
    const t = Math.min(duration, i / SAMPLES_PER_SECOND);
    const { start, flight } =
      flights.find((part) => t <= part.start + part.flight.duration) ?? flights[flights.length - 1];
    const time = Math.max(0, Math.min(flight.duration, t - start));
    samples.set(flight.centerOfMass(time), POSE * i);
    flight.orientationInto(time, samples, POSE * i + 3);
  }
  return samples;
}

function keptDistance(a: Float64Array, i: number, b: Float64Array, j: number, reach: number): number {
  let greatest = 0;
  for (let k = 0; k < POSE * KEPT.length; k += POSE)
    greatest = Math.max(greatest, distanceAt(a, i + k, b, j + k, reach));
  return greatest;
}

/** Stops, late moments first, as soon as `limit` is passed: the take is then not the nearest. */
function greatestDistance(a: Float64Array, b: Float64Array, reach: number, limit: number): number {
  let greatest = 0;
  for (let i = Math.max(a.length, b.length) - POSE; i >= 0 && greatest <= limit; i -= POSE)
    greatest = Math.max(
      greatest,
      distanceAt(a, Math.min(i, a.length - POSE), b, Math.min(i, b.length - POSE), reach),
    );
  return greatest;
}

function distanceAt(a: Float64Array, j: number, b: Float64Array, k: number, reach: number): number {
  const x = a[j] - b[k];
  const y = a[j + 1] - b[k + 1];
  const z = a[j + 2] - b[k + 2];
  return Math.sqrt(x * x + y * y + z * z) + 2 * reach * sineOfHalf(a, j + 3, b, k + 3);
}

/** sin(θ/2) of the turn between two unit quaternions, from their chord c = 2 sin(θ/4): exact for equal ones. */
function sineOfHalf(a: Float64Array, i: number, b: Float64Array, j: number): number {
  let same = 0;
  let opposite = 0;
  for (let k = 0; k < 4; k++) {
    const minus = a[i + k] - b[j + k];
    const plus = a[i + k] + b[j + k];
    same += minus * minus;
    opposite += plus * plus;
  }
  const chord = Math.min(same, opposite);
  return Math.sqrt(chord * Math.max(0, 1 - chord / 4));
}
