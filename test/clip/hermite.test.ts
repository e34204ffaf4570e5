import { expect, it } from "vitest";
import { hermiteBounds, hermiteWeights } from "../../src/clip/hermite.js";

const segment = [
  Float64Array.of(0.2, -1),
  Float64Array.of(3, 0.5),
  Float64Array.of(0.9, 0.4),
  Float64Array.of(-2, 4),
] as const;

const value = (s: number, i: number): number => {
  const weights = new Float64Array(4);
  hermiteWeights(s, weights);
  return segment.reduce((sum, part, k) => sum + weights[k] * part[i], 0);
};

it("a segment starts and ends in its values with its tangents", () => {
  // What cubic Hermite interpolation is (e.g. Davis, Interpolation and Approximation, 1963, §2.5).
  const h = 1e-6;
  for (const i of [0, 1]) {
    expect(value(0, i)).toBe(segment[0][i]);
    expect(value(1, i)).toBe(segment[2][i]);
    expect((value(h, i) - value(0, i)) / h).toBeCloseTo(segment[1][i], 4);
    expect((value(1, i) - value(1 - h, i)) / h).toBeCloseTo(segment[3][i], 4);
  }
});

it("derivatives stay under their bounds, which are reached", () => {
  const { first, second } = hermiteBounds(2, ...segment);
  const h = 1e-4;
  let steepest = 0;
  let most = 0;
  for (let s = h; s < 1; s += h) {
    const slope = [0, 1].map((i) => (value(s + h / 2, i) - value(s - h / 2, i)) / h);
    const bend = [0, 1].map((i) => (value(s + h, i) - 2 * value(s, i) + value(s - h, i)) / (h * h));
    steepest = Math.max(steepest, Math.hypot(...slope));
    most = Math.max(most, Math.hypot(...bend));
  }
  // 1e-5: the quotients' own rounding.
  expect(steepest).toBeLessThanOrEqual(first * (1 + 1e-5));
  expect(most).toBeLessThanOrEqual(second * (1 + 1e-5));
  expect(most).toBeGreaterThan(0.999 * second);
});
