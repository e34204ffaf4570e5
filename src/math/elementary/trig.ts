import { reduceByHalfPi } from "./half-pi.js";

/** Sine of an angle in radians; error below 1 ulp for every double. */
export function sin(x: number): number {
  if (Math.abs(x) <= QUARTER_PI) return Math.abs(x) < TINY ? x : sinNearZero(x, 0);
  if (!Number.isFinite(x)) return Number.NaN;
  const [quadrant, hi, lo] = reduceByHalfPi(x);
  const value = quadrant & 1 ? cosNearZero(hi, lo) : sinNearZero(hi, lo);
  return quadrant & 2 ? -value : value;
}

/** Cosine of an angle in radians; error below 1 ulp for every double. */
export function cos(x: number): number {
  if (Math.abs(x) <= QUARTER_PI) return cosNearZero(x, 0);
  if (!Number.isFinite(x)) return Number.NaN;
  const [quadrant, hi, lo] = reduceByHalfPi(x);
  const value = quadrant & 1 ? sinNearZero(hi, lo) : cosNearZero(hi, lo);
  return quadrant === 1 || quadrant === 2 ? -value : value;
}

/** Tangent of an angle in radians; error below 2 ulp for every double. */
export function tan(x: number): number {
  if (Math.abs(x) < TINY) return x;
  if (!Number.isFinite(x)) return Number.NaN;
  const [quadrant, hi, lo] = reduceByHalfPi(x);
  const s = sinNearZero(hi, lo);
  const c = cosNearZero(hi, lo);
  return quadrant & 1 ? -c / s : s / c;
}

const QUARTER_PI = 0.7853981633974483;
const TINY = 7.450580596923828e-9; // 2^-27: x³/6 is less than half an ulp

// Polynomials and the order of their terms: fdlibm's k_sin.c and FreeBSD's k_cos.c (Sun Microsystems, freely distributable).

/** sin(x + y) for |x| ≤ π/4 and a y below its last bit. */
function sinNearZero(x: number, y: number): number {
  const z = x * x;
  const cube = z * x;
  const r =
    8.33333333332249e-3 +
    z *
      (-1.984126982985795e-4 +
        z * (2.7557313707070068e-6 + z * (-2.5050760253406863e-8 + z * 1.58969099521155e-10)));
  return x - (z * (0.5 * y - cube * r) - y - cube * -1.6666666666666632e-1);
}

/** cos(x + y) for |x| ≤ π/4 and a y below its last bit. */
function cosNearZero(x: number, y: number): number {
  const z = x * x;
  const r =
    z *
    (4.16666666666666e-2 +
      z *
        (-1.388888888887411e-3 +
          z *
            (2.480158728947673e-5 +
              z * (-2.7557314351390663e-7 + z * (2.087572321298175e-9 + z * -1.1359647557788195e-11)))));
  const half = 0.5 * z;
  const w = 1 - half;
  return w + (1 - w - half + (z * r - x * y));
}
