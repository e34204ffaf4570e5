import { describe, expect, it } from "vitest";
import { cos, sin, tan } from "../../../src/math/elementary.js";
import { around, between, bitsFor, list, nudge, spread, worst } from "../arguments.js";
import { sineCosine } from "../reference.js";

// Expected numbers come from test/math/reference.ts. The promise is 1 ulp (tan: 2); the bounds here are a little above the greatest
// errors measured over 20,000 arguments each, so that a lost correction shows.

describe("sine, cosine and tangent keep their last digit", () => {
  const multiples = list(600, (i) => {
    const n = i < 200 ? i + 1 : Math.floor(2 ** between(1, 40));
    return nudge(n * (Math.PI / 2), Math.floor(between(-2, 3)));
  });
  const args = [
    ...list(1500, () => between(-10, 10)),
    ...list(500, () => between(-1000, 1000)),
    ...list(300, () => spread(-40, 40)),
    ...list(60, () => spread(-1022, 1023)),
    ...around(Math.PI / 4, -Math.PI / 4, 2 ** 30, 2 ** 53, (2 ** 20 * Math.PI) / 2),
    ...multiples,
    // The double nearest to a multiple of π/2 (Muller, Elementary Functions, 3rd ed., 11.3.1; Kahan 1983)
    6381956970095103 * 2 ** 797,
    Number.MAX_VALUE,
    Number.MIN_VALUE,
    2 ** -1022,
  ];

  it("sin", () => {
    expect(
      worst(args, sin, (x) => {
        const bits = bitsFor(x);
        return [sineCosine(x, bits).sine, bits];
      }).ulp,
    ).toBeLessThan(0.8);
  });
  it("cos", () => {
    expect(worst(args, cos, (x) => [sineCosine(x, 200).cosine, 200]).ulp).toBeLessThan(0.8);
  });
  it("tan", () => {
    expect(
      worst(args, tan, (x) => {
        const bits = bitsFor(x);
        const { sine, cosine } = sineCosine(x, bits);
        return [(sine << BigInt(bits)) / cosine, bits];
      }).ulp,
    ).toBeLessThan(1.9);
  });
});
