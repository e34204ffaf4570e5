import { expect, it } from "vitest";
import { spreadSamples } from "../../src/clip/spread-samples.js";

const spread = (low: number, high: number, most: number): number[] => {
  const out = new Int32Array(most);
  return Array.from(out.subarray(0, spreadSamples(low, high, most, out)));
};

it("samples are spread evenly with both ends, or are all there are", () => {
  expect(spread(10, 30, 5)).toEqual([10, 15, 20, 25, 30]);
  expect(spread(4, 6, 5)).toEqual([4, 5, 6]);
  expect(spread(4, 3, 5)).toEqual([]);
});
