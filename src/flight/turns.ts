import { findRoot } from "../math/roots.js";
import { CompensatedSum } from "../math/sum.js";
import { length, type Vec3 } from "../math/vec3.js";
import type { Flight } from "./flight.js";

/**
 * Turns about the axis the body turns round in space, its angular momentum: (1/2π) ∫ω·L/|L| dt, which for a free body is
 * 2E·T/(2π|L|). For a clean spin plainly its turns; never negative; 0 at rest.
 */
export function turnsAboutMomentum(flight: Flight): number {
  const size = length(flight.angularMomentum);
  return size === 0 ? 0 : (2 * flight.energy * flight.duration) / (2 * Math.PI * size);
}

/**
 * How much of the turning is about each principal axis, in the order of `launch.moments`: ∫|ω_a|dt / ∫|ω|dt, each 0 to
 * 1 (they add up to more than 1 unless the spin is clean); zeros for a body at rest. Integrals of the continuous motion,
 * good to 1e-12; of several flights of a body together.
 *
 * Gauss–Legendre quadrature over panels in which the body turns 1 rad at most, split where a component changes sign. No
 * panel hides two changes: ω_a'' = k_a (k_b ω_c² + k_c ω_b²) ω_a with every |k| ≤ 1, so that by Sturm's comparison
 * theorem zeros of a component lie at least π rad of the greatest rate apart.
 */
export function axisShares(...flights: readonly Flight[]): Vec3 {
  const whole = new CompensatedSum();
  const about = [new CompensatedSum(), new CompensatedSum(), new CompensatedSum()];
  for (const flight of flights) addTurning(flight, whole, about);
  if (whole.value === 0) return [0, 0, 0];
  return [about[0].value / whole.value, about[1].value / whole.value, about[2].value / whole.value];
}

/** ∫|ω|dt and each ∫|ω_a|dt. */
function addTurning(flight: Flight, whole: CompensatedSum, about: readonly CompensatedSum[]): void {
  const panels = Math.ceil(flight.duration * flight.greatestRate);
  const time = (panel: number): number => (flight.duration * panel) / panels;

  let start = flight.spin(0);
  for (let panel = 0; panel < panels; panel++) {
    const from = time(panel);
    const to = time(panel + 1);
    const end = flight.spin(to);
    const samples = sample(flight, from, to);
    addIntegral(whole, samples, length, to - from);
    for (let a = 0; a < 3; a++) {
      const along = (spin: Vec3): number => Math.abs(spin[a]);
      if (start[a] * end[a] < 0) {
        const zero = findRoot((t) => flight.spin(t)[a], from, to);
        addIntegral(about[a], sample(flight, from, zero), along, zero - from);
        addIntegral(about[a], sample(flight, zero, to), along, to - zero);
      } else addIntegral(about[a], samples, along, to - from);
    }
    start = end;
  }
}

/** The spin at the nodes of the quadrature between two times. */
function sample(flight: Flight, from: number, to: number): Vec3[] {
  const middle = 0.5 * (from + to);
  const half = 0.5 * (to - from);
  return NODES.flatMap((x) => [flight.spin(middle - half * x), flight.spin(middle + half * x)]);
}

function addIntegral(sum: CompensatedSum, samples: Vec3[], of: (spin: Vec3) => number, width: number): void {
  for (let i = 0; i < samples.length; i++) sum.add(0.5 * width * WEIGHTS[i >> 1] * of(samples[i]));
}

/** Gauss–Legendre quadrature with ten points: Abramowitz & Stegun, table 25.4. */
const NODES = [
  0.14887433898163122, 0.4333953941292472, 0.6794095682990244, 0.8650633666889845, 0.9739065285171717,
];
const WEIGHTS = [
  0.29552422471475287, 0.26926671930999635, 0.21908636251598204, 0.1494513491505806, 0.06667134430868814,
];
