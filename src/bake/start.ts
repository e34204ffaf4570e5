/** A throw that starts where, and as, another arrived. */

import type { LaunchWish } from "../aim/launch.js";
import type { Flight } from "../flight/flight.js";
import { type Quat, rotate } from "../math/quat.js";
import { add, subtract, type Vec3 } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import { modelRotation } from "./motion.js";

/** World frame; rotation turns the model from as modelled. */
export interface Start {
  centerOfMass: Vec3;
  rotation: Quat;
}

export const arrivalOf = (flight: Flight, prop: Prop): Start => ({
  centerOfMass: flight.centerOfMass(flight.duration),
  rotation: modelRotation(flight, prop, flight.duration),
});

/** The wish with place and pose at release taken from `start`: its own fall away. */
export function startingAs<W extends Omit<LaunchWish, "spin">>(wish: W, start: Start | undefined): W {
  if (!start) return wish;
  const from = add(start.centerOfMass, rotate(start.rotation, wish.releaseOffset));
  const { to } = wish.arc;
  return {
    ...wish,
    arc: { ...wish.arc, from },
    pose: () => start.rotation,
    ahead: to ? subtract(to, from) : wish.ahead,
  };
}
