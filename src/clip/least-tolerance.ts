import type { Flight } from "../flight/flight.js";
import { length } from "../math/vec3.js";
import type { Body } from "./body.js";
import { bendSurcharge } from "./sampled-motion.js";
import { fromOrigin, timeGrid } from "./time-grid.js";

/** Distance between neighbouring float32 numbers, as a part of the number (at most). */
const FLOAT32 = 1 / 0x80_00_00;

/**
 * The finest tolerance, m, that keys can be proved to hold on this flight: four float32 steps of the greatest coordinate
 * that a point of the prop takes, and five times the surcharge of the finest time grid. Throws a RangeError for a flight that
 * lasts no time.
 *
 * One float32 step is what rounding a rotation key may move a point by (1.2e-7 rad), 0.87 what rounding a translation key
 * may; the other two leave the search some room.
 */
export function leastTolerance(flight: Flight, body: Body): number {
  const { surcharge, interval } = timeGrid(flight, body, 0);
  const played = bendSurcharge(fromOrigin(body) * flight.greatestRate * flight.greatestRate, interval);
  return 4 * FLOAT32 * greatestCoordinate(flight, body) + 5 * (surcharge + played);
}

/** Greatest coordinate, m, of any point of the prop or of the model's origin during the flight. */
export function greatestCoordinate(flight: Flight, body: Body): number {
  const { velocity, gravity } = flight.launch;
  let greatest = 0;
  for (let axis = 0; axis < 3; axis++) {
    const turning = -velocity[axis] / gravity[axis];
    for (const t of [0, flight.duration, turning])
      if (t >= 0 && t <= flight.duration)
        greatest = Math.max(greatest, Math.abs(flight.centerOfMass(t)[axis]));
  }
  return greatest + Math.max(body.reach, length(body.centerOfMass));
}
