import type { Flight } from "../flight/flight.js";
import { length } from "../math/vec3.js";
import type { Body } from "./body.js";
import { bendSurcharge } from "./sampled-motion.js";

/**
 * Times k·`step`, a power of two or three times one, which float32 holds exactly; the last is the duration rounded to float32 and stands
 * for the flight's own end. Keys may stand at every time, the motion is compared at every `STRIDE`-th and at the keys.
 */
export interface TimeGrid {
  /** s */
  step: number;
  /** Index of the last time. */
  last: number;
  /** Longest time between neighbours of the times compared, s. */
  interval: number;
  /** How much the true motion's bend can add between times compared, and the rounding of its end, m. */
  surcharge: number;
}

/** Times of the grid from one sample to the next: keys are placed this much finer than the motion is compared. */
export const STRIDE = 8;
/** Greatest part of the tolerance that goes to the surcharge; each percent costs half a percent of keys. */
const SURCHARGE_SHARE = 0.018;
/** Samples a flight may have at most: 60 MB. Where it needs more the surcharge grows. */
const MOST_SAMPLES = 1 << 20;
/** Radians the prop may turn from one sample to the next, so that the quaternion's sign can be followed. */
const LARGEST_TURN = 1;

/**
 * A grid so fine that its surcharge and that of slerp along the true rotation (M = R·ω², R the furthest point's distance from
 * the model's origin; the translation's lerp adds nothing) are about 2 % of `toleranceMetres` or less, unless that takes
 * over 2²⁰ samples. Throws a RangeError for a flight that lasts no time.
 */
export function timeGrid(flight: Flight, body: Body, toleranceMetres: number): TimeGrid {
  const { duration, greatestRate } = flight;
  const end = Math.fround(duration);
  if (end === 0) throw new RangeError(`a flight of ${duration} s cannot be a clip: it must last some time`);
  const bend = trueBend(flight, body);
  const playedBend = fromOrigin(body) * greatestRate * greatestRate;

  const widest = Math.min(
    Math.sqrt((8 * SURCHARGE_SHARE * toleranceMetres) / (bend + playedBend)),
    LARGEST_TURN / greatestRate,
    end / 4,
  );
  const step = roundBelow(Math.max(widest, (2 * end) / MOST_SAMPLES)) / STRIDE;

  // In the last interval the true motion is stretched from the flight's own end to the float32 one …
  const stretch = 1 + Math.abs(end - duration) / (step / 2);
  const interval = (STRIDE + 0.5) * step;
  const surcharge = bendSurcharge(bend * stretch * stretch, interval) + endShift(flight, body);
  // The last step is half a step to one and a half.
  return { step, last: Math.round(end / step), interval, surcharge };
}

/** m/s²: never exceeded by the acceleration of any point of the prop, |g| + r(|ω|² + |dω/dt|), r the reach. */
export const trueBend = (
  { launch, greatestRate, greatestAngularAcceleration }: Flight,
  { reach }: Body,
): number => length(launch.gravity) + reach * (greatestRate * greatestRate + greatestAngularAcceleration);

/** m: distance of the furthest point from the model's origin, at most. */
export const fromOrigin = (body: Body): number => body.reach + length(body.centerOfMass);

/** m: how far any point can get in the time by which the flight's duration differs from its float32 value. */
export function endShift(flight: Flight, body: Body): number {
  const { duration, greatestRate } = flight;
  // The speed of the centre of mass is a convex function of time: greatest at an end.
  const speed = Math.max(length(flight.velocity(0)), length(flight.velocity(duration)));
  return (speed + body.reach * greatestRate) * Math.abs(Math.fround(duration) - duration);
}

/** The largest power of two, or three times one, that is not above `x`. */
function roundBelow(x: number): number {
  let power = 1;
  while (power > x) power /= 2;
  while (2 * power <= x) power *= 2;
  return 1.5 * power <= x ? 1.5 * power : power;
}
