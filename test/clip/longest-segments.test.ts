import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { longestSegments, longestWithin } from "../../src/clip/longest-segments.js";

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

describe("led by their errors, the longest segments", () => {
  it("are as long as the error lets them, within a thirtieth, in few tries", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 2, max: 3, noNaN: true }),
        fc.double({ min: 20, max: 3000, noNaN: true }),
        fc.double({ min: 0, max: 0.5, noNaN: true }),
        (power, greatest, swing) => {
          // The length at which the error is 1 wanders. A chord's error goes with the square of its length, or with more where it
          // starts beside the curve.
          const longest = (from: number) => greatest * (1 + swing * Math.sin((3 * from) / greatest));
          let tries = 0;
          const ends = longestWithin(20_000, (a, b) => {
            tries++;
            return ((b - a) / longest(a)) ** power;
          }) as number[];
          for (let i = 1; i + 1 < ends.length; i++) {
            const length = ends[i] - ends[i - 1];
            expect(length).toBeLessThanOrEqual(longest(ends[i - 1]));
            expect(length).toBeGreaterThan((29 / 30) * longest(ends[i - 1]) - 1);
          }
          // Bisection alone would take 7 to 12.
          expect(tries).toBeLessThan(5 * ends.length + 20);
        },
      ),
      { seed: 5, numRuns: 300 },
    );
  });
});
