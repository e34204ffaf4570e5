import { expect, it } from "vitest";
import { EndFit, FITTED, fittedSample } from "../../src/clip/fit-end.js";

it("an end is moved to where the greatest error of a chord is least", () => {
  // A parabola of sag 1 under a chord that starts on it. With the end moved out by x the error is −4s(1 − s) + sx: of the samples
  // at 0.1, 0.3 … 0.9 it is greatest at the middle one, −1 + x/2, which balances the end's x at ⅔ (by hand).
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
  // Weights that never quite vanish move it a little; plain least squares is 4 % off.
  expect(greatest * 1.5).toBeGreaterThan(0.99);
  expect(greatest * 1.5).toBeLessThan(1.01);
  expect(fit.shift[0] / greatest).toBeCloseTo(0.6, 9);
  expect(fit.shift[2] / greatest).toBeCloseTo(-0.8, 9);
});

it("the samples fitted are spread over those within a segment, also where there are fewer", () => {
  const chosen = (low: number, high: number) =>
    Array.from({ length: FITTED }, (_, n) => fittedSample(n, low, high));
  expect(chosen(10, 60)).toEqual([15, 25, 35, 45, 55]);
  expect(chosen(4, 4)).toEqual(Array(FITTED).fill(4));
  expect(new Set(chosen(4, 6))).toEqual(new Set([4, 5, 6]));
});
