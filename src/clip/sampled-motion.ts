import type { Body } from "./body.js";

/**
 * A motion looked at on a grid of times: keys may stand at every one of them; the motion is compared with what is played
 * at every `stride`-th, at the last and at the keys.
 */
export interface SampledMotion {
  body: Body;
  /** Whether the centre of mass is on a parabola. */
  flying: boolean;
  /** Index of the last time. */
  last: number;
  stride: number;
  /** Of the grid, s; float32 holds every time at which a key is set. */
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
  /** Longest time between neighbours of the times compared, s. */
  interval: number;
  /** What the true motion's own bend can add, between the times compared, to the displacement of any point at them, m. */
  surcharge: number;
}

/**
 * What a played motion's bend can add to the displacement, m, on intervals of at most `interval` s: a twice differentiable vector
 * function is no further from its chord than M·h²/8, M a bound of its second derivative (linear interpolation's error,
 * e.g. Davis, Interpolation and Approximation, 1963, §3.1), and a chord is no longer anywhere than at its longer end. The
 * function is the displacement of any one point of the prop; the true and the played motion add their shares of M.
 */
export const bendSurcharge = (bend: number, interval: number): number => (bend * interval * interval) / 8;
