import { exponent, productError, sumError, timesPowerOfTwo } from "./exact.js";

/** Inverse sine in radians, −π/2 to π/2; NaN outside −1 to 1; error below 1 ulp. */
export function asin(x: number): number {
  const a = Math.abs(x);
  if (!(a <= 1)) return Number.NaN;
  if (a < 0.5) return a < TINY ? x : x + x * arcsineSeries(x * x);
  // asin(a) = π/2 − 2 asin(√((1 − a)/2))
  const [s, rest] = halfComplement(a);
  const angle = difference(HALF_PI, HALF_PI_LOW, 2 * s, 2 * rest);
  return x < 0 ? -angle : angle;
}

/** Inverse cosine in radians, 0 to π; NaN outside −1 to 1; error below 1 ulp. */
export function acos(x: number): number {
  const a = Math.abs(x);
  if (!(a <= 1)) return Number.NaN;
  if (a < 0.5) return difference(HALF_PI, HALF_PI_LOW, x, x * arcsineSeries(x * x));
  const [s, rest] = halfComplement(a);
  return x > 0 ? 2 * (s + rest) : difference(Math.PI, PI_LOW, 2 * s, 2 * rest);
}

/** Inverse tangent in radians, −π/2 to π/2; error below 1 ulp. */
export const atan = (x: number): number =>
  x === 0 ? x : x < 0 ? -arctangent(-x, 0, 0, 1) : arctangent(x, 0, 0, 1);

/** The angle of the point (x, y) in radians, −π to π, as ECMAScript's Math.atan2; error below 1 ulp. */
export function atan2(y: number, x: number): number {
  if (Number.isNaN(x) || Number.isNaN(y)) return Number.NaN;
  const angle = angleInUpperHalf(Math.abs(y), x);
  return y < 0 || Object.is(y, -0) ? -angle : angle;
}

const TINY = 7.450580596923828e-9; // 2^-27
const HALF_PI = Math.PI / 2;
const HALF_PI_LOW = 6.123233995736766e-17; // what the double misses
const PI_LOW = 2 * HALF_PI_LOW;

function angleInUpperHalf(y: number, x: number): number {
  const left = x < 0 || Object.is(x, -0);
  if (y === 0) return left ? Math.PI : 0;
  if (x === 0) return HALF_PI;
  const ax = Math.abs(x);
  if (y === Number.POSITIVE_INFINITY)
    return ax !== Number.POSITIVE_INFINITY ? HALF_PI : left ? 0.75 * Math.PI : 0.25 * Math.PI;
  if (ax === Number.POSITIVE_INFINITY) return left ? Math.PI : 0;
  const shift = exponent(y) - exponent(ax);
  if (shift > 64) return HALF_PI;
  if (shift < -64) return left ? Math.PI : y / ax;
  // Scaled to keep the exact product below from overflow and underflow.
  const v = timesPowerOfTwo(y, -exponent(y));
  const u = timesPowerOfTwo(ax, -exponent(y));
  const q = v / u;
  const p = q * u;
  const rest = (v - p - productError(q, u, p)) / u;
  return left ? arctangent(q, rest, Math.PI, -1) : arctangent(q, rest, 0, 1);
}

/**
 * offset + sign·atan(x + y) for x > 0 and a y below its last bit; offset 0 or π. Breakpoints 7/16, 11/16, 19/16, 39/16 and
 * polynomial of fdlibm's s_atan.c (Sun Microsystems, freely distributable).
 */
function arctangent(x: number, y: number, offset: number, sign: number): number {
  if (Number.isNaN(x)) return x;
  const low = offset === 0 ? 0 : PI_LOW;
  let base = 0;
  let baseLow = 0;
  let t = x;
  let derivative = 1;
  if (x >= 0.4375) {
    let top: number;
    let bottom: number;
    if (x < 0.6875) {
      [base, baseLow] = [4.636476090008061e-1, 2.2698777452961687e-17];
      [top, bottom] = [2 * x - 1, 2 + x];
    } else if (x < 1.1875) {
      [base, baseLow] = [7.853981633974483e-1, 3.061616997868383e-17];
      [top, bottom] = [x - 1, x + 1];
    } else if (x < 2.4375) {
      [base, baseLow] = [9.82793723247329e-1, 1.3903311031230998e-17];
      [top, bottom] = [x - 1.5, 1 + 1.5 * x];
    } else {
      [base, baseLow] = [HALF_PI, HALF_PI_LOW];
      [top, bottom] = [-1, x];
    }
    t = top / bottom;
    derivative = 1 / (1 + x * x);
  }
  const z = t * t;
  const w = z * z;
  const even =
    z *
    (3.333333333333293e-1 +
      w *
        (1.4285714272503466e-1 +
          w *
            (9.090887133436507e-2 +
              w * (6.661073137387531e-2 + w * (4.9768779946159324e-2 + w * 1.6285820115365782e-2)))));
  const odd =
    w *
    (-1.9999999999876483e-1 +
      w *
        (-1.1111110405462356e-1 +
          w * (-7.69187620504483e-2 + w * (-5.8335701337905735e-2 + w * -3.6531572744216916e-2))));
  if (base === 0) derivative = 1 / (1 + z);
  const small = y * derivative + baseLow - t * (even + odd);
  if (offset === 0 && base === 0) return t + small;
  const whole = offset + sign * base;
  const whole2 = whole + sign * t;
  const error = sumError(offset, sign * base, whole) + sumError(whole, sign * t, whole2);
  return whole2 + (sign * small + low + error);
}

/** (asin(√z) − √z)/√z for z ≤ 1/4, rational function of fdlibm's e_asin.c (Sun Microsystems, freely distributable). */
function arcsineSeries(z: number): number {
  const p =
    z *
    (1.6666666666666666e-1 +
      z *
        (-3.255658186224009e-1 +
          z *
            (2.0121253213486293e-1 +
              z * (-4.005553450067941e-2 + z * (7.915349942898145e-4 + z * 3.479331075960212e-5)))));
  const q =
    1 +
    z *
      (-2.403394911734414 +
        z * (2.0209457602335057 + z * (-6.882839716054533e-1 + z * 7.703815055590194e-2)));
  return p / q;
}

/** asin(√((1 − a)/2)) for a ≥ 1/2, as a double and what is missing from it. */
function halfComplement(a: number): [number, number] {
  const z = (1 - a) * 0.5;
  if (z === 0) return [0, 0];
  const s = Math.sqrt(z);
  const square = s * s;
  const rootError = (z - square - productError(s, s, square)) / (2 * s);
  return [s, rootError + s * arcsineSeries(z)];
}

/** (a + aLow) − (b + bLow) */
function difference(a: number, aLow: number, b: number, bLow: number): number {
  const d = a - b;
  return d + (sumError(a, -b, d) + aLow - bLow);
}
