/**
 * Elementary functions to well over 60 digits in whole-number arithmetic, by other methods than those of src/math: series
 * with argument halving, Newton's method, integer roots. A number v is held as the BigInt v·2^bits.
 */

/** The whole numbers m, e with x = m·2^e exactly. */
export function dissect(x: number): { m: bigint; e: number } {
  const bits = new DataView(new ArrayBuffer(8));
  bits.setFloat64(0, x);
  const word = bits.getBigUint64(0);
  const field = Number((word >> 52n) & 0x7ffn);
  const fraction = word & ((1n << 52n) - 1n);
  const m = field === 0 ? fraction : fraction | (1n << 52n);
  return { m: x < 0 ? -m : m, e: Math.max(field, 1) - 1075 };
}

/** x·2^bits, exact where bits ≥ 1074 or x has no lower digits. */
export function fixed(x: number, bits: number): bigint {
  const { m, e } = dissect(x);
  return e + bits >= 0 ? m << BigInt(e + bits) : m >> BigInt(-e - bits);
}

const absolute = (v: bigint): bigint => (v < 0n ? -v : v);
const length = (v: bigint): number => (v === 0n ? 0 : absolute(v).toString(2).length);

/** |value − reference| in units of the last place of the reference. */
export function ulpError(value: number, reference: bigint, bits: number): number {
  const exponent = Math.max(length(reference) - 1 - bits, -1022);
  const extra = Math.max(0, 1100 - bits); // so that the double is exact
  const difference = absolute(fixed(value, bits + extra) - (reference << BigInt(extra)));
  const shift = exponent - 52 + bits + extra - 30;
  return Number(shift >= 0 ? difference >> BigInt(shift) : difference << BigInt(-shift)) / 2 ** 30;
}

export function squareRoot(v: bigint, bits: number): bigint {
  return wholeRoot(v << BigInt(bits), 2n);
}

/** floor of the n-th root, by Newton's method from above. */
export function wholeRoot(v: bigint, n: bigint): bigint {
  if (v === 0n) return 0n;
  let root = 1n << BigInt(Math.ceil(length(v) / Number(n)) + 1);
  for (;;) {
    const next = ((n - 1n) * root + v / root ** (n - 1n)) / n;
    if (next >= root) return root;
    root = next;
  }
}

const piCache = new Map<number, bigint>();

/** π by Størmer's formula (1896): π/4 = 44 atan(1/57) + 7 atan(1/239) − 12 atan(1/682) + 24 atan(1/12943). */
export function pi(bits: number): bigint {
  const known = piCache.get(bits);
  if (known !== undefined) return known;
  const one = 1n << BigInt(bits + 32);
  const part = (factor: bigint, d: bigint): bigint => factor * arctangentSeries(one / d, bits + 32);
  const value = (4n * (part(44n, 57n) + part(7n, 239n) - part(12n, 682n) + part(24n, 12943n))) >> 32n;
  piCache.set(bits, value);
  return value;
}

function arctangentSeries(v: bigint, bits: number): bigint {
  const shift = BigInt(bits);
  const square = (v * v) >> shift;
  let power = v;
  let sum = 0n;
  for (let k = 1n; absolute(power) > 1n; k += 2n) {
    sum += k % 4n === 1n ? power / k : -(power / k);
    power = (power * square) >> shift;
  }
  return sum;
}

/** Inverse tangent of top/bottom (top ≥ 0, bottom > 0): four halvings of the angle, then the series. */
export function arctangent(top: bigint, bottom: bigint, bits: number): bigint {
  const inner = bits + 32;
  const one = 1n << BigInt(inner);
  if (top > bottom) return pi(bits) / 2n - arctangent(bottom, top, bits);
  let v = (top << BigInt(inner)) / bottom;
  for (let i = 0; i < 4; i++)
    v = (v << BigInt(inner)) / (one + squareRoot(one + ((v * v) >> BigInt(inner)), inner));
  return arctangentSeries(v, inner) >> 28n;
}

/** Sine and cosine of a double: whole turns taken off, five halvings, series, doublings. */
export function sineCosine(x: number, bits: number): { sine: bigint; cosine: bigint } {
  const inner = bits + 32;
  const big = Math.max(0, dissect(x).e + 60);
  const turn = 2n * pi(inner + big);
  const v = (((fixed(x, inner + big) % turn) >> BigInt(big)) as bigint) >> 5n;
  const shift = BigInt(inner);
  const one = 1n << shift;
  const square = (v * v) >> shift;
  let term = v;
  let sine = 0n;
  for (let k = 1n; absolute(term) > 1n; k += 2n) {
    sine += term;
    term = -((term * square) >> shift) / ((k + 1n) * (k + 2n));
  }
  // 1 − cos, whose doubling 2v(2 − v) loses nothing near zero
  term = square / 2n;
  let versine = 0n;
  for (let k = 2n; absolute(term) > 1n; k += 2n) {
    versine += term;
    term = -((term * square) >> shift) / ((k + 1n) * (k + 2n));
  }
  for (let i = 0; i < 5; i++) {
    sine = (2n * sine * (one - versine)) >> shift;
    versine = (2n * versine * (2n * one - versine)) >> shift;
  }
  return { sine: sine >> 32n, cosine: (one - versine) >> 32n };
}

/** e^v: the argument divided by 2^12, the series, twelve squarings. The result has at least `bits` fraction bits' worth of digits below 1. */
export function exponential(v: bigint, bits: number): bigint {
  const shift = BigInt(bits + 1200); // e^745 takes 1,075 bits before the point, e^-745 as many zeros behind it
  const one = 1n << shift;
  const small = (v << 1200n) >> 12n;
  let term = one;
  let sum = 0n;
  for (let k = 1n; absolute(term) > 1n; k++) {
    sum += term;
    term = ((term * small) >> shift) / k;
  }
  for (let i = 0; i < 12; i++) sum = (sum * sum) >> shift;
  return sum >> 1200n;
}

/** ln of a double: 2^k taken out, then 2 artanh((m − 1)/(m + 1)) after three square roots. */
export function logarithm(x: number, bits: number): bigint {
  const { m, e } = dissect(x);
  const digits = length(m);
  const k = digits - 1 + e;
  return BigInt(k) * logarithmOfRatio(2n, 1n, bits) + logarithmOfRatio(m, 1n << BigInt(digits - 1), bits);
}

const ratioCache = new Map<string, bigint>();

function logarithmOfRatio(top: bigint, bottom: bigint, bits: number): bigint {
  const key = `${top}/${bottom}/${bits}`;
  const known = top === 2n ? ratioCache.get(key) : undefined;
  if (known !== undefined) return known;
  const inner = bits + 32;
  const shift = BigInt(inner);
  const one = 1n << shift;
  let v = (top << shift) / bottom;
  for (let i = 0; i < 3; i++) v = squareRoot(v, inner);
  const s = ((v - one) << shift) / (v + one);
  const square = (s * s) >> shift;
  let power = s;
  let sum = 0n;
  for (let n = 1n; absolute(power) > 1n; n += 2n) {
    sum += power / n;
    power = (power * square) >> shift;
  }
  const value = (16n * sum) >> 32n;
  if (top === 2n) ratioCache.set(key, value);
  return value;
}
