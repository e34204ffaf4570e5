import { expect, it } from "vitest";
import { endShift, timeGrid } from "../../src/clip/time-grid.js";
import { plannedFlights, thrown } from "./flights.js";

const body = { centerOfMass: [0, 0.1, 0], axes: [0, 0, 0, 1], reach: 0.3 } as const;

it("a grid is so fine that its surcharge is about two percent of the tolerance, or less", () => {
  for (const planned of plannedFlights())
    for (const tolerance of [0.0002, 0.001, 0.02]) {
      const { surcharge } = timeGrid(planned, body, tolerance);
      expect(surcharge).toBeGreaterThan(0.002 * tolerance);
      expect(surcharge).toBeLessThan(0.025 * tolerance);
    }
});

it("the surcharge is the sag of a parabola between two samples, for a prop that only falls", () => {
  // g·h²/8 (chord error of a parabola), h the longest interval: eight steps and a half.
  const { step, surcharge } = timeGrid(
    thrown({ duration: 1 }),
    { ...body, reach: 0, centerOfMass: [0, 0, 0] },
    0.001,
  );
  expect(surcharge / ((9.80665 * (8.5 * step) ** 2) / 8)).toBeCloseTo(1, 9);
});

it("a duration that float32 holds shifts nothing, another by its rounding at full speed", () => {
  expect(endShift(thrown({ duration: 0.75 }), body)).toBe(0);
  // fround(0.7) is 1.19e-8 below 0.7 (IEEE 754); 10 m/s and 0.3 m at 10 rad/s make 13 m/s.
  const flight = thrown({ velocity: [10, 0, 0], gravity: [0, 0, 0], spin: [0, 0, 10], duration: 0.7 });
  expect(endShift(flight, body) / (13 * (0.7 - Math.fround(0.7)))).toBeCloseTo(1, 9);
});
