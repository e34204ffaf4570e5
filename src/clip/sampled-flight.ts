import type { Flight } from "../flight/flight.js";
import { conjugate, normalize, type Quat } from "../math/quat.js";
import type { Body } from "./body.js";
import type { SampledMotion } from "./sampled-motion.js";
import { STRIDE, timeGrid } from "./time-grid.js";

/** A flight on its time grid: the samples' poses are kept, those between are worked out when asked for. */
export interface SampledFlight extends SampledMotion {
  /** From one time of the grid to the next, s. */
  step: number;
}

/** Samples `flight` on the grid for `toleranceMetres`. Throws a RangeError for a flight that lasts no time. */
export function sampleFlight(flight: Flight, body: Body, toleranceMetres: number): SampledFlight {
  const grid = timeGrid(flight, body, toleranceMetres);
  const time = (index: number) => index * grid.step;
  return { ...grid, ...sampleOn(flight, body, { ...grid, stride: STRIDE, time }) };
}

/**
 * Samples `flight` on times of any kind; the last is always the duration rounded to float32 and stands for the flight's own end.
 *
 * @param grid `time` is not asked for the last; the prop turns by a radian at most from sample to sample
 */
export function sampleOn(
  flight: Flight,
  body: Body,
  grid: Pick<SampledMotion, "last" | "stride" | "time" | "interval" | "surcharge">,
): SampledMotion {
  const { duration } = flight;
  const { last, stride, interval, surcharge } = grid;
  const end = Math.fround(duration);
  const time = (index: number) => (index < last ? grid.time(index) : end);
  const trueTime = (index: number) => (index < last ? grid.time(index) : duration);
  const samples = Math.ceil(last / stride) + 1;
  const sampleIndex = (sample: number) => Math.min(sample * stride, last);

  const positions = new Float64Array(3 * samples);
  const rotations = new Float64Array(4 * samples);
  const fromModel = conjugate(normalize(body.axes));
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
    const nearest = Math.min(samples - 1, Math.round(index / stride));
    rotationInto(flight, fromModel, t, out, 3, 4 * nearest, rotations);
  };

  return {
    body,
    flying: true,
    last,
    stride,
    interval,
    surcharge,
    time,
    samples,
    sampleIndex,
    positions,
    rotations,
    poseInto,
  };
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
  // Unit as its factors are.
  const f = side < 0 ? -1 : 1;
  out[offset] = mx * f;
  out[offset + 1] = my * f;
  out[offset + 2] = mz * f;
  out[offset + 3] = mw * f;
}
