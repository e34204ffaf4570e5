import { describe, expect, it } from "vitest";
import { pow } from "../../../src/math/elementary.js";
import { between, pairs, random, spread, worst } from "../arguments.js";
import { dissect, exponential, logarithm } from "../reference.js";

// Expected numbers come from test/math/reference.ts. The promise is 1 ulp (tan: 2); the bounds here are a little above the greatest
// errors measured over 20,000 arguments each, so that a lost correction shows.

describe("powers keep their last digit", () => {
  it("pow, up to the ends of a double's range", () => {
    const args: [number, number][] = [
      ...pairs(600, () => [between(0, 4), between(-20, 20)]),
      ...pairs(200, () => {
        const x = Math.abs(spread(-1022, 1023));
        return [x, between(-1, 1) * Math.abs(708 / Math.log(x))];
      }),
      ...pairs(200, () => {
        const x = 1 + spread(-50, -3);
        return [x, between(-1, 1) * Math.abs(708 / Math.log(x))];
      }),
      // where every digit of the logarithm's low part counts: series longest, product greatest
      ...pairs(300, () => {
        const x = random() < 0.5 ? between(0.71, 0.8) : between(1.25, 1.41);
        return [x, (random() < 0.5 ? -1 : 1) * Math.abs(between(600, 708) / Math.log(x))];
      }),
      ...pairs(100, () => {
        const x = between(0.1, 10);
        return [x, -between(709, 744) / Math.log(x)];
      }),
      [2, 0.5],
      [10, 308],
      [10, -308],
      [Number.MIN_VALUE, 0.5],
    ];
    expect(
      worst(
        args,
        ([x, y]) => pow(x, y),
        ([x, y]) => {
          const { m, e } = dissect(y);
          const product = m * logarithm(x, 1500);
          return [exponential(e >= 0 ? product << BigInt(e) : product >> BigInt(-e), 1500), 1500];
        },
      ).ulp,
    ).toBeLessThan(0.7);
  });
  it("whole powers that a double can hold are exact", () => {
    // exact in integer arithmetic
    for (let base = 2; base <= 20; base++)
      for (let n = 0; BigInt(base) ** BigInt(n) < 2n ** 53n; n++)
        expect(pow(base, n)).toBe(Number(BigInt(base) ** BigInt(n)));
  });
});
