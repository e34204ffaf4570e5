import { describe, expect, it } from "vitest";
import { type Flight, fly } from "../../src/flight/flight.js";
import { axisShares, turnsAboutMomentum } from "../../src/flight/turns.js";
import { length, type Vec3 } from "../../src/math/vec3.js";

function turning(moments: Vec3, spin: Vec3, duration: number): Flight {
  const still: Vec3 = [0, 0, 0];
  const orientation = [0, 0, 0, 1] as const;
  return fly({ centerOfMass: still, velocity: still, gravity: still, orientation, spin, moments, duration });
}

describe("turns about the angular momentum", () => {
  it("are plainly the turns of a clean spin", () => {
    for (const sign of [1, -1])
      expect(turnsAboutMomentum(turning([1, 2, 3], [0, sign * 4 * Math.PI, 0], 1.5))).toBeCloseTo(3, 14);
  });

  it("are the integral of ω·L/|L|", () => {
    const flight = turning([0.3, 0.8, 1], [1, 9, -2], 2);
    const L = flight.angularMomentum;
    let sum = 0;
    const n = 4000; // midpoint rule on a constant: exact
    for (let i = 0; i < n; i++) {
      const w = flight.angularVelocity((2 * (i + 0.5)) / n);
      sum += (w[0] * L[0] + w[1] * L[1] + w[2] * L[2]) / length(L) / n;
    }
    expect(Math.abs(turnsAboutMomentum(flight) - (2 * sum) / (2 * Math.PI))).toBeLessThan(1e-12);
  });

  it("are none at rest", () => {
    expect(turnsAboutMomentum(turning([1, 2, 3], [0, 0, 0], 5))).toBe(0);
  });
});

describe("shares of the turning about the principal axes", () => {
  it("of a clean spin are one and nothing", () => {
    expect(axisShares(turning([1, 2, 3], [0, 7, 0], 2))).toEqual([0, 1, 0]);
    expect(axisShares(turning([1, 2, 3], [-7, 0, 0], 2))).toEqual([1, 0, 0]);
  });

  it("of a sphere are the components of its axis", () => {
    const [x, y, z] = axisShares(turning([2, 2, 2], [3, -4, 12], 1.7));
    expect(x).toBeCloseTo(3 / 13, 14);
    expect(y).toBeCloseTo(4 / 13, 14);
    expect(z).toBeCloseTo(12 / 13, 14);
  });

  it("of a symmetric body follow from its even precession", () => {
    // ω turns about the body's axis 3 at (I3 − I1)/I1 ω3 (Landau & Lifshitz, Mechanics, §36); over whole turns the mean
    // of |cos| is 2/π
    const [I1, I3, across, along] = [1, 1.6, 3, 5];
    const period = (2 * Math.PI * I1) / ((I3 - I1) * along);
    const rate = Math.hypot(across, along);
    const [x, y, z] = axisShares(turning([I1, I1, I3], [across, 0, along], 3 * period));
    expect(Math.abs(x - ((2 / Math.PI) * across) / rate)).toBeLessThan(1e-12);
    expect(Math.abs(y - ((2 / Math.PI) * across) / rate)).toBeLessThan(1e-12);
    expect(Math.abs(z - along / rate)).toBeLessThan(1e-12);
  });

  it("of a tumbling body agree with a fine sum", () => {
    const flight = turning([0.3, 0.8, 1], [0.3, 9, -0.2], 3);
    const n = 300_000;
    const about = [0, 0, 0];
    let whole = 0;
    for (let i = 0; i < n; i++) {
      const w = flight.spin((3 * (i + 0.5)) / n);
      for (let a = 0; a < 3; a++) about[a] += Math.abs(w[a]);
      whole += length(w);
    }
    // the midpoint rule's own error: about (ω' T/n)² at each kink
    axisShares(flight).forEach((share, a) => {
      expect(Math.abs(share - about[a] / whole)).toBeLessThan(1e-9);
    });
  });

  it("at rest, and of no time at all, are nothing", () => {
    expect(axisShares(turning([1, 2, 3], [0, 0, 0], 5))).toEqual([0, 0, 0]);
    expect(axisShares(turning([1, 2, 3], [1, 2, 3], 0))).toEqual([0, 0, 0]);
  });
});
