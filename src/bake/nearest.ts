/** Which earlier take moves most like a take: for the report, over the takes made in one run. */

import type { Flight } from "../flight/flight.js";

/** Moments compared, a second; each take is held at its last pose when the other goes on. */
const SAMPLES_PER_SECOND = 60;

/** What moves: a flight, or several and what is between them. */
export type Movement = Pick<Flight, "duration" | "centerOfMass" | "orientationInto">;

export interface Nearest {
  take: number;
  /** m: the greatest distance of a point of the prop at any moment. */
  distance: number;
}

/**
 * Answers, take by take, the nearest of those it was shown before.
 *
 * @param reach of the prop, m: a point's displacement is at most that of the centre of mass plus 2·reach·sin(θ/2) for a turn by θ
 */
export function nearestFinder(reach: number): (take: number, movement: Movement) => Nearest | null {
  const earlier: { take: number; samples: Float64Array }[] = [];
  return (take, movement) => {
    const samples = sample(movement);
    let nearest: Nearest | null = null;
    for (const other of earlier) {
      const limit = nearest?.distance ?? Number.POSITIVE_INFINITY;
      const distance = greatestDistance(samples, other.samples, reach, limit);
      if (distance < limit) nearest = { take: other.take, distance };
    }
    earlier.push({ take, samples });
    return nearest;
  };
}

/** Centre of mass and orientation, seven numbers a moment. */
function sample(flight: Movement): Float64Array {
  const count = Math.ceil(flight.duration * SAMPLES_PER_SECOND) + 1;
  const samples = new Float64Array(7 * count);
  for (let i = 0; i < count; i++) {
    const t = Math.min(flight.duration, i / SAMPLES_PER_SECOND);
    samples.set(flight.centerOfMass(t), 7 * i);
    flight.orientationInto(t, samples, 7 * i + 3);
  }
  return samples;
}

/** Stops as soon as `limit` is reached: the take is then not the nearest. */
function greatestDistance(a: Float64Array, b: Float64Array, reach: number, limit: number): number {
  let greatest = 0;
  for (let i = 0; i < Math.max(a.length, b.length) && greatest < limit; i += 7) {
    const j = Math.min(i, a.length - 7);
    const k = Math.min(i, b.length - 7);
    const x = a[j] - b[k];
    const y = a[j + 1] - b[k + 1];
    const z = a[j + 2] - b[k + 2];
    greatest = Math.max(
      greatest,
      Math.sqrt(x * x + y * y + z * z) + 2 * reach * sineOfHalf(a, j + 3, b, k + 3),
    );
  }
  return greatest;
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
