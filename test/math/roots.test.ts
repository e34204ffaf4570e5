import seedrandom from "seedrandom";
import { describe, expect, it } from "vitest";
import { findRoot, quadraticRoots } from "../../src/math/roots.js";
import { fixed } from "./reference.js";

const random = seedrandom("roots");

describe("quadraticRoots", () => {
  it("gives whole roots exactly", () => {
    for (let i = 0; i < 500; i++) {
      const [r, s] = [Math.floor(random() * 2000) - 1000, Math.floor(random() * 2000) - 1000];
      const a = Math.floor(random() * 100) + 1;
      // a(x − r)(x − s), multiplied out without rounding
      const expected = r === s ? [r] : [Math.min(r, s), Math.max(r, s)];
      expect(quadraticRoots(a, -a * (r + s), a * r * s).map((x) => x + 0)).toEqual(expected);
      expect(quadraticRoots(-a, a * (r + s), -a * r * s).map((x) => x + 0)).toEqual(expected);
    }
  });

  it("keeps both roots where the discriminant nearly cancels", () => {
    // Kahan, On the Cost of Floating-Point Computation Without Extra-Precise Arithmetic, 2004, example: roots 1 and 1.000000028975958…
    const [low, high] = quadraticRoots(94906265.625, -2 * 94906267, 94906268.375);
    expect(low).toBe(1);
    expect(high).toBeCloseTo(1.000000028975958, 14);
  });

  it("keeps the small root beside a large one", () => {
    // x² − 10⁸·x + 1: the product of the roots is 1, their sum 10⁸
    const [low, high] = quadraticRoots(1, -1e8, 1);
    expect(low).toBe(1e-8);
    expect(high).toBe(1e8);
  });

  it("brackets the true roots within two last places, whatever the scale", () => {
    const any = (): number => (random() - 0.5) * 2 ** Math.floor(600 * (random() - 0.5));
    // The sign of the polynomial in whole-number arithmetic
    const sign = (a: number, b: number, c: number, x: number): number => {
      const [fa, fb, fc, fx] = [a, b, c, x].map((v) => fixed(v, 1100));
      const value = fa * fx * fx + ((fb * fx) << 1100n) + (fc << 2200n);
      return value > 0n ? 1 : value < 0n ? -1 : 0;
    };
    let checked = 0;
    for (let i = 0; i < 500; i++) {
      const [a, b, c] = [any(), any(), any()];
      for (const x of quadraticRoots(a, b, c)) {
        if (x === 0 || Math.abs(x) < 2 ** -1000) continue;
        checked++;
        expect(sign(a, b, c, x * (1 - 6e-16)) * sign(a, b, c, x * (1 + 6e-16))).toBe(-1);
      }
    }
    expect(checked).toBeGreaterThan(500);
  });

  it("has no, one or two roots", () => {
    expect(quadraticRoots(1, 0, 1)).toEqual([]);
    expect(quadraticRoots(1, 2, 1)).toEqual([-1]);
    expect(quadraticRoots(0, 2, -3)).toEqual([1.5]);
    expect(quadraticRoots(0, 0, 1)).toEqual([]);
    expect(quadraticRoots(0, 0, 0)).toEqual([]);
    expect(quadraticRoots(2, 3, 0)).toEqual([-1.5, 0]);
    expect(quadraticRoots(-2, 3, 0)).toEqual([0, 1.5]);
    expect(quadraticRoots(5, 0, 0)).toEqual([0]);
    expect(quadraticRoots(4, 0, -9)).toEqual([-1.5, 1.5]);
  });
});

describe("findRoot", () => {
  it("finds published roots to the last digits, in far fewer steps than bisection's fifty", () => {
    const cases: [(x: number) => number, number, number, number][] = [
      [(x) => x * x * x - 2 * x - 5, 2, 3, 2.0945514815423265], // Wallis's cubic, OEIS A007493
      [(x) => Math.cos(x) - x, 0, 1, 0.7390851332151607], // OEIS A003957
      [(x) => x * Math.exp(x) - 1, 0, 1, 0.5671432904097838], // the omega constant, OEIS A030178
    ];
    for (const [f, lo, hi, root] of cases) {
      let calls = 0;
      const counted = (x: number): number => {
        calls++;
        return f(x);
      };
      expect(Math.abs(findRoot(counted, lo, hi) - root)).toBeLessThanOrEqual(2 ** -51);
      expect(calls).toBeLessThan(16);
      expect(Math.abs(findRoot(f, hi, lo) - root)).toBeLessThanOrEqual(2 ** -51);
    }
  });

  it("ends on jumps, flat and steep functions", () => {
    expect(findRoot((x) => (x < 0.3 ? -1 : 1), 0, 1)).toBeCloseTo(0.3, 15);
    expect(Math.abs(findRoot((x) => (x - 1 / 3) * (x - 1 / 3) * (x - 1 / 3), 0, 1) - 1 / 3)).toBeLessThan(
      1e-15,
    );
    expect(findRoot((x) => 1 / x - 1e-9, 1, 1e12)).toBeCloseTo(1e9, 5);
    expect(findRoot((x) => x - 1e-20, -1, 3)).toBeCloseTo(1e-20, 35);
  });

  it("stops at the tolerance", () => {
    let calls = 0;
    const root = findRoot(
      (x) => {
        calls++;
        return x < Math.SQRT2 ? -1 : 1;
      },
      0,
      2,
      0.01,
    );
    expect(Math.abs(root - Math.SQRT2)).toBeLessThanOrEqual(0.01);
    expect(calls).toBeLessThan(13); // bisection: log2(2/0.01) = 7.6, and the two ends
  });

  it("takes a root at either end", () => {
    expect(findRoot((x) => x - 2, 2, 5)).toBe(2);
    expect(findRoot((x) => x - 5, 2, 5)).toBe(5);
  });

  it("refuses an interval without a change of sign, naming it", () => {
    expect(() => findRoot((x) => x * x + 1, -1, 2)).toThrow(RangeError);
    expect(() => findRoot((x) => x * x + 1, -1, 2)).toThrow(
      "between -1 and 2: the function is 2 and 5 there",
    );
    expect(() => findRoot(() => Number.NaN, 0, 1)).toThrow(RangeError);
  });
});
