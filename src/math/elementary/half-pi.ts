import { productError, sumError } from "./exact.js";

/**
 * Takes the nearest multiple of π/2 off an angle: x = n·π/2 + hi + lo, |hi| ≤ π/4 (a last bit more at most). Every finite
 * double keeps its full precision, however large. Two-part Cody–Waite where no digits cancel, a three-part one with exact
 * products up to 2^30 (Muller, Elementary Functions, 3rd ed., 11.2), whole-number arithmetic beyond.
 * @returns [n modulo 4, hi, lo]
 */
export function reduceByHalfPi(x: number): readonly [number, number, number] {
  if (Math.abs(x) > EXACT_LIMIT) return reduceHuge(x);
  const n = Math.round(x * TWO_OVER_PI);
  if (Math.abs(n) < SHORT_LIMIT) {
    const rest = x - n * HALF_PI_33_BITS;
    const tail = n * HALF_PI_REST;
    const hi = rest - tail;
    if (Math.abs(hi) > 1024 * Math.abs(tail)) return [n & 3, hi, rest - hi - tail];
  }
  const p1 = n * HALF_PI_1;
  const e1 = productError(n, HALF_PI_1, p1);
  const p2 = n * HALF_PI_2;
  const e2 = productError(n, HALF_PI_2, p2);
  const d0 = x - p1;
  const d1 = d0 - e1;
  const d2 = d1 - p2;
  const low = sumError(d0, -e1, d1) + sumError(d1, -p2, d2) - e2 - n * HALF_PI_3;
  const hi = d2 + low;
  return [n & 3, hi, d2 - hi + low];
}

const TWO_OVER_PI = 2 / Math.PI;
const EXACT_LIMIT = 1073741824; // 2^30: n still fits the 32 bits of n & 3
const SHORT_LIMIT = 1048576; // 2^20: n times a 33-bit number is exact

// π/2 as 33 bits and the double after them, from fdlibm's e_rem_pio2.c (Sun Microsystems, freely distributable).
const HALF_PI_33_BITS = 1.5707963267341256;
const HALF_PI_REST = 6.077100506506192e-11;
// π/2 as a sum of three doubles.
const HALF_PI_1 = 1.5707963267948966;
const HALF_PI_2 = 6.123233995736766e-17;
const HALF_PI_3 = -1.4973849048591698e-33;

// Enough bits of π/2 for the largest double (below 2^1024) and the closest any double comes to a multiple (2^-62).
const FRACTION_BITS = 1200n;
let halfPi: bigint | undefined;

function reduceHuge(x: number): readonly [number, number, number] {
  halfPi ??= wholeHalfPi();
  // Above 2^30 the last bit of a double is worth 2^-22 or more.
  const magnitude = Math.abs(x);
  const whole =
    magnitude < TWO_53
      ? BigInt(magnitude * TWO_22) << (FRACTION_BITS - 22n)
      : BigInt(magnitude) << FRACTION_BITS;
  let n = whole / halfPi;
  let rest = whole - n * halfPi;
  if (2n * rest > halfPi) {
    n += 1n;
    rest -= halfPi;
  }
  const [hi, lo] = toDoubles(rest);
  const quadrant = Number(n & 3n);
  return x > 0 ? [quadrant, hi, lo] : [(4 - quadrant) & 3, -hi, -lo];
}

/** π/2·2^FRACTION_BITS by Machin's formula, π/4 = 4 atan(1/5) − atan(1/239), with 32 guard bits. */
function wholeHalfPi(): bigint {
  const one = 1n << (FRACTION_BITS + 32n);
  const arctangentOfInverse = (d: bigint): bigint => {
    let sum = 0n;
    let sign = 1n;
    let power = one / d;
    for (let k = 1n; power > 0n; k += 2n) {
      sum += (sign * power) / k;
      power /= d * d;
      sign = -sign;
    }
    return sum;
  };
  return (8n * arctangentOfInverse(5n) - 2n * arctangentOfInverse(239n)) >> 32n;
}

/** The fraction rest/2^FRACTION_BITS as a sum of two doubles. */
function toDoubles(rest: bigint): [number, number] {
  const toDouble = (whole: bigint): number => {
    // Only the upper 160 of 1200 bits are wanted: in whole numbers of 2^-160, scaled by two exact steps.
    return Number(whole >> (FRACTION_BITS - 160n)) * TWO_MINUS_80 * TWO_MINUS_80;
  };
  const hi = toDouble(rest);
  const hiWhole = BigInt(hi * TWO_80 * TWO_80) << (FRACTION_BITS - 160n);
  return [hi, toDouble(rest - hiWhole)];
}

const TWO_22 = 4194304;
const TWO_53 = 9007199254740992;
const TWO_80 = 1.2089258196146292e24;
const TWO_MINUS_80 = 1 / TWO_80;
