/** How long a flying body surely stays on one side of a plane: the step of conservative advancement. */

import { conjugate, multiply, type Quat, rotateBack } from "../math/quat.js";
import { addScaled, cross, dot, length, type Vec3 } from "../math/vec3.js";
import type { Support } from "../prop/support.js";
import type { Flight } from "./flight.js";

/** A prop in flight. */
export interface FlyingBody {
  flight: Flight;
  support: Support;
  /** Turns x, y, z onto the principal axes in the model's frame. */
  axes: Quat;
  /** No point is further than this from the centre of mass, m. */
  reach: number;
}

/** The side of a plane on which normal·x ≥ offset; world frame, the normal of unit length, the offset in metres. */
export interface Side {
  normal: Vec3;
  offset: number;
}

/** A body and a plane at one moment. */
export interface Look {
  /** Distance of the body's nearest point from the plane, m; negative where it is beyond it. */
  gap: number;
  /** At which the nearest point moves away from the plane, m/s. */
  rate: number;
  /** A time, at most `end`, until which the gap surely stays 0 or more; asks for a positive gap. */
  safeUntil(end: number): number;
}

/** Turns the model onto the world. */
export const bodyOrientation = ({ flight, axes }: Pick<FlyingBody, "flight" | "axes">, t: number): Quat =>
  multiply(flight.orientation(t), conjugate(axes));

/** Never exceeded by the part of a body point's acceleration that turning makes along a direction, m/s²; `tilt` = direction × ω. */
export function turningAcceleration({ flight, reach }: FlyingBody, tilt: Vec3): number {
  const { greatestRate, greatestAngularAcceleration } = flight;
  // n·(ω×(ω×r) + ω'×r) = r·((n×ω)×ω + n×ω'), and a spin that keeps its axis keeps n×ω too
  const across = greatestAngularAcceleration === 0 ? length(tilt) : greatestRate;
  return reach * (1 + 1e-12) * (across * greatestRate + greatestAngularAcceleration);
}

/**
 * Looks at body and plane at time t. The step is conservative advancement (Mirtich & Canny, Impulse-based simulation of rigid bodies, 1995) of
 * second order. Each point's height above the plane is at least h + h' s − A s²/2 after s, A a bound of its acceleration towards the plane. Least
 * of all points is n·(c + v s) + min over p of (n + s n×ω)·R p − A s²/2: the support function along a direction tilted with s. As a least of linear
 * functions it is concave in s, so that it is above 0 all the way to any s where it is.
 */
export function lookAt(body: FlyingBody, { normal, offset }: Side, t: number): Look {
  const { flight, support } = body;
  const orientation = bodyOrientation(body, t);
  const tilt = cross(normal, flight.angularVelocity(t));
  const level = dot(normal, flight.centerOfMass(t)) - offset;
  const speed = dot(normal, flight.velocity(t));
  const along = rotateBack(orientation, normal);
  const turning = rotateBack(orientation, tilt);
  const nearest = support.lowest(along);
  const gap = level + dot(along, nearest);
  const rate = speed + dot(turning, nearest);

  const safeUntil = (end: number): number => {
    // gravity away from the plane is left out: the bound must not bend upwards
    const bend = Math.min(0, dot(normal, flight.launch.gravity) - turningAcceleration(body, tilt));
    const bound = (s: number): { value: number; slope: number } => {
      const direction = addScaled(along, turning, s);
      const point = support.lowest(direction);
      return {
        value: level + (speed + 0.5 * bend * s) * s + dot(direction, point),
        slope: speed + bend * s + dot(turning, point),
      };
    };
    const rest = end - t;
    const rounding = gapRounding(body, { normal, offset }, t);
    // the point nearest now gives an upper bound of where the least reaches 0
    let far = Math.min(rest, fallTime(gap, rate, bend));
    let near = 0;
    let nearValue = gap;
    for (let round = 0; round < MOST_ROUNDS; round++) {
      const { value, slope } = bound(far);
      if (value >= -rounding) return far === rest ? end : t + far;
      // of a concave function the chord's zero is safe and the tangent's is too far
      const chord = near + ((far - near) * nearValue) / (nearValue - value);
      const atChord = bound(chord).value;
      if (atChord >= -rounding) {
        near = chord;
        nearValue = atChord;
      }
      if (near >= ENOUGH * far) break;
      far = Math.max(near, Math.min(far, far - value / slope));
    }
    return t + near;
  };
  return { gap, rate, safeUntil };
}

const MOST_ROUNDS = 16;
/** Share of the longest safe step that is worth no more looking. */
const ENOUGH = 0.9;

/** The first s > 0 at which height + rate·s + bend·s²/2 is 0, for a height above 0 and a bend of 0 or less; Infinity if none. */
function fallTime(height: number, rate: number, bend: number): number {
  const root = Math.sqrt(rate * rate - 2 * bend * height);
  if (rate <= 0) return root - rate === 0 ? Number.POSITIVE_INFINITY : (2 * height) / (root - rate);
  return bend === 0 ? Number.POSITIVE_INFINITY : (rate + root) / -bend;
}

/** What rounding may make of a gap near the body's place, m. */
export function gapRounding({ flight, reach }: FlyingBody, { offset }: Side, t: number): number {
  return 2e-15 * (length(flight.centerOfMass(t)) + Math.abs(offset) + reach);
}
