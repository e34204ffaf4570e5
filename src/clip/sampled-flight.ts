import type { Flight } from "../flight/flight.js";
import { conjugate, type Quat } from "../math/quat.js";
import { length, type Vec3 } from "../math/vec3.js";
import { endShift } from "./least-tolerance.js";

/** What a clip must know of the prop. */
export interface Body {
  /** Model frame, m. */
  centerOfMass: Vec3;
  /** Turns x, y, z onto the principal axes, model frame. */
  axes: Quat;
  /** Furthest point from the centre of mass, m. */
  reach: number;
}

/**
 * A flight looked at on a grid of times k·`step`, a power of two, which float32 holds exactly; the last is the duration
 * rounded to float32, where the pose is that at the end of the flight. Keys may stand at every time of the grid, the
 * motion is compared at every `STRIDE`-th (the samples) and at the keys; `surcharge` bounds what may happen in between.
 */
export interface SampledFlight {
  body: Body;
  /** s */
  step: number;
  /** Index of the last time. */
  last: number;
  time(index: number): number;
  /** Number of samples. */
  samples: number;
  /** Grid index of a sample. */
  sampleIndex(sample: number): number;
  /** Centre of mass at each sample, 3 numbers each, world frame, m. */
  positions: Float64Array;
  /** Turns the model from as modelled; 4 numbers a sample, unit, continuous in sign. */
  rotations: Float64Array;
  /** The same two at any time of the grid, 3 + 4 numbers. */
  poseInto(index: number, out: Float64Array): void;
  /** How much further any point can be from the true motion between times where both were compared than at those, m. */
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
 * Samples `flight` so densely that the surcharge is about 2 % of `toleranceMetres` or less (up to 2²⁰ samples). Throws a
 * RangeError for a flight that lasts no time.
 *
 * The surcharge: a twice differentiable vector function is no further from its chord than M·h²/8 on an interval of length h,
 * M a bound of its second derivative (linear interpolation's error, e.g. Davis, Interpolation and Approximation, 1963,
 * §3.1), and a chord is no longer anywhere than at its longer end. Here the function is the displacement of any one
 * point of the prop: M = |g| + r(|ω|² + |dω/dt|) from the true motion (r the reach) and R·ω² from slerp, R the furthest
 * point's distance from the model's origin. The translation's lerp adds nothing.
 */
export function sampleFlight(flight: Flight, body: Body, toleranceMetres: number): SampledFlight {
  const { duration, launch, greatestRate } = flight;
  const end = Math.fround(duration);
  if (end === 0) throw new RangeError(`a flight of ${duration} s cannot be a clip: it must last some time`);
  const fromOrigin = body.reach + length(body.centerOfMass);
  const trueBend =
    length(launch.gravity) + body.reach * (greatestRate * greatestRate + flight.greatestAngularAcceleration);
  const bendOnGrid = trueBend + fromOrigin * greatestRate * greatestRate;

  const widest = Math.min(
    Math.sqrt((8 * SURCHARGE_SHARE * toleranceMetres) / bendOnGrid),
    LARGEST_TURN / greatestRate,
    end / 4,
  );
  const step = powerOfTwoBelow(Math.max(widest, (2 * end) / MOST_SAMPLES)) / STRIDE;
  // The last interval is half a step to one and a half.
  const last = Math.max(1, Math.round(end / step));
  const time = (index: number) => (index < last ? index * step : end);
  const trueTime = (index: number) => (index < last ? index * step : duration);
  const samples = Math.ceil(last / STRIDE) + 1;
  const sampleIndex = (sample: number) => Math.min(sample * STRIDE, last);

  const positions = new Float64Array(3 * samples);
  const rotations = new Float64Array(4 * samples);
  const fromModel = conjugate(body.axes);
  for (let k = 0; k < samples; k++) {
    const t = trueTime(sampleIndex(k));
    const c = flight.centerOfMass(t);
    positions[3 * k] = c[0];
    positions[3 * k + 1] = c[1];
    positions[3 * k + 2] = c[2];
    rotationInto(flight, fromModel, t, rotations, 4 * k, 4 * Math.max(0, k - 1), rotations);
  }

  const poseInto = (index: number, out: Float64Array) => {
    const t = trueTime(index);
    const c = flight.centerOfMass(t);
    out[0] = c[0];
    out[1] = c[1];
    out[2] = c[2];
    const nearest = Math.min(samples - 1, Math.round(index / STRIDE));
    rotationInto(flight, fromModel, t, out, 3, 4 * nearest, rotations);
  };

  // In the last interval the true motion is stretched from the flight's own end to the float32 one …
  const stretch = 1 + Math.abs(end - duration) / (step / 2);
  const playedRate = greatestRate + ROUNDED_TURN / (step / 2);
  const bend = trueBend * stretch * stretch + fromOrigin * playedRate * playedRate;
  const interval = (STRIDE + 0.5) * step;
  // … which moves no point by more than `endShift`.
  const surcharge = (bend * interval * interval) / 8 + endShift(flight, body);

  return { body, step, last, time, samples, sampleIndex, positions, rotations, poseInto, surcharge };
}

/** Rotation of the model at time `t`, on the side of the hypersphere of the quaternion in `near` at `nearOffset`. */
function rotationInto(
  flight: Flight,
  fromModel: Quat,
  t: number,
  out: Float64Array,
  offset: number,
  nearOffset: number,
  near: Float64Array,
): void {
  flight.orientationInto(t, out, offset);
  const x = out[offset];
  const y = out[offset + 1];
  const z = out[offset + 2];
  const w = out[offset + 3];
  const bx = fromModel[0];
  const by = fromModel[1];
  const bz = fromModel[2];
  const bw = fromModel[3];
  const mx = w * bx + x * bw + y * bz - z * by;
  const my = w * by - x * bz + y * bw + z * bx;
  const mz = w * bz + x * by - y * bx + z * bw;
  const mw = w * bw - x * bx - y * by - z * bz;
  const side =
    near[nearOffset] * mx + near[nearOffset + 1] * my + near[nearOffset + 2] * mz + near[nearOffset + 3] * mw;
  const f = (side < 0 ? -1 : 1) / Math.sqrt(mx * mx + my * my + mz * mz + mw * mw);
  out[offset] = mx * f;
  out[offset + 1] = my * f;
  out[offset + 2] = mz * f;
  out[offset + 3] = mw * f;
}

/** The largest power of two that is not above `x`. */
function powerOfTwoBelow(x: number): number {
  let power = 1;
  while (power > x) power /= 2;
  while (2 * power <= x) power *= 2;
  return power;
}
