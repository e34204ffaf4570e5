import { describe, expect, it } from "vitest";
import { cbrt } from "../../../src/math/elementary.js";
import { around, between, list, spread, worst } from "../arguments.js";
import { fixed, wholeRoot } from "../reference.js";

// Expected numbers come from test/math/reference.ts. The promise is 1 ulp (tan: 2); the bounds here are a little above the greatest
// errors measured over 20,000 arguments each, so that a lost correction shows.

describe("cube roots are all but perfectly rounded", () => {
  it("cbrt", () => {
    const args = [
      ...list(1500, () => between(-30, 30)),
      ...list(200, () => spread(-1022, 1023)),
      ...around(8, 27, 1),
      Number.MAX_VALUE,
      Number.MIN_VALUE,
    ];
    expect(
      worst(args, cbrt, (x) => {
        const root = wholeRoot(fixed(Math.abs(x), 2400), 3n);
        return [x < 0 ? -root : root, 800];
      }).ulp,
    ).toBeLessThan(0.501);
  });
});
