import { describe, expect, it } from "vitest";
import {
  determinant,
  diagonal,
  type Mat3,
  multiply,
  multiplyVector,
  solve,
  transpose,
} from "../../src/math/mat3.js";

// Whole-number arithmetic, done by hand.
const m: Mat3 = [
  [2, 1, 0],
  [1, 3, 1],
  [0, 1, 4],
];
const skew: Mat3 = [
  [1, 2, 3],
  [4, 5, 6],
  [7, 8, 10],
];

describe("matrices", () => {
  it("multiply rows by columns", () => {
    expect(multiply(m, skew)).toEqual([
      [6, 9, 12],
      [20, 25, 31],
      [32, 37, 46],
    ]);
    expect(multiplyVector(skew, [1, 0, -1])).toEqual([-2, -2, -3]);
    expect(multiply(diagonal([2, 3, 5]), skew)[2]).toEqual([35, 40, 50]);
    expect(transpose(skew)[0]).toEqual([1, 4, 7]);
  });

  it("have determinants", () => {
    expect(determinant(m)).toBe(18);
    expect(determinant(skew)).toBe(-3);
  });

  it("solve three equations, and say so when they cannot", () => {
    expect(solve(m, [4, 10, 14])).toEqual([1, 2, 3]);
    expect(solve(skew, [-2, -2, -3])?.map((x) => x + 0)).toEqual([1, 0, -1]); // + 0: -0 is 0
    expect(
      solve(
        [
          [1, 2, 3],
          [2, 4, 6],
          [0, 1, 1],
        ],
        [1, 2, 3],
      ),
    ).toBeUndefined();
  });
});
