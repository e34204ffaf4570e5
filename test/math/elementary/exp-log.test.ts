import { describe, expect, it } from "vitest";
import { exp, log } from "../../../src/math/elementary.js";
import { around, between, list, spread, worst } from "../arguments.js";
import { exponential, fixed, logarithm } from "../reference.js";

// Expected numbers come from test/math/reference.ts. The promise is 1 ulp (tan: 2); the bounds here are a little above the greatest
// errors measured over 20,000 arguments each, so that a lost correction shows.

describe("exponential and logarithm keep their last digit", () => {
  it("exp, down to subnormal results", () => {
    const args = [
      ...list(800, () => between(-2, 2)),
      ...list(500, () => between(-745, 709.7)),
      ...list(100, () => spread(-60, 0)),
      ...list(60, () => between(-745, -708)),
      ...around(Math.LN2 / 2, -Math.LN2 / 2, 1, -1),
      709.782712893384,
    ];
    expect(worst(args, exp, (x) => [exponential(fixed(x, 1400), 1400), 1400]).ulp).toBeLessThan(0.7);
  });
  it("log, near 1 and of subnormals too", () => {
    const args = [
      ...list(1000, () => between(0.4, 2.5)),
      ...list(300, () => 1 + spread(-52, -2)),
      ...list(300, () => Math.abs(spread(-1022, 1023))),
      ...list(40, () => Number.MIN_VALUE * Math.floor(2 ** between(0, 51))),
      ...around(1, Math.SQRT2, Math.SQRT1_2).filter((x) => x !== 1),
      Number.MAX_VALUE,
      Number.MIN_VALUE,
    ];
    expect(worst(args, log, (x) => [logarithm(x, 300), 300]).ulp).toBeLessThan(0.85);
  });
});
