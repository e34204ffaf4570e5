import { describe, expect, it } from "vitest";
import { acos, asin, atan, atan2 } from "../../../src/math/elementary.js";
import { around, between, bitsFor, list, nudge, pairs, random, spread, worst } from "../arguments.js";
import { arctangent, fixed, pi, squareRoot, wholeRoot } from "../reference.js";

// Expected numbers come from test/math/reference.ts. The promise is 1 ulp (tan: 2); the bounds here are a little above the greatest
// errors measured over 20,000 arguments each, so that a lost correction shows.

describe("inverse functions keep their last digit", () => {
  const args = [
    ...list(1500, () => between(-1, 1)),
    ...list(200, () => spread(-60, 0)),
    ...list(200, () => (random() < 0.5 ? -1 : 1) * (1 - Math.abs(spread(-52, -1)))),
    ...around(0.5, -0.5),
    ...list(10, (i) => nudge(1, -i)),
    ...list(10, (i) => -nudge(1, -i)),
    Number.MIN_VALUE,
  ].filter((x) => Math.abs(x) <= 1);
  /** The angle in [0, π] with the given cosine, from doubles exact in 1 + x and 1 − x. */
  const angleOf = (x: number, bits: number): bigint => {
    const one = 1n << BigInt(2200);
    const v = fixed(x, 2200);
    if (one + v === 0n) return pi(bits);
    const ratio = ((one - v) << BigInt(2 * bits)) / (one + v);
    return 2n * arctangent(wholeRoot(ratio, 2n), 1n << BigInt(bits), bits);
  };

  it("acos", () => {
    expect(worst(args, acos, (x) => [angleOf(x, 300), 300]).ulp).toBeLessThan(0.65);
  });
  it("asin", () => {
    expect(
      worst(args, asin, (x) => {
        const bits = bitsFor(x);
        const v = fixed(Math.abs(x), bits);
        const one = 1n << BigInt(bits);
        const angle =
          v === one ? pi(bits) / 2n : arctangent(v, squareRoot(one - ((v * v) >> BigInt(bits)), bits), bits);
        return [x < 0 ? -angle : angle, bits];
      }).ulp,
    ).toBeLessThan(0.7);
  });

  const arctangentOf = (y: number, x: number): [bigint, number] => {
    const bits =
      200 +
      Math.max(0, Math.ceil(Math.log2(Math.abs(x)) - Math.log2(Math.abs(y)))) +
      (x === 1 ? bitsFor(y) : 0);
    const angle = arctangent(fixed(Math.abs(y), 1100), fixed(Math.abs(x), 1100), bits);
    const upper = x < 0 ? pi(bits) - angle : angle;
    return [y < 0 ? -upper : upper, bits];
  };
  it("atan", () => {
    const all = [
      ...args,
      ...list(1500, () => between(-5, 5)),
      ...list(200, () => spread(-300, 300)),
      ...around(0.4375, 0.6875, 1.1875, 2.4375, 1),
      Number.MAX_VALUE,
    ];
    expect(worst(all, atan, (x) => arctangentOf(x, 1)).ulp).toBeLessThan(0.75);
  });
  it("atan2, all four quadrants", () => {
    const all: [number, number][] = [
      ...pairs(2500, () => [between(-3, 3), between(-3, 3)]),
      ...pairs(300, () => [spread(-30, 30), spread(-30, 30)]),
      ...pairs(60, () => [spread(-1022, 1023), spread(-1022, 1023)]),
      [Number.MIN_VALUE, 3 * Number.MIN_VALUE],
      [Number.MIN_VALUE, -Number.MAX_VALUE],
      [Number.MAX_VALUE, -Number.MAX_VALUE],
      [Number.MIN_VALUE, 3],
    ];
    expect(
      worst(
        all,
        ([y, x]) => atan2(y, x),
        ([y, x]) => arctangentOf(y, x),
      ).ulp,
    ).toBeLessThan(0.75);
  });
});
