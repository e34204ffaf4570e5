import { findRoot } from "../math/roots.js";
import { length } from "../math/vec3.js";
import type { Flight } from "./flight.js";

/**
 * The greatest angular speed |ω| within the flight, rad/s, to rounding. The derivative of |ω|² is 2 (k₁ + k₂ + k₃) ω₁ω₂ω₃ (from Euler's equations
 * ω_a' = k_a ω_b ω_c), so that the greatest is at an end or where a component is 0; such moments of one component lie at least π rad of the
 * greatest rate apart (Sturm's comparison theorem), so that no panel of 1 rad hides two.
 */
export function greatestRate(flight: Flight): number {
  const panels = Math.ceil(flight.duration * flight.greatestRate);
  let greatest = length(flight.spin(0));
  for (let panel = 0; panel < panels; panel++) {
    const [from, to] = [(flight.duration * panel) / panels, (flight.duration * (panel + 1)) / panels];
    const [start, end] = [flight.spin(from), flight.spin(to)];
    greatest = Math.max(greatest, length(end));
    for (let a = 0; a < 3; a++)
      if (start[a] * end[a] < 0)
        greatest = Math.max(greatest, length(flight.spin(findRoot((t) => flight.spin(t)[a], from, to))));
  }
  return greatest;
}
