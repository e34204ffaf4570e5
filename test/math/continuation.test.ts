import seedrandom from "seedrandom";
import { describe, expect, it } from "vitest";
import { continueToOne } from "../../src/math/continuation.js";

describe("a solution continued to λ = 1", () => {
  it("of Kepler's equation E = M + λ e sin E is its only one", () => {
    // Meeus, Astronomical Algorithms, 2nd ed., example 30.a, from memory: e = 0.1, M = 5°, E = 5.554589°
    const degree = Math.PI / 180;
    const [e] = continueToOne(([x], l) => [5 * degree + l * 0.1 * Math.sin(x)], [5 * degree])!;
    expect((e / degree).toFixed(6)).toBe("5.554589");
  });

  /** x = a + λ c(x) gives λ plainly as a function of x: the curve from (a, 0) runs one way in x until λ first is 1. */
  function reference(a: number, c: (x: number) => number): number {
    const lambda = (x: number) => (x - a) / c(x);
    const within = (x: number) => lambda(x) >= 0 && lambda(x) < 1;
    const way = Math.sign(c(a));
    let i = 1;
    while (within(a + way * i * 1e-4)) i++;
    let [inside, outside] = [a + way * (i - 1) * 1e-4, a + way * i * 1e-4];
    for (let halving = 0; halving < 60; halving++) {
      const middle = (inside + outside) / 2;
      if (within(middle)) inside = middle;
      else outside = middle;
    }
    return inside;
  }

  it("is found round folds, where the curve turns back in λ", () => {
    const random = seedrandom("folds");
    let folded = 0;
    for (let i = 0; i < 300; i++) {
      const a = 1 + 2 * random();
      const b = 0.05 + 0.3 * random();
      const k = 1 + 15 * random();
      const phase = 6 * random();
      const c = (x: number) => b * (Math.sin(k * x) + 0.8 * Math.sin(2.3 * k * x + phase));
      // near a start that is a solution at every λ another curve passes by, too close to be told apart
      if (Math.abs(c(a)) < 0.1 * b) continue;
      const [x] = continueToOne(([y], l) => [a + l * c(y)], [a])!;
      const expected = reference(a, c);
      expect(Math.abs(x - expected)).toBeLessThan(1e-9);
      expect(Math.abs(a + c(x) - x)).toBeLessThan(1e-12);
      const along = Array.from({ length: 200 }, (_, j) => {
        const y = a + ((expected - a) * (j + 1)) / 200;
        return (y - a) / c(y);
      });
      if (along.some((l, j) => j > 0 && l < along[j - 1] - 1e-9)) folded++;
    }
    expect(folded).toBeGreaterThan(5);
  });

  it("with several unknowns", () => {
    const g = ([x, y]: readonly number[], l: number) => [1 + l * Math.cos(y), 2 + (l * x) / 3];
    const [x, y] = continueToOne(g, [1, 2])!;
    expect(Math.abs(x - 1 - Math.cos(y))).toBeLessThan(1e-13);
    expect(Math.abs(y - 2 - x / 3)).toBeLessThan(1e-13);
  });

  it("passes on the reason where there is no way on", () => {
    const g = ([x]: readonly number[], l: number): number[] => {
      if (l > 0.5) throw new RangeError("no answer past the middle");
      return [1 + l * x * 0.1];
    };
    expect(() => continueToOne(g, [1])).toThrow("no answer past the middle");
  });
});
