import { describe, expect, it } from "vitest";
import { rotationKeys } from "../../src/clip/linear-rotation.js";
import { sampleFlight } from "../../src/clip/sampled-flight.js";
import { plannedFlights } from "./flights.js";

describe("rotation keys alone, on the twelve flights compared while planning", () => {
  // 448 and 238 were counted then, with another program, as the dynamic-programming optimum of keys on the true curve.
  it.each([
    [0.001, 448],
    [0.005, 238],
  ])("at %s m are as few as the optimum, %i, within 1 %", (tolerance, optimum) => {
    const body = { centerOfMass: [0, 0, 0], axes: [0, 0, 0, 1], reach: 0.15 } as const;
    const keys = plannedFlights().map((flight) => {
      const sampled = sampleFlight(flight, body, tolerance);
      return rotationKeys(sampled, tolerance - sampled.surcharge)?.indices.length ?? Number.NaN;
    });
    const sum = keys.reduce((a, b) => a + b, 0);
    expect(Math.abs(sum / optimum - 1)).toBeLessThan(0.01);
  });
});
