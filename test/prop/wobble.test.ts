import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { fly } from "../../src/flight/flight.js";
import { turnsAboutMomentum } from "../../src/flight/turns.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { typicalWobble, wobble } from "../../src/prop/wobble.js";

const DEGREE = Math.PI / 180;

/** A flight of unit angular momentum, tilted from an axis as `wobble` has it. */
function flightOf(moments: Vec3, axis: number, tilt: number, phase: number, duration: number) {
  const momentum = [0, 0, 0];
  momentum[axis] = Math.cos(tilt);
  momentum[(axis + 1) % 3] = Math.sin(tilt) * Math.cos(phase);
  momentum[(axis + 2) % 3] = Math.sin(tilt) * Math.sin(phase);
  const spin = momentum.map((value, i) => value / moments[i]);
  return fly({
    centerOfMass: [0, 0, 0],
    velocity: [0, 0, 0],
    gravity: [0, 0, 0],
    orientation: [0, 0, 0, 1],
    spin: [spin[0], spin[1], spin[2]],
    moments,
    duration,
  });
}

describe("turning over", () => {
  test("comes as often as it does in flown throws", () => {
    // The flight is tested by itself against 75-digit series: here the times at which the component along the axis changes sign.
    const cases: [Vec3, 0 | 1 | 2, number][] = [
      [[1, 2, 3], 1, 3],
      [[0.02, 0.18, 0.19], 1, 3],
      [[0.0012, 0.8137, 0.8144], 2, 3],
      [[1, 1, 2], 0, 20],
    ];
    for (const [moments, axis, degrees] of cases)
      for (const phase of [10, 40, 80]) {
        const { turnsPerFlip } = wobble(moments, axis, degrees * DEGREE, phase * DEGREE);
        expect(turnsPerFlip).toBeLessThan(Number.POSITIVE_INFINITY);
        const probe = flightOf(moments, axis, degrees * DEGREE, phase * DEGREE, 1);
        const duration = (3.2 * turnsPerFlip) / turnsAboutMomentum(probe);
        const flight = flightOf(moments, axis, degrees * DEGREE, phase * DEGREE, duration);
        const changes: number[] = [];
        const steps = 20000;
        for (let i = 1; i <= steps; i++) {
          const [before, after] = [
            flight.spin(((i - 1) * duration) / steps)[axis],
            flight.spin((i * duration) / steps)[axis],
          ];
          if (before * after < 0) changes.push(((i - 1 + before / (before - after)) * duration) / steps);
        }
        expect(changes).toHaveLength(3);
        const turns = ((changes[2] - changes[0]) / 2) * turnsAboutMomentum(probe);
        expect(turns / turnsPerFlip).toBeGreaterThan(0.9995);
        expect(turns / turnsPerFlip).toBeLessThan(1.0005);
      }
  });

  test("never comes where the tilt is nothing", () => {
    expect(wobble([1, 2, 3], 2, 0.001, 0.5).turnsPerFlip).toBe(Number.POSITIVE_INFINITY);
  });

  test("typically comes sooner the greater the wobble", () => {
    fc.assert(
      fc.property(fc.double({ min: 0.5, max: 10, noNaN: true }), (degrees) => {
        const [less, more] = [degrees, degrees * 1.5].map(
          (tilt) => typicalWobble([1, 2, 3], 1, tilt * DEGREE).turnsPerFlip,
        );
        expect(more).toBeLessThan(less);
      }),
      { seed: 4, numRuns: 50 },
    );
  });
});

describe("wobbling", () => {
  test("goes round as often as it does in flown throws, at a tilt of 20° too", () => {
    for (const axis of [0, 2] as const)
      for (const [degrees, phase] of [
        [3, 30],
        [20, 70],
      ]) {
        const moments: Vec3 = [1, 1.6, 2.3];
        const { wobblesPerTurn } = wobble(moments, axis, degrees * DEGREE, phase * DEGREE);
        const duration = 4000;
        const flight = flightOf(moments, axis, degrees * DEGREE, phase * DEGREE, duration);
        const [lx, ly, lz] = flight.angularMomentum;
        // Angle of the axis round the angular momentum, summed in small steps.
        const unit: Vec3 = [lx, ly, lz];
        const across: Vec3 = Math.abs(lx) < 0.9 ? [0, lz, -ly] : [-lz, 0, lx];
        const third: Vec3 = [
          unit[1] * across[2] - unit[2] * across[1],
          unit[2] * across[0] - unit[0] * across[2],
          unit[0] * across[1] - unit[1] * across[0],
        ];
        let angle = 0;
        let before: number | undefined;
        for (let i = 0; i <= 40000; i++) {
          const [x, y, z, w] = flight.orientation((i * duration) / 40000);
          const e =
            axis === 0
              ? [1 - 2 * (y * y + z * z), 2 * (x * y + z * w), 2 * (x * z - y * w)]
              : [2 * (x * z + y * w), 2 * (y * z - x * w), 1 - 2 * (x * x + y * y)];
          const along = (v: Vec3) => v.reduce((sum, value, k) => sum + value * e[k], 0);
          const azimuth = Math.atan2(along(third), along(across));
          if (before !== undefined)
            angle += Math.atan2(Math.sin(azimuth - before), Math.cos(azimuth - before));
          before = azimuth;
        }
        const counted = angle / (2 * Math.PI) / turnsAboutMomentum(flight);
        expect(Math.abs(counted / wobblesPerTurn - 1)).toBeLessThan(2e-3);
      }
  });
});
