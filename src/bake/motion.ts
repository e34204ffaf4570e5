/** What takes.json, extras and so the engine are told of a flight: states and cues, in the host's coordinates. */

import type { Flight } from "../flight/flight.js";
import { conjugate, multiply, type Quat } from "../math/quat.js";
import { length, type Vec3 } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { Conversion } from "./host.js";
import type { Take } from "./take.js";

/** Of a turn: a body that was asked for two turns has made its second whatever the last digit says. */
const ROUNDING = 1e-9;

/** A moment of the motion; rotation turns the model from as modelled, angular velocity is in the world frame, rad/s. */
export interface MotionState {
  centerOfMass: Vec3;
  rotation: Quat;
  /** Null where nothing but the turning is known. */
  velocity: Vec3 | null;
  angularVelocity: Vec3;
}

/** The model's orientation at a time: turns it from as modelled. */
export const modelRotation = (flight: Flight, prop: Prop, t: number): Quat =>
  multiply(flight.orientation(t), conjugate(prop.principal.axes));

export function motionState(
  { flight, turnsAlone }: Pick<Take, "flight" | "turnsAlone">,
  prop: Prop,
  t: number,
  host: Conversion,
): MotionState {
  return {
    centerOfMass: host.vector(flight.centerOfMass(t)),
    rotation: host.rotation(modelRotation(flight, prop, t)),
    velocity: turnsAlone ? null : host.vector(flight.velocity(t)),
    angularVelocity: host.angular(flight.angularVelocity(t)),
  };
}

/** Seconds at which the body has made its 1st, 2nd, … whole turn about its angular momentum: it turns there at the constant 2E/|L|. */
export function turnTimes(flight: Flight): number[] {
  const momentum = length(flight.angularMomentum);
  if (momentum === 0) return [];
  const turn = (2 * Math.PI * momentum) / (2 * flight.energy);
  const whole = Math.floor(flight.duration / turn + ROUNDING);
  return Array.from({ length: whole }, (_, i) => Math.min((i + 1) * turn, flight.duration));
}

/** s within a clip in which the flight starts at `start`. */
export const cuesOf = ({ aimed, flight, turnsAlone }: Take, start: number) => ({
  apex: turnsAlone ? null : start + aimed.arc.apex.time,
  turns: turnTimes(flight).map((time) => start + time),
});
