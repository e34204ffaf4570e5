import { describe, expect, it } from "vitest";
import { hypot } from "../../../src/math/elementary.js";
import { between, pairs, spread, worst } from "../arguments.js";
import { fixed, wholeRoot } from "../reference.js";

// Expected numbers come from test/math/reference.ts. The promise is 1 ulp (tan: 2); the bounds here are a little above the greatest
// errors measured over 20,000 arguments each, so that a lost correction shows.

describe("lengths are all but perfectly rounded", () => {
  it("hypot, where squares would leave the range too", () => {
    const args: [number, number][] = [
      ...pairs(1500, () => [between(-3, 3), between(-3, 3)]),
      ...pairs(200, () => {
        const x = spread(-1022, 1022);
        return [x, x * between(-3, 3)];
      }),
      [3e300, 4e300],
      [Number.MIN_VALUE, Number.MIN_VALUE],
    ].filter(([x, y]) => Number.isFinite(x + y)) as [number, number][];
    expect(
      worst(
        args,
        ([x, y]) => hypot(x, y),
        ([x, y]) => {
          const [a, b] = [fixed(x, 1100), fixed(y, 1100)];
          return [wholeRoot((a * a + b * b) << 400n, 2n), 1300];
        },
      ).ulp,
    ).toBeLessThan(0.501);
    // 2² + 3² + 6² = 7² and 1² + 2² + 4² + 10² = 11²: exact
    expect(hypot(2, -3, 6)).toBe(7);
    expect(hypot(1, 2, 4, 10)).toBe(11);
    expect(hypot(-5)).toBe(5);
  });
});
