import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { longestSegments } from "../../src/clip/longest-segments.js";

describe("the longest segments", () => {
  it("are as few as dynamic programming finds, where a part of a fitting segment fits", () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 1, max: 40 }), { minLength: 1, maxLength: 120 }), (costs) => {
        // A segment fits while the costs of its steps stay within a budget.
        const sums = [0];
        for (const cost of costs) sums.push(sums[sums.length - 1] + cost);
        const fits = (a: number, b: number) => sums[b] - sums[a] <= 100;
        const best = [0];
        for (let b = 1; b <= costs.length; b++) {
          best[b] = Number.POSITIVE_INFINITY;
          for (let a = 0; a < b; a++) if (fits(a, b)) best[b] = Math.min(best[b], best[a] + 1);
        }
        const ends = longestSegments(costs.length, fits);
        expect(ends?.length).toBe(best[costs.length] + 1);
        for (let i = 1; i < (ends?.length ?? 0); i++) expect(fits(ends![i - 1], ends![i])).toBe(true);
      }),
      { seed: 1, numRuns: 300 },
    );
  });

  it("are none where a single step does not fit", () => {
    expect(longestSegments(10, (a, b) => b - a < 4 && !(a <= 6 && b > 6))).toBeUndefined();
  });

  it("are one where all fits", () => {
    expect(longestSegments(1000, () => true)).toEqual([0, 1000]);
  });
});
