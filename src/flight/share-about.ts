import { findRoot } from "../math/roots.js";
import { CompensatedSum } from "../math/sum.js";
import { dot, length, type Vec3 } from "../math/vec3.js";
import type { Flight } from "./flight.js";

/** Gauss–Legendre quadrature with five points: Abramowitz & Stegun, table 25.4. */
const NODES = [0, 0.538469310105683, -0.538469310105683, 0.906179845938664, -0.906179845938664];
const WEIGHTS = [
  0.568888888888889, 0.478628670499366, 0.478628670499366, 0.236926885056189, 0.236926885056189,
];

/** Rad of turning in a panel. */
const PANEL = 0.25;
/** Halvings of a panel in which the component touches 0 without a change of sign: what then is left is nothing. */
const MOST_HALVINGS = 20;

/**
 * How much of the turning is about an axis of the body: ∫|ω_a|dt / ∫|ω|dt, good to 1e-9; undefined at rest. For an axis that need not be a principal
 * one, whose component may come to 0 twice close together: a stretch counts as of one sign where the greatest angular acceleration forbids a 0 in it.
 *
 * @param axis unit vector in the principal frame
 */
export function shareAbout(flight: Flight, axis: Vec3): number | undefined {
  const panels = Math.ceil((flight.duration * flight.greatestRate) / PANEL);
  if (panels === 0) return undefined;
  const about = new CompensatedSum();
  const whole = new CompensatedSum();
  const component = (t: number): number => dot(flight.spin(t), axis);
  const addAbout = (from: number, to: number): void => about.add(Math.abs(integral(component, from, to)));
  const addPieces = (from: number, to: number, start: number, end: number, halvings: number): void => {
    if (start * end < 0) {
      const zero = findRoot(component, from, to);
      addAbout(from, zero);
      addAbout(zero, to);
    } else if (
      halvings === 0 ||
      Math.abs(start) + Math.abs(end) >= flight.greatestAngularAcceleration * (to - from)
    )
      addAbout(from, to);
    else {
      const middle = 0.5 * (from + to);
      const value = component(middle);
      addPieces(from, middle, start, value, halvings - 1);
      addPieces(middle, to, value, end, halvings - 1);
    }
  };
  for (let panel = 0; panel < panels; panel++) {
    const from = (flight.duration * panel) / panels;
    const to = (flight.duration * (panel + 1)) / panels;
    whole.add(integral((t) => length(flight.spin(t)), from, to));
    addPieces(from, to, component(from), component(to), MOST_HALVINGS);
  }
  return about.value / whole.value;
}

function integral(f: (t: number) => number, from: number, to: number): number {
  const middle = 0.5 * (from + to);
  const half = 0.5 * (to - from);
  return NODES.reduce((sum, x, i) => sum + WEIGHTS[i] * f(middle + half * x), 0) * half;
}
