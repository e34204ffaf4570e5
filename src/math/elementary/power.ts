import { productError, sumError, timesPowerOfTwo } from "./exact.js";
import { expOfSum, LN2_HIGH, LN2_LOW, nearestExponent } from "./exp-log.js";

/**
 * x to the power y, special values as ECMAScript's Math.pow; error below 1 ulp (a logarithm of about 66 bits, then e to
 * its product with y).
 */
export function pow(x: number, y: number): number {
  if (y === 0) return 1;
  if (Number.isNaN(x) || Number.isNaN(y)) return Number.NaN;
  const a = Math.abs(x);
  if (Math.abs(y) === Number.POSITIVE_INFINITY) {
    if (a === 1) return Number.NaN;
    return a > 1 === y > 0 ? Number.POSITIVE_INFINITY : 0;
  }
  const odd = Number.isInteger(y) && Math.abs(y % 2) === 1;
  if (a === 0 || a === Number.POSITIVE_INFINITY) {
    const value = y > 0 ? a : 1 / a;
    return odd && (x < 0 || Object.is(x, -0)) ? -value : value;
  }
  if (x < 0 && !Number.isInteger(y)) return Number.NaN;
  const value = a === 1 ? 1 : positivePower(a, y);
  return x < 0 && odd ? -value : value;
}

function positivePower(x: number, y: number): number {
  const [hi, lo] = logarithm(x);
  const product = y * hi;
  if (product > 720) return Number.POSITIVE_INFINITY;
  if (product < -760) return 0;
  return expOfSum(product, productError(y, hi, product) + y * lo);
}

/** ln x as a sum of two doubles: 2 artanh((m − 1)/(m + 1)) + k ln 2 by its Taylor series (DLMF 4.6.4). */
function logarithm(x: number): [number, number] {
  const k = nearestExponent(x);
  const m = timesPowerOfTwo(x, -k);
  // s + sLow = (m − 1)/(m + 1)
  const top = m - 1;
  const bottom = m + 1;
  const s = top / bottom;
  const back = s * bottom;
  const sLow = (top - back - productError(s, bottom, back) - s * sumError(m, 1, bottom)) / bottom;
  // z + zLow = s²
  const z = s * s;
  const zLow = productError(s, s, z) + 2 * s * sLow;
  // u + uLow = s²/3 + s⁴/5 + …
  const third = z * THIRD;
  const rest = z * z * series(z);
  const u = third + rest;
  const uLow =
    productError(z, THIRD, third) + z * THIRD_LOW + zLow * (THIRD + 0.4 * z) + sumError(third, rest, u);
  // half + halfLow = artanh(s)
  const p = s * u;
  const half = s + p;
  const halfLow = sumError(s, p, half) + sLow + productError(s, u, p) + s * uLow + sLow * u;
  const whole = k * LN2_HIGH;
  const sum = whole + 2 * half;
  const low = sumError(whole, 2 * half, sum) + 2 * halfLow + k * LN2_LOW;
  const hi = sum + low;
  return [hi, sum - hi + low];
}

const THIRD = 1 / 3;
const THIRD_LOW = 1.850371707708594e-17; // 1/3 − THIRD = 2^-54/3

/** 1/5 + z/7 + z²/9 + … for z up to 0.0295, to 2^-58. */
function series(z: number): number {
  let sum = 0;
  for (let n = 27; n >= 5; n -= 2) sum = sum * z + 1 / n;
  return sum;
}
