import seedrandom from "seedrandom";
import { describe, expect, it } from "vitest";
import {
  acos,
  asin,
  atan,
  atan2,
  cbrt,
  cos,
  exp,
  hypot,
  log,
  pow,
  sin,
  tan,
} from "../../src/math/elementary.js";
import {
  arctangent,
  dissect,
  exponential,
  fixed,
  logarithm,
  pi,
  sineCosine,
  squareRoot,
  ulpError,
  wholeRoot,
} from "./reference.js";

// Expected numbers come from test/math/reference.ts (whole-number arithmetic of 60 digits and more, other methods), which is
// itself held to printed digits below. The promise is 1 ulp (tan: 2); the bounds here are a little above the greatest errors
// measured over 20,000 arguments each, so that a lost correction shows.

const random = seedrandom("elementary");
const between = (lo: number, hi: number): number => lo + (hi - lo) * random();
const list = (count: number, make: (i: number) => number): number[] =>
  Array.from({ length: count }, (_, i) => make(i));
const pairs = (count: number, make: () => [number, number]): [number, number][] =>
  Array.from({ length: count }, make);
/** Any magnitude from 2^lo to 2^hi, either sign. */
const spread = (lo: number, hi: number): number =>
  (random() < 0.5 ? -1 : 1) * between(1, 2) * 2 ** Math.floor(between(lo, hi));
/** x moved by a few last places. */
function nudge(x: number, places: number): number {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, x);
  view.setBigInt64(0, view.getBigInt64(0) + BigInt(places));
  return view.getFloat64(0);
}
/** How many doubles apart two numbers of one sign are. */
function ulpsApart(a: number, b: number): number {
  const view = new DataView(new ArrayBuffer(16));
  view.setFloat64(0, a);
  view.setFloat64(8, b);
  return Math.abs(Number(view.getBigInt64(0) - view.getBigInt64(8)));
}
const around = (...centres: number[]): number[] => centres.flatMap((c) => list(21, (i) => nudge(c, i - 10)));
const bitsFor = (x: number): number => 200 + Math.max(0, -2 * (dissect(x).e + 52));

/** The greatest error in ulp over all arguments, and the argument that has it. */
function worst<T extends number | [number, number]>(
  args: T[],
  value: (x: T) => number,
  reference: (x: T) => [bigint, number],
): { ulp: number; at: T } {
  let found = { ulp: -1, at: args[0] };
  for (const x of args) {
    const result = value(x);
    const ulp = Number.isFinite(result) ? ulpError(result, ...reference(x)) : Number.POSITIVE_INFINITY;
    if (ulp > found.ulp) found = { ulp, at: x };
  }
  return found;
}

describe("the reference", () => {
  const decimals = (v: bigint, bits: number): string => ((v * 10n ** 50n) >> BigInt(bits)).toString();

  it("has the printed digits", () => {
    // π, ln 2, e: OEIS A000796, A002162, A001113; sin 1, cos 1: OEIS A049469, A049470
    expect(decimals(pi(256), 256)).toBe("314159265358979323846264338327950288419716939937510");
    expect(decimals(logarithm(2, 256), 256)).toBe("69314718055994530941723212145817656807550013436025");
    expect(decimals(exponential(1n << 256n, 256), 256)).toBe(
      "271828182845904523536028747135266249775724709369995",
    );
    expect(decimals(sineCosine(1, 256).sine, 256)).toBe("84147098480789650665250232163029899962256306079837");
    expect(decimals(sineCosine(1, 256).cosine, 256)).toBe(
      "54030230586813971740093660744297660373231042061792",
    );
    // atan 1 = π/4
    expect(decimals(4n * arctangent(1n, 1n, 256), 256)).toBe(decimals(pi(256), 256));
  });
});

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

describe("exponential, logarithm and powers keep their last digit", () => {
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

describe("cube roots and lengths are all but perfectly rounded", () => {
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

describe("printed values", () => {
  it.each([
    ["sin 1", sin(1), "0.84147098480789650665"], // OEIS A049469
    ["cos 1", cos(1), "0.54030230586813971740"], // OEIS A049470
    ["tan 1", tan(1), "1.55740772465490223050"], // OEIS A049471
    ["e", exp(1), "2.71828182845904523536"], // OEIS A001113
    ["ln 10", log(10), "2.30258509299404568402"], // OEIS A002392
    ["asin 1/2 = π/6", asin(0.5), "0.52359877559829887308"], // OEIS A019673
    ["acos -1 = π", acos(-1), "3.14159265358979323846"], // OEIS A000796
    ["atan 1 = π/4", atan(1), "0.78539816339744830962"], // OEIS A003881
    ["∛2", cbrt(2), "1.25992104989487316477"], // OEIS A002580
    ["√2", hypot(1, 1), "1.41421356237309504880"], // OEIS A002193
  ])("%s", (_, value, printed) => {
    expect(ulpsApart(value, Number(printed))).toBeLessThanOrEqual(1);
  });
});

describe("special values are those of ECMAScript", () => {
  // Outside source: the engine's own Math, whose special values ECMA-262 (21.3.2) fixes without leeway.
  const special = [
    NaN,
    0,
    1,
    2,
    3,
    0.5,
    1e-310,
    Number.MIN_VALUE,
    1e300,
    Number.MAX_VALUE,
    Number.POSITIVE_INFINITY,
  ].flatMap((x) => [x, -x]);
  const kind = (x: number): string =>
    Number.isNaN(x)
      ? "NaN"
      : x === 0 || !Number.isFinite(x)
        ? Object.is(x, -0)
          ? "-0"
          : String(x)
        : x > 0
          ? "+"
          : "-";
  const unary = { sin, cos, tan, asin, acos, atan, exp, log, cbrt };
  const binary = { pow, atan2, hypot };

  it.each(Object.keys(unary) as (keyof typeof unary)[])("%s", (name) => {
    for (const x of special) expect(`${x}: ${kind(unary[name](x))}`).toBe(`${x}: ${kind(Math[name](x))}`);
  });
  it.each(Object.keys(binary) as (keyof typeof binary)[])("%s", (name) => {
    for (const x of special)
      for (const y of special)
        expect(`${x}, ${y}: ${kind(binary[name](x, y))}`).toBe(`${x}, ${y}: ${kind(Math[name](x, y))}`);
  });
  it("the length of nothing is 0", () => {
    expect(hypot()).toBe(0);
  });
});
