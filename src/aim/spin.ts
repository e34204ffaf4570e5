/** The angular velocity at release that a wished spin stands for. */

import { cosDegrees, sinDegrees } from "../math/degrees.js";
import { addScaled, cross, dot, length, normalize, perpendicular, scale, type Vec3 } from "../math/vec3.js";

const TURN = 2 * Math.PI;

export interface SpinWish {
  /** Unit vector in the principal frame (x, y, z = long, middle, short): the axis a clean spin would turn about. */
  axis: Vec3;
  /** Turns per second about the angular momentum L; right-hand rule, negative for the other way. */
  turnsPerSecond: number;
  /** Degrees by which L is tilted from that of the clean spin. */
  wobble: number;
  /** Degrees round the axis at which the tilt lies, from `wobbleReference`, right-hand rule. */
  phase: number;
}

/**
 * Angular velocity at release, rad/s, in the principal frame.
 *
 * A free body turns about L at 2E/|L| (the mean of ω·L/|L|, constant). With l the direction of L in the body and J the inverse inertia,
 * E = |L|² l·Jl / 2, so |L| = 2π · turns per second / (l·Jl) and ω = J L (Landau & Lifshitz, Mechanics, §32–36).
 *
 * @param moments principal moments about x, y, z of the frame, kg m²
 */
export function spinAtRelease(wish: SpinWish, moments: Vec3): Vec3 {
  const clean = normalize(timesDiagonal(wish.axis, moments));
  const l = wish.wobble === 0 ? clean : tilt(clean, wish);
  const jl = overDiagonal(l, moments);
  return scale(jl, (TURN * wish.turnsPerSecond) / dot(l, jl));
}

/** Wobble where none is stated: a clean spin about the middle axis of a body with three unlike moments exists on paper only. */
export function defaultWobble(axis: Vec3, moments: Vec3): number {
  const unlike = moments[1] > moments[0] * 1.01 && moments[2] > moments[1] * 1.01;
  const alongMiddle = Math.abs(axis[1]) >= cosDegrees(1) * length(axis);
  return unlike && alongMiddle ? 3 : 0;
}

/**
 * The principal axis towards which the tilt lies at phase 0: the next of long, middle, short, long for an axis within 1° of one of them, else the
 * one most square to it (the first of equals).
 */
export function wobbleReference(axis: Vec3): Vec3 {
  const squareness = [Math.abs(axis[0]), Math.abs(axis[1]), Math.abs(axis[2])];
  const own = squareness.findIndex((component) => component >= cosDegrees(1));
  const chosen = own >= 0 ? (own + 1) % 3 : squareness.indexOf(Math.min(...squareness));
  return [chosen === 0 ? 1 : 0, chosen === 1 ? 1 : 0, chosen === 2 ? 1 : 0];
}

function tilt(clean: Vec3, wish: SpinWish): Vec3 {
  const reference = wobbleReference(wish.axis);
  const square = addScaled(reference, clean, -dot(reference, clean));
  const towards = length(square) > 1e-9 ? normalize(square) : perpendicular(clean);
  const beside = cross(clean, towards);
  const side = addScaled(scale(towards, cosDegrees(wish.phase)), beside, sinDegrees(wish.phase));
  return normalize(addScaled(scale(clean, cosDegrees(wish.wobble)), side, sinDegrees(wish.wobble)));
}

const timesDiagonal = (v: Vec3, d: Vec3): Vec3 => [v[0] * d[0], v[1] * d[1], v[2] * d[2]];
const overDiagonal = (v: Vec3, d: Vec3): Vec3 => [v[0] / d[0], v[1] / d[1], v[2] / d[2]];
