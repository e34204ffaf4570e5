import seedrandom from "seedrandom";
import { describe, expect, it } from "vitest";
import { eigenSymmetric } from "../../src/math/eigen.js";
import { determinant, type Mat3, map, multiply, multiplyVector, transpose } from "../../src/math/mat3.js";
import { dot, length, scale, subtract, type Vec3 } from "../../src/math/vec3.js";
import { fixed } from "./reference.js";

const random = seedrandom("eigen");
const whole = (limit: number): number => Math.floor(random() * (2 * limit + 1)) - limit;

/** Three rows at right angles with length N, all whole numbers: the Euler–Rodrigues parameters a, b, c, d, N = a² + b² + c² + d². */
function wholeRotation(): { rows: Mat3; n: number } {
  const [a, b, c] = [whole(6), whole(6), whole(6)];
  const d = 1 + Math.floor(random() * 6);
  const n = a * a + b * b + c * c + d * d;
  return {
    n,
    rows: [
      [d * d + a * a - b * b - c * c, 2 * (a * b - c * d), 2 * (a * c + b * d)],
      [2 * (a * b + c * d), d * d - a * a + b * b - c * c, 2 * (b * c - a * d)],
      [2 * (a * c - b * d), 2 * (b * c + a * d), d * d - a * a - b * b + c * c],
    ],
  };
}

/** rowsᵀ·diag(values)·rows: its eigenvalues are values·N², its eigenvectors the rows, without any rounding. */
function matrixWith(values: Vec3, rows: Mat3): Mat3 {
  return multiply(transpose(rows), [
    scale(rows[0], values[0]),
    scale(rows[1], values[1]),
    scale(rows[2], values[2]),
  ]);
}

function expectFrame(vectors: Mat3, digits = 1e-15): void {
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++)
      expect(Math.abs(dot(vectors[i], vectors[j]) - (i === j ? 1 : 0))).toBeLessThan(digits);
  expect(determinant(vectors)).toBeGreaterThan(0.999);
}

/** The sign of det(m − λ·1), in whole-number arithmetic, so without rounding. */
function characteristicSign(m: Mat3, lambda: number): number {
  const a = m.map((row, i) => row.map((x, j) => fixed(x, 1100) - (i === j ? fixed(lambda, 1100) : 0n)));
  const minor = (i: number, j: number): bigint => a[1][i] * a[2][j] - a[1][j] * a[2][i];
  const d = a[0][0] * minor(1, 2) - a[0][1] * minor(0, 2) + a[0][2] * minor(0, 1);
  return d > 0n ? 1 : d < 0n ? -1 : 0;
}

describe("eigenSymmetric", () => {
  it("finds values and axes of matrices built from whole-number rotations", () => {
    for (let i = 0; i < 300; i++) {
      const { rows, n } = wholeRotation();
      const expected = [whole(50), 51 + Math.abs(whole(50)), 102 + Math.abs(whole(50))] as const;
      const { values, vectors } = eigenSymmetric(matrixWith(expected, rows));
      expectFrame(vectors);
      for (let k = 0; k < 3; k++) {
        expect(Math.abs(values[k] - expected[k] * n * n)).toBeLessThan(2e-15 * expected[2] * n * n);
        // sine of the angle between the axes
        const along = dot(vectors[k], scale(rows[k], 1 / n));
        expect(length(subtract(scale(rows[k], 1 / n), scale(vectors[k], along)))).toBeLessThan(1e-13);
      }
    }
  });

  it("knows the second-difference matrix, whose values are 2 − 2 cos(kπ/4)", () => {
    // Golub & Van Loan, Matrix Computations, 4th ed., 4.8.3
    const { values } = eigenSymmetric([
      [2, -1, 0],
      [-1, 2, -1],
      [0, -1, 2],
    ]);
    expect(values[0]).toBeCloseTo(2 - Math.SQRT2, 14);
    expect(values[1]).toBeCloseTo(2, 14);
    expect(values[2]).toBeCloseTo(2 + Math.SQRT2, 14);
  });

  it("is exact for a diagonal matrix, in any order and with equal values", () => {
    expect(
      eigenSymmetric([
        [0.3, 0, 0],
        [0, 0.1, 0],
        [0, 0, 0.2],
      ]),
    ).toEqual({
      values: [0.1, 0.2, 0.3],
      vectors: [
        [0, 1, 0],
        [0, 0, 1],
        [1, 0, 0],
      ],
    });
    const identity = eigenSymmetric([
      [7, 0, 0],
      [0, 7, 0],
      [0, 0, 7],
    ]);
    expect(identity.values).toEqual([7, 7, 7]);
    expectFrame(identity.vectors);
    expect(identity.vectors.map((row) => row.map(Math.abs))).toEqual([
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
    ]);
    expect(eigenSymmetric([[0, 0, 0], [0, 0, 0], [0, 0, 0]]).values).toEqual([0, 0, 0]); // biome-ignore format: a zero matrix
  });

  it("keeps a frame where two or all values nearly coincide", () => {
    for (const values of [[2, 2, 5], [2, 5, 5], [5, 5, 5], [4, 4 + 2 ** -20, 9], [0, 0, 1]] as Vec3[]) // biome-ignore format: a list of triples
      for (let i = 0; i < 50; i++) {
        const { rows, n } = wholeRotation();
        const m = matrixWith(values, rows);
        const found = eigenSymmetric(m);
        expectFrame(found.vectors);
        for (let k = 0; k < 3; k++) {
          expect(Math.abs(found.values[k] - values[k] * n * n)).toBeLessThan(2e-15 * values[2] * n * n);
          const residue = subtract(
            multiplyVector(m, found.vectors[k]),
            scale(found.vectors[k], found.values[k]),
          );
          expect(length(residue)).toBeLessThan(4e-15 * values[2] * n * n);
        }
      }
  });

  it.each([2 ** -1000, 2 ** -500, 2 ** 500, 2 ** 1000])("scales by %d without losing a digit", (s) => {
    const m = matrixWith([1, 2, 4], wholeRotation().rows);
    const plain = eigenSymmetric(m);
    const scaled = eigenSymmetric(map(m, (x) => x * s));
    expect(scaled.vectors).toEqual(plain.vectors);
    expect(scaled.values).toEqual(plain.values.map((x) => x * s));
  });

  it("keeps the digits of small values of graded positive definite matrices", () => {
    // Demmel & Veselić 1992: relative errors depend on the matrix scaled to a unit diagonal, here well conditioned.
    for (let i = 0; i < 100; i++) {
      const d = [1, 10 ** -Math.floor(9 * random()), 10 ** -Math.floor(25 * random())];
      const unit: Mat3 = [
        [1, 0.4 * random(), 0.4 * random()],
        [0, 1, 0.4 * random()],
        [0, 0, 1],
      ];
      const m = map(unit, (_, r, c) => unit[Math.min(r, c)][Math.max(r, c)] * d[r] * d[c]);
      const symmetric = map(m, (_, r, c) => m[Math.min(r, c)][Math.max(r, c)]);
      for (const value of eigenSymmetric(symmetric).values) {
        const below = characteristicSign(symmetric, value * (1 - 5e-15));
        const above = characteristicSign(symmetric, value * (1 + 5e-15));
        expect(below * above).toBe(-1);
      }
    }
  });
});
