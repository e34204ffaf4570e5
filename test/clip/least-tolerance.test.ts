import { expect, it } from "vitest";
import { greatestCoordinate, leastTolerance } from "../../src/clip/least-tolerance.js";
import { thrown } from "./flights.js";

const body = { centerOfMass: [0, 0.1, 0], axes: [0, 0, 0, 1], reach: 0.3 } as const;

it("the greatest coordinate counts the apex and the reach", () => {
  // Rise v²/2g of a throw (Galileo's parabola), above the 1.5 m of the release.
  const flight = thrown({ velocity: [0, 9.80665, 0], duration: 2 });
  expect(greatestCoordinate(flight, body)).toBeCloseTo(1.5 + 9.80665 / 2 + 0.3, 12);
});

it("the greatest coordinate does not count an apex after the end", () => {
  const flight = thrown({ velocity: [0, 10, 0], gravity: [0, -1, 0], duration: 1 });
  expect(greatestCoordinate(flight, body)).toBeCloseTo(1.5 + 10 - 0.5 + 0.3, 12);
});

it("the least tolerance is four float32 steps of the greatest coordinate", () => {
  // 24 bits of IEEE 754 binary32; the finest grid's surcharge is far below.
  const flight = thrown({ centerOfMass: [100, 0, 0], velocity: [0, 0, 0], gravity: [0, 0, 0], duration: 1 });
  expect(leastTolerance(flight, body) / ((4 * 100.3) / 8388608)).toBeCloseTo(1, 5);
});
