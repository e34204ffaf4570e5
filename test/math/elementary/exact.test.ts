import seedrandom from "seedrandom";
import { describe, expect, it } from "vitest";
import { exponent, productError, sumError, timesPowerOfTwo } from "../../../src/math/elementary/exact.js";
import { fixed } from "../reference.js";

// Outside source: whole-number arithmetic, in which every double is exact.

const random = seedrandom("exact");
const any = (range: number): number => (random() - 0.5) * 2 ** Math.floor(range * (random() - 0.5));

describe("exact parts of rounded operations", () => {
  it("a sum and its error are the sum", () => {
    for (let i = 0; i < 500; i++) {
      const [a, b] = [any(120), any(120)];
      const sum = a + b;
      expect(fixed(sum, 1100) + fixed(sumError(a, b, sum), 1100)).toBe(fixed(a, 1100) + fixed(b, 1100));
    }
  });

  it("a product and its error are the product", () => {
    for (let i = 0; i < 500; i++) {
      const [a, b] = [any(400), any(400)];
      const product = a * b;
      const both = fixed(product, 1100) + fixed(productError(a, b, product), 1100);
      expect(both << 1100n).toBe(fixed(a, 1100) * fixed(b, 1100));
    }
  });
});

describe("powers of two", () => {
  it("exponents are the floor of the binary logarithm, subnormal numbers too", () => {
    for (let k = -1074; k <= 1023; k++)
      expect(exponent(k < -1022 ? 2 ** (k + 54) / 2 ** 54 : 2 ** k)).toBe(k);
    expect(exponent(-1.999)).toBe(0);
    expect(exponent(Number.MAX_VALUE)).toBe(1023);
  });

  it("scale with one rounding, from one end of the range to the other and past it", () => {
    // Exact, or rounded once by the standard's own division (IEEE 754, 5.4.1)
    expect(timesPowerOfTwo(Number.MIN_VALUE, 2097)).toBe(2 ** 1023);
    expect(timesPowerOfTwo(2 ** 1023, -2097)).toBe(Number.MIN_VALUE);
    expect(timesPowerOfTwo(1.5 * 2 ** 1023, -2000)).toBe(1.5 * 2 ** -977);
    expect(timesPowerOfTwo(2 ** 900, -1950)).toBe(2 ** -1050);
    expect(timesPowerOfTwo(1, 1024)).toBe(Number.POSITIVE_INFINITY);
    expect(timesPowerOfTwo(-1, 5000)).toBe(Number.NEGATIVE_INFINITY);
    expect(timesPowerOfTwo(-1, -5000)).toBe(-0);
    expect(timesPowerOfTwo(3, -1074)).toBe(3 * Number.MIN_VALUE);
    for (let i = 0; i < 300; i++) {
      const x = 1 + random();
      const k = 1000 + Math.floor(80 * random());
      // the first division is exact, the second rounds
      expect(timesPowerOfTwo(x, -k)).toBe(x / 2 ** 100 / 2 ** (k - 100));
    }
  });
});
