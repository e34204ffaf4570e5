/**
 * Rounding errors as numbers, and the exponents of doubles. With these a result carries twice the digits of a double as
 * an unevaluated sum (hi, lo). Errors of sums: Knuth, TAOCP 2, 4.2.2, theorem B; of products: Veltkamp and Dekker,
 * Numerische Mathematik 18, 224 (1971).
 */

/** a + b − sum, exactly, where `sum` is the rounded a + b. */
export function sumError(a: number, b: number, sum: number): number {
  const bRounded = sum - a;
  return a - (sum - bRounded) + (b - bRounded);
}

/** a·b − product, exactly, where `product` is the rounded a·b; for factors below 2^995 whose error does not underflow. */
export function productError(a: number, b: number, product: number): number {
  const aBig = a * SPLITTER;
  const aHigh = aBig - (aBig - a);
  const aLow = a - aHigh;
  const bBig = b * SPLITTER;
  const bHigh = bBig - (bBig - b);
  const bLow = b - bHigh;
  return aHigh * bHigh - product + aHigh * bLow + aLow * bHigh + aLow * bLow;
}

/** floor(log2|x|) of a finite x ≠ 0. */
export function exponent(x: number): number {
  view.setFloat64(0, x);
  const biased = (view.getUint32(0) >>> 20) & 0x7ff;
  return biased === 0 ? exponent(x * TWO_54) - 54 : biased - 1023;
}

/** x·2^k, rounded once. */
export function timesPowerOfTwo(x: number, k: number): number {
  if (k > 1023) return timesPowerOfTwo(x * TWO_1023, k - 1023);
  if (k >= -1022) return x * powerOfTwo(k);
  // Large powers first and one small one last, so that only the last product can round.
  if (k < -2200) return x * 0;
  if (k < -1022 - 969) return timesPowerOfTwo(x * powerOfTwo(-969), k + 969);
  return x * powerOfTwo(k + 969) * powerOfTwo(-969);
}

const SPLITTER = 134217729; // 2^27 + 1
const TWO_54 = 18014398509481984;
const TWO_1023 = 8.98846567431158e307;
const view = new DataView(new ArrayBuffer(8));

function powerOfTwo(k: number): number {
  view.setUint32(0, (k + 1023) << 20);
  view.setUint32(4, 0);
  return view.getFloat64(0);
}
