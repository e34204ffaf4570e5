import type { Flight } from "../flight/flight.js";
import { conjugate, type Quat } from "../math/quat.js";
import type { Body } from "./body.js";
import { STRIDE, type TimeGrid, timeGrid } from "./time-grid.js";

/** A flight looked at on its time grid: every `STRIDE`-th pose is kept, those between are worked out when asked for. */
export interface SampledFlight extends TimeGrid {
  body: Body;
  /** Of the grid, s. */
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
}

/** Samples `flight` on the grid for `toleranceMetres`. Throws a RangeError for a flight that lasts no time. */
export function sampleFlight(flight: Flight, body: Body, toleranceMetres: number): SampledFlight {
  const { duration } = flight;
  const grid = timeGrid(flight, body, toleranceMetres);
  const { step, last } = grid;
  const end = Math.fround(duration);
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

  return { ...grid, body, time, samples, sampleIndex, positions, rotations, poseInto };
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
