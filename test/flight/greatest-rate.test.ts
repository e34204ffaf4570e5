import { describe, expect, it } from "vitest";
import { fly } from "../../src/flight/flight.js";
import { greatestRate } from "../../src/flight/greatest-rate.js";
import { shareAbout } from "../../src/flight/share-about.js";
import { axisShares } from "../../src/flight/turns.js";
import { IDENTITY } from "../../src/math/quat.js";
import { dot, length, scale, type Vec3 } from "../../src/math/vec3.js";
import { anyDirection, anyMoments, between, random } from "./tumbling.js";

const turning = (spin: Vec3, moments: Vec3, duration: number) =>
  fly({
    centerOfMass: [0, 0, 0],
    velocity: [0, 0, 0],
    gravity: [0, 0, 0],
    orientation: IDENTITY,
    spin,
    moments,
    duration,
  });

const anyFlight = (next: () => number) =>
  turning(scale(anyDirection(next), between(next, 1, 20)), anyMoments(next), between(next, 0.05, 1.5));

describe("the greatest angular speed within a flight", () => {
  it("is that of a fine scan, to what the scan's step leaves out", () => {
    const next = random(11);
    let inside = 0;
    for (let i = 0; i < 100; i++) {
      const flight = anyFlight(next);
      const looks = 2000;
      let scanned = 0;
      for (let k = 0; k <= looks; k++)
        scanned = Math.max(scanned, length(flight.spin((flight.duration * k) / looks)));
      const greatest = greatestRate(flight);
      const ends = Math.max(length(flight.spin(0)), length(flight.spin(flight.duration)));
      if (greatest > ends * (1 + 1e-9)) inside++;
      expect(greatest).toBeGreaterThanOrEqual(scanned * (1 - 1e-13));
      expect(greatest).toBeLessThan(scanned * (1 + 1e-5));
    }
    // or the ends alone would have done
    expect(inside).toBeGreaterThan(20);
  });
});

describe("the share of the turning about an axis", () => {
  it("of a principal axis is what the record states", () => {
    const next = random(12);
    for (let i = 0; i < 40; i++) {
      const flight = anyFlight(next);
      const shares = axisShares(flight);
      for (const a of [0, 1, 2])
        expect(shareAbout(flight, [a === 0 ? 1 : 0, a === 1 ? 1 : 0, a === 2 ? 1 : 0])).toBeCloseTo(
          shares[a],
          9,
        );
    }
  });

  it("of any axis is the sum of a fine scan", () => {
    const next = random(13);
    for (let i = 0; i < 20; i++) {
      const flight = anyFlight(next);
      const axis = anyDirection(next);
      const looks = 20_000;
      let [about, whole] = [0, 0];
      for (let k = 0; k < looks; k++) {
        const spin = flight.spin((flight.duration * (k + 0.5)) / looks);
        about += Math.abs(dot(spin, axis));
        whole += length(spin);
      }
      // the midpoint rule at 20,000 steps: error of order (turning per step)² ~ 1e-6² and at the kinks 1e-7
      expect(shareAbout(flight, axis)).toBeCloseTo(about / whole, 6);
    }
  });

  it("of a body at rest is none", () => {
    expect(shareAbout(turning([0, 0, 0], [1, 2, 2.5], 1), [1, 0, 0])).toBeUndefined();
  });
});
