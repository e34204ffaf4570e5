import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type Flight, fly } from "../../src/flight/flight.js";
import { conjugate, multiply, type Quat } from "../../src/math/quat.js";
import { findRoot } from "../../src/math/roots.js";
import { distance, dot, length, normalize, type Vec3 } from "../../src/math/vec3.js";

function turning(
  moments: Vec3,
  spin: Vec3,
  duration: number,
  orientation: Quat = [0.1, 0.2, -0.3, 0.9],
): Flight {
  const still: Vec3 = [0, 0, 0];
  return fly({ centerOfMass: still, velocity: still, gravity: still, orientation, spin, moments, duration });
}

/** The complete elliptic integral of the first kind with the parameter m, by the arithmetic-geometric mean (DLMF 19.8.5). */
function completeK(m: number): number {
  let a = 1;
  let b = Math.sqrt(1 - m);
  while (a - b > 1e-15) [a, b] = [(a + b) / 2, Math.sqrt(a * b)];
  return Math.PI / (a + b);
}

// Abramowitz & Stegun, Handbook of Mathematical Functions, table 17.1 (the digits checked with mpmath)
const TABLE: [number, number][] = [
  [0.1, 1.612441348720219],
  [0.5, 1.854074677301372],
  [0.9, 2.578092113348173],
];

describe("the spin goes round its polhode in the period of the closed form", () => {
  for (const [m, K] of TABLE)
    it(`with the parameter ${m}`, () => {
      expect(Math.abs(completeK(m) - K)).toBeLessThan(2e-15);
      // Landau & Lifshitz, Mechanics, §37, for the moments 1, 2, 3 and ω = (√(6m), 0, √2): the parameter is
      // (I2 − I1) I1 ω1² / ((I3 − I2) I3 ω3²) = m and ω = 4K/√(…) with √((I3 − I2)(L² − 2E I1)/(I1 I2 I3)) = √2
      const flight = turning([1, 2, 3], [Math.sqrt(6 * m), 0, Math.sqrt(2)], 12);
      const period = (4 * K) / Math.sqrt(2);
      const half = findRoot((t) => flight.spin(t)[1], 0.4 * period, 0.6 * period);
      const whole = findRoot((t) => flight.spin(t)[1], 0.9 * period, 1.1 * period);
      expect(Math.abs(half - period / 2)).toBeLessThan(1e-13);
      expect(Math.abs(whole - period)).toBeLessThan(1e-13);
      expect(distance(flight.spin(whole), flight.spin(0))).toBeLessThan(1e-13);
    });
});

describe("after one period the body has turned about its angular momentum by 2ET/|L| less a solid angle", () => {
  // Montgomery, Am. J. Phys. 59, 394, 1991: the solid angle is what L sweeps out as seen from the body
  const TURN = 2 * Math.PI;

  /** The angle about L by which the body has turned between 0 and t; the rest of the rotation must be nothing. */
  function turnedAboutL(flight: Flight, t: number): number {
    const [x, y, z, w] = multiply(flight.orientation(t), conjugate(flight.orientation(0)));
    const axis = normalize(flight.angularMomentum);
    const along = dot([x, y, z], axis);
    expect(length([x, y, z]) - Math.abs(along)).toBeLessThan(1e-12);
    return 2 * Math.atan2(along, w);
  }

  const wrapped = (angle: number): number => angle - TURN * Math.round(angle / TURN);

  interface Entry {
    id: string;
    moments: Vec3;
    omega_body_0: Vec3;
    q0: Quat;
    period: number;
    phase?: { turn_about_L_mod_2pi: number; dynamic_2ET_over_L: number; solid_angle: number };
  }
  // periods and phases from 75-digit Taylor series, worked out independently of this program
  const cases: Entry[] = JSON.parse(readFileSync("test/data/flights.json", "utf8")).cases;
  for (const c of cases)
    if (c.phase && c.period < 1000)
      it(`reference flight ${c.id}`, () => {
        const flight = turning(c.moments, c.omega_body_0, c.period, c.q0);
        const { turn_about_L_mod_2pi, dynamic_2ET_over_L, solid_angle } = c.phase!;
        expect(distance(flight.spin(c.period), c.omega_body_0) / length(c.omega_body_0)).toBeLessThan(1e-10);
        const turned = turnedAboutL(flight, c.period);
        expect(Math.abs(wrapped(turned - turn_about_L_mod_2pi))).toBeLessThan(1e-10);
        expect(Math.abs(wrapped(dynamic_2ET_over_L - solid_angle - turned))).toBeLessThan(1e-10);
        const dynamic = (2 * flight.energy * c.period) / length(flight.angularMomentum);
        expect(Math.abs(dynamic / dynamic_2ET_over_L - 1)).toBeLessThan(1e-14);
      });

  it("a body of our own, the solid angle summed along its polhode", () => {
    const m = 0.5;
    const flight = turning([1, 2, 3], [Math.sqrt(6 * m), 0, Math.sqrt(2)], 6);
    const period = (4 * TABLE[1][1]) / Math.sqrt(2);
    // ∮(1 − cos θ) dφ about the third axis; the trapezoidal rule on a periodic function converges exponentially
    const n = 400;
    let solidAngle = 0;
    for (let i = 0; i < n; i++) {
      const t = (period * i) / n;
      const [x, y, z] = flight.spin(t);
      const L: Vec3 = [x, 2 * y, 3 * z];
      // m' = m × ω in the body
      const change: Vec3 = [L[1] * z - L[2] * y, L[2] * x - L[0] * z, L[0] * y - L[1] * x];
      const turn = (L[0] * change[1] - L[1] * change[0]) / (L[0] * L[0] + L[1] * L[1]);
      solidAngle += (1 - L[2] / length(L)) * turn * (period / n);
    }
    const dynamic = (2 * flight.energy * period) / length(flight.angularMomentum);
    expect(Math.abs(solidAngle)).toBeGreaterThan(0.5);
    expect(Math.abs(wrapped(dynamic - solidAngle - turnedAboutL(flight, period)))).toBeLessThan(1e-12);
  });
});
