import { expect, it } from "vitest";
import { defaultTolerance } from "../../src/clip/default-tolerance.js";

it("the default tolerance is a millimetre, for a small prop half a percent of its reach", () => {
  // From the throw file's description of `bake.tolerance`.
  expect(defaultTolerance(0.5)).toBe(0.001);
  expect(defaultTolerance(0.04)).toBeCloseTo(0.0002, 15);
});
