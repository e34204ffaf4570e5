/**
 * Every set of conditions that fixes the flight of the centre of mass: a parabola x(t) = from + v t + g t²/2 of given length in time.
 *
 * Either the mark is known and one condition fixes the time (arc-to-mark.ts), or the launch is (arc-launch.ts). With `gravity: {free}` the
 * strength of gravity is one unknown more and takes one condition more.
 */

import { addScaled, type Vec3 } from "../math/vec3.js";
import { checkRequest } from "./arc-conditions.js";
import { launchArc } from "./arc-launch.js";
import { arcToMark } from "./arc-to-mark.js";

/** What is known of the flight of the centre of mass; world frame, metres, seconds, degrees. Names are the throw file's. */
export interface ArcRequest {
  /** Place of the centre of mass at release. */
  from: Vec3;
  /** Its place at the end; leave out where the launch is given. */
  to?: Vec3;
  /** m/s²; or only the unit vector up, against which gravity's strength is solved. Without gravity, up is +Y. */
  gravity: Vec3 | { free: Vec3 };
  /** Flight time, s. */
  after?: number;
  /** Greatest rise above `from` within the flight, m. */
  apex?: number;
  /** The centre of mass is at this point's height where it is abreast of it: as far along the flight's heading. */
  through?: Vec3;
  /** Of the launch, m/s. */
  speed?: number;
  /** Of the launch, degrees above level, -90 to 90. */
  elevation?: number;
  /** Of the launch, degrees about up from +Z towards +X. */
  heading?: number;
  /** Of the launch, m/s. */
  velocity?: Vec3;
  /** Where two arcs fit: the one launched lower (which is met earlier where both go straight up), or the other. Default "low". */
  branch?: "low" | "high";
  /** A launch that ends at a touch nobody knows yet (`arrive.floor`), instead of `after`: the duration is Infinity until `endArc`. */
  openEnd?: boolean;
}

/** A flight of the centre of mass. */
export interface Arc {
  /** At release, world, m/s. */
  velocity: Vec3;
  /** s */
  duration: number;
  /** World, m/s². */
  gravity: Vec3;
  /** The highest point within the flight: seconds from release, metres above the place of release. */
  apex: { time: number; rise: number };
}

/**
 * Solves the flight of the centre of mass; closed forms of elementary ballistics (projectile motion without drag, e.g. Goldstein, Poole & Safko,
 * Classical Mechanics, 3rd ed., chapter 1), each in its stable form.
 *
 * @throws RequestError with the throw file's path of a condition that cannot hold, and the nearest that could; for too few or too many
 *   conditions; ["gravity"] where a solved gravity would not be positive.
 */
export function solveArc(request: ArcRequest): Arc {
  checkRequest(request);
  return request.to === undefined ? launchArc(request) : arcToMark(request, request.to);
}

/** Place of the centre of mass `t` seconds after release. */
export const arcPosition = (from: Vec3, arc: Arc, t: number): Vec3 =>
  addScaled(addScaled(from, arc.velocity, t), arc.gravity, 0.5 * t * t);

/** Velocity of the centre of mass `t` seconds after release, m/s. */
export const arcVelocity = (arc: Arc, t: number): Vec3 => addScaled(arc.velocity, arc.gravity, t);
