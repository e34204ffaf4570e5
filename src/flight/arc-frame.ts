/** The vertical plane of an arc: up against gravity, ahead along the level part of the flight. */

import { cosDegrees, sinDegrees } from "../math/degrees.js";
import { between, rotate } from "../math/quat.js";
import { addScaled, dot, length, normalize, scale, subtract, type Vec3 } from "../math/vec3.js";
import type { Arc } from "./arc.js";

const Y: Vec3 = [0, 1, 0];

/** The unit vector against gravity; +Y where there is none. */
export function upOf(gravity: Vec3 | { free: Vec3 }): Vec3 {
  if ("free" in gravity) return normalize(gravity.free);
  const g = length(gravity);
  return g === 0 ? Y : [-gravity[0] / g || 0, -gravity[1] / g || 0, -gravity[2] / g || 0];
}

/** A difference of places as rise along up and level distance along the unit vector `ahead` (zero for a vertical difference). */
export function levelAndRise(from: Vec3, to: Vec3, up: Vec3): { rise: number; level: number; ahead: Vec3 } {
  const d = subtract(to, from);
  const rise = dot(d, up);
  const flat = addScaled(d, up, -rise);
  const level = length(flat);
  // What is left of a vertical difference is rounding alone.
  if (level <= 1e-15 * Math.abs(rise)) return { rise, level: 0, ahead: [0, 0, 0] };
  return { rise, level, ahead: scale(flat, 1 / level) };
}

/** The level unit vector of a heading: degrees about up from +Z towards +X (for another up than +Y, those two turned along with it). */
export function headingDirection(degrees: number, up: Vec3): Vec3 {
  const level: Vec3 = [sinDegrees(degrees), 0, cosDegrees(degrees)];
  return up[0] === 0 && up[1] === 1 && up[2] === 0 ? level : rotate(between(Y, up), level);
}

/** The arc with these components of its launch velocity. */
export function makeArc(parts: {
  ahead: Vec3;
  up: Vec3;
  levelSpeed: number;
  climbSpeed: number;
  gravity: Vec3;
  duration: number;
}): Arc {
  const velocity = addScaled(scale(parts.ahead, parts.levelSpeed), parts.up, parts.climbSpeed);
  return { velocity, duration: parts.duration, gravity: parts.gravity, apex: highestPoint(parts) };
}

/** The highest point within the flight: of the whole parabola, or an end. */
function highestPoint(parts: { climbSpeed: number; gravity: Vec3; duration: number }): Arc["apex"] {
  const g = length(parts.gravity);
  const w = parts.climbSpeed;
  if (w <= 0) return { time: 0, rise: 0 };
  if (w <= g * parts.duration) return { time: w / g, rise: (w * w) / (2 * g) };
  return { time: parts.duration, rise: parts.duration * (w - 0.5 * g * parts.duration) };
}
