import { expect, test } from "vitest";
import { completeK } from "../../src/math/elliptic.js";

test("the complete elliptic integral of the first kind", () => {
  // Abramowitz & Stegun, table 17.1 (parameter m = k²): m = 0, 0.5, 0.9, and 17.3.26 for m near 1: ln(4/k1).
  expect(completeK(1)).toBeCloseTo(Math.PI / 2, 15);
  expect(completeK(Math.sqrt(0.5))).toBeCloseTo(1.854074677301372, 14);
  expect(completeK(Math.sqrt(0.1))).toBeCloseTo(2.578092113348173, 14);
  expect(completeK(1e-12)).toBeCloseTo(Math.log(4e12), 12);
  expect(completeK(0)).toBe(Number.POSITIVE_INFINITY);
});
