import seedrandom from "seedrandom";
import { describe, expect, it } from "vitest";
import { CompensatedSum } from "../../src/math/sum.js";
import { fixed, ulpError } from "./reference.js";

const sumOf = (numbers: number[]): number => {
  const sum = new CompensatedSum();
  for (const x of numbers) sum.add(x);
  return sum.value;
};

describe("CompensatedSum", () => {
  it("keeps what a large number swallows", () => {
    // whole-number arithmetic; a plain sum gives 0, and so does Kahan's
    expect(sumOf([1, 1e100, 1, -1e100])).toBe(2);
    expect(sumOf([])).toBe(0);
  });

  it("is within one last place of the exact sum of numbers that mostly cancel", () => {
    const random = seedrandom("sum");
    for (let run = 0; run < 50; run++) {
      const numbers = Array.from({ length: 400 }, () => (random() - 0.5) * 2 ** Math.floor(20 * random()));
      const all = [...numbers, ...numbers.slice(0, 390).map((x) => -x)];
      const exact = all.reduce((total, x) => total + fixed(x, 1100), 0n);
      expect(ulpError(sumOf(all), exact, 1100)).toBeLessThan(1);
    }
  });
});
