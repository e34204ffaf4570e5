import type { Flight } from "../flight/flight.js";
import { length } from "../math/vec3.js";
import type { Body } from "./body.js";

/**
 * Times k·`step`, a power of two, which float32 holds exactly; the last is the duration rounded to float32 and stands
 * for the flight's own end. Keys may stand at every time, the motion is compared at every `STRIDE`-th and at the keys.
 */
export interface TimeGrid {
  /** s */
  step: number;
  /** Index of the last time. */
  last: number;
  /** How much further any point can be from the true motion between times where it was compared than at those, m. */
  surcharge: number;
}

/** Times of the grid from one sample to the next: keys are placed this much finer than the motion is compared. */
export const STRIDE = 8;
/** Greatest part of the tolerance that goes to the surcharge; each percent costs half a percent of keys. */
const SURCHARGE_SHARE = 0.02;
/** Samples a flight may have at most: 60 MB. Where it needs more the surcharge grows. */
const MOST_SAMPLES = 1 << 20;
/** Radians the prop may turn from one sample to the next, so that the quaternion's sign can be followed. */
const LARGEST_TURN = 1;
/** Radians by which rounding both ends to float32 can lengthen a step of the rotation. */
const ROUNDED_TURN = 5e-7;

/**
 * A grid so fine that the surcharge is about 2 % of `toleranceMetres` or less, unless that takes over 2²⁰ samples. Throws
 * a RangeError for a flight that lasts no time.
 *
 * The surcharge: a twice differentiable vector function is no further from its chord than M·h²/8 on an interval of length h,
 * M a bound of its second derivative (linear interpolation's error, e.g. Davis, Interpolation and Approximation, 1963,
 * §3.1), and a chord is no longer anywhere than at its longer end. Here the function is the displacement of any one
 * point of the prop: M = |g| + r(|ω|² + |dω/dt|) from the true motion (r the reach) and R·ω² from slerp, R the furthest
 * point's distance from the model's origin. The translation's lerp adds nothing.
 */
export function timeGrid(flight: Flight, body: Body, toleranceMetres: number): TimeGrid {
  const { duration, launch, greatestRate } = flight;
  const end = Math.fround(duration);
  if (end === 0) throw new RangeError(`a flight of ${duration} s cannot be a clip: it must last some time`);
  const fromOrigin = body.reach + length(body.centerOfMass);
  const trueBend =
    length(launch.gravity) + body.reach * (greatestRate * greatestRate + flight.greatestAngularAcceleration);
  const playedBend = fromOrigin * greatestRate * greatestRate;

  const widest = Math.min(
    Math.sqrt((8 * SURCHARGE_SHARE * toleranceMetres) / (trueBend + playedBend)),
    LARGEST_TURN / greatestRate,
    end / 4,
  );
  const step = powerOfTwoBelow(Math.max(widest, (2 * end) / MOST_SAMPLES)) / STRIDE;

  // In the last interval the true motion is stretched from the flight's own end to the float32 one …
  const stretch = 1 + Math.abs(end - duration) / (step / 2);
  const roundedRate = greatestRate + ROUNDED_TURN / (step / 2);
  const bend = trueBend * stretch * stretch + fromOrigin * roundedRate * roundedRate;
  const interval = (STRIDE + 0.5) * step;
  // … which moves no point by more than `endShift`.
  const surcharge = (bend * interval * interval) / 8 + endShift(flight, body);
  // The last step is half a step to one and a half.
  return { step, last: Math.round(end / step), surcharge };
}

/** m: how far any point can get in the time by which the flight's duration differs from its float32 value. */
export function endShift(flight: Flight, body: Body): number {
  const { duration, greatestRate } = flight;
  // The speed of the centre of mass is a convex function of time: greatest at an end.
  const speed = Math.max(length(flight.velocity(0)), length(flight.velocity(duration)));
  return (speed + body.reach * greatestRate) * Math.abs(Math.fround(duration) - duration);
}

/** The largest power of two that is not above `x`. */
function powerOfTwoBelow(x: number): number {
  let power = 1;
  while (power > x) power /= 2;
  while (2 * power <= x) power *= 2;
  return power;
}
