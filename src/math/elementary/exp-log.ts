import { exponent, timesPowerOfTwo } from "./exact.js";

/** e^x; error below 1 ulp, subnormal results rounded once. */
export const exp = (x: number): number => expOfSum(x, 0);

/** Natural logarithm; error below 1 ulp. Reduction and polynomial of fdlibm's e_log.c (Sun Microsystems, freely distributable). */
export function log(x: number): number {
  if (!(x > 0)) return x === 0 ? Number.NEGATIVE_INFINITY : Number.NaN;
  if (x === Number.POSITIVE_INFINITY) return x;
  const k = nearestExponent(x);
  const f = timesPowerOfTwo(x, -k) - 1;
  const s = f / (2 + f);
  const z = s * s;
  const w = z * z;
  const even = w * (3.999999999940942e-1 + w * (2.2222198432149784e-1 + w * 1.5313837699209373e-1));
  const odd =
    z *
    (6.666666666666735e-1 +
      w * (2.857142874366239e-1 + w * (1.818357216161805e-1 + w * 1.4798198605116586e-1)));
  const half = 0.5 * f * f;
  return k * LN2_HIGH - (half - (s * (half + even + odd) + k * LN2_LOW) - f);
}

/** e^(x + y) for a y below x's last bits; reduction and polynomial of fdlibm's e_exp.c (Sun Microsystems, freely distributable). */
export function expOfSum(x: number, y: number): number {
  if (!(x < 720)) return x >= 720 ? Number.POSITIVE_INFINITY : x;
  if (x < -760) return 0;
  const k = Math.round(x * Math.LOG2E);
  const hi = x - k * LN2_HIGH;
  const lo = k * LN2_LOW - y;
  const r = hi - lo;
  const z = r * r;
  const c =
    r -
    z *
      (1.6666666666666602e-1 +
        z *
          (-2.7777777777015593e-3 +
            z * (6.613756321437934e-5 + z * (-1.6533902205465252e-6 + z * 4.1381367970572385e-8))));
  // 1 + hi with its rounding error kept: fdlibm's own order of these terms loses a third of an ulp more.
  const sum = 1 + hi;
  return timesPowerOfTwo(sum + (hi - (sum - 1) + ((r * c) / (2 - c) - lo)), k);
}

/** The k that puts x·2^-k between √½ and √2, for a finite x > 0. */
export function nearestExponent(x: number): number {
  const k = exponent(x);
  return timesPowerOfTwo(x, -k) > Math.SQRT2 ? k + 1 : k;
}

// ln 2 as 32 bits, exact when multiplied by an exponent, and the double after them (fdlibm).
export const LN2_HIGH = 6.931471803691238e-1;
export const LN2_LOW = 1.9082149292705877e-10;
