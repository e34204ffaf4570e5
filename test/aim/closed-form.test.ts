import { describe, expect, it } from "vitest";
import { passage } from "../../src/aim/closed-form.js";
import { reduceBody } from "../../src/aim/reduced-body.js";
import { turningOf } from "../../src/aim/turning.js";
import { type Flight, fly } from "../../src/flight/flight.js";
import { axisShares, turnsAboutMomentum } from "../../src/flight/turns.js";
import { toMatrix } from "../../src/math/quat.js";
import { length, scale, type Vec3 } from "../../src/math/vec3.js";
import { spinAlong } from "./least-squares.js";
import { BODIES, randomProblems } from "./problems.js";

const STILL = { centerOfMass: [0, 0, 0], velocity: [0, 0, 0], gravity: [0, 0, 0] } as const;

/** Flights of 1 s from the frame's own pose, up to three turns, of bodies with unlike moments and of symmetric ones. */
const FLIGHTS: Flight[] = randomProblems(240, "closed form").map(({ body, axis, turns }, i) => {
  const moments: Vec3 = body === "sphere" ? (i % 16 < 8 ? [1, 1, 1.6] : [0.3, 1, 1]) : BODIES[body];
  const spin = spinAlong(moments, axis, (3 * turns) / 8, 1);
  return fly({ ...STILL, orientation: [0, 0, 0, 1], spin, moments, duration: 1 });
});

function momentumOf({ launch: { spin, moments } }: Flight): Vec3 {
  const greatest = Math.max(...moments);
  return [0, 1, 2].map((a) => (spin[a] * moments[a]) / greatest) as unknown as Vec3;
}

describe("the closed form of free rotation", () => {
  it("tells when a flight gets to where it ends, and by how much it has turned about its momentum", () => {
    // against the numerical flight, which is tested by a 60-digit series
    for (const flight of FLIGHTS) {
      const momentum = momentumOf(flight);
      const time = length(momentum);
      const found = passage(
        reduceBody(flight.launch.moments),
        scale(momentum, 1 / time),
        toMatrix(flight.orientation(1)),
      )!;
      const periods = Math.round((time - found.time) / found.period);
      expect(Math.abs(found.time + periods * found.period - time)).toBeLessThan(1e-9);
      const past = found.turned + periods * found.turnedPerPeriod - found.azimuth;
      expect(Math.abs(past - 2 * Math.PI * Math.round(past / (2 * Math.PI)))).toBeLessThan(1e-9);
    }
  });

  it("tells the turns and the share of each axis", () => {
    for (const flight of FLIGHTS) {
      const turning = turningOf(
        reduceBody(flight.launch.moments),
        momentumOf(flight),
        toMatrix(flight.orientation(1)),
      );
      expect(Math.abs(turning.turns - turnsAboutMomentum(flight))).toBeLessThan(1e-10);
      axisShares(flight).forEach((share, a) => {
        expect(Math.abs(turning.share[a] - share)).toBeLessThan(1e-9);
      });
      // midpoint sums of the flight's own spin; their error falls with the square of the step
      const n = 2000;
      let whole = 0;
      const about = [0, 0, 0];
      for (let i = 0; i < n; i++) {
        const spin = flight.spin((i + 0.5) / n);
        whole += Math.hypot(...spin) / n;
        spin.forEach((w, a) => {
          about[a] += w / n;
        });
      }
      expect(Math.abs((turning.turning * 2 * Math.PI) / whole - 1)).toBeLessThan(2e-5);
      about.forEach((w, a) => {
        expect(Math.abs(turning.signedShare[a] - w / whole)).toBeLessThan(2e-5);
      });
    }
  });
});
