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

// How exact the functions are, file by file: test/math/elementary/.

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

/** How many doubles apart two numbers of one sign are. */
function ulpsApart(a: number, b: number): number {
  const view = new DataView(new ArrayBuffer(16));
  view.setFloat64(0, a);
  view.setFloat64(8, b);
  return Math.abs(Number(view.getBigInt64(0) - view.getBigInt64(8)));
}
