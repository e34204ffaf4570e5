import { describe, expect, it } from "vitest";
import { linearRotationKeys } from "../../src/clip/linear-rotation.js";
import { sampleFlight } from "../../src/clip/sampled-flight.js";
import { floatStore, int16Store } from "../../src/clip/store-rotation.js";
import { plannedFlights } from "./flights.js";

const body = { centerOfMass: [0, 0, 0], axes: [0, 0, 0, 1], reach: 0.15 } as const;

describe("rotation keys alone, on the twelve flights compared while planning", () => {
  const count = (tolerance: number, store: typeof floatStore, offCurve: boolean) =>
    plannedFlights().reduce((sum, flight) => {
      const sampled = sampleFlight(flight, body, tolerance);
      const keys = linearRotationKeys(sampled, tolerance - sampled.surcharge, store, offCurve);
      return sum + (keys?.indices.length ?? Number.NaN);
    }, 0);

  // 448 and 238 were counted then, with another program, as the dynamic-programming optimum of keys on the true curve.
  it.each([
    [0.001, 448],
    [0.005, 238],
  ])("on the curve, at %s m, are as few as the optimum, %i, within 1 %", (tolerance, optimum) => {
    expect(Math.abs(count(tolerance, floatStore, false) / optimum - 1)).toBeLessThan(0.01);
  });

  // About 340 and 209 were counted then; the steps under 90° keep them above 448/√2 and 238/√2.
  it.each([
    [0.001, 340],
    [0.005, 209],
  ])("beside the curve, at %s m, are as few as another program found, %i, within 2 %", (tolerance, found) => {
    expect(count(tolerance, floatStore, true)).toBeLessThanOrEqual(1.02 * found);
  });

  it("are hardly more where each is rounded to 16 bits", () => {
    // Planning: rounding adds 0.004 mm to 1 mm, and keys go with the root of the tolerance.
    expect(count(0.001, int16Store, true)).toBeLessThanOrEqual(1.01 * count(0.001, floatStore, true));
  });
});
