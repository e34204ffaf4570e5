import { expect, it } from "vitest";
import { EndFit, FITTED, fittedSample } from "../../src/clip/fit-end.js";

it("an end is moved to where the greatest error of a chord is least", () => {
  // A parabola of sag 1 under a chord that starts on it. With the end moved out by x, the error -4s(1 − s) + sx is least at
  // s = ½ − x/8, where it is −(1 − x/4)²; that balances x at 1 − x/4 = √x, x = 12 − 8√2 (by hand).
  const fit = new EndFit();
  const samples = 700;
  let greatest = 0;
  for (let repeat = 0; repeat < 20; repeat++) {
    for (let n = 0; n < FITTED; n++) {
      const share = fittedSample(n, 0, samples) / samples;
      const error = -4 * share * (1 - share);
      fit.set(n, 0.6 * error, 0, -0.8 * error, share, share);
    }
    fit.set(FITTED, 0, 0, 0, 1, 1);
    fit.solve();
    greatest = Math.max(Math.abs(fit.shift[1]), Math.hypot(...fit.shift));
  }
  // Seven samples see the greatest error to a few percent.
  expect(greatest / (12 - 8 * Math.SQRT2)).toBeGreaterThan(0.97);
  expect(greatest / (12 - 8 * Math.SQRT2)).toBeLessThan(1.03);
  expect(fit.shift[0] / greatest).toBeCloseTo(0.6, 9);
  expect(fit.shift[2] / greatest).toBeCloseTo(-0.8, 9);
});

it("the samples fitted are spread over those within a segment, also where there are fewer", () => {
  const chosen = (low: number, high: number) =>
    Array.from({ length: FITTED }, (_, n) => fittedSample(n, low, high));
  expect(chosen(10, 80)).toEqual([15, 25, 35, 45, 55, 65, 75]);
  expect(chosen(4, 4)).toEqual(Array(FITTED).fill(4));
  expect(new Set(chosen(4, 6))).toEqual(new Set([4, 5, 6]));
});
