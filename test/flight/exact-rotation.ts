/**
 * A second opinion on free rotation that shares no code with the program: Euler's equations and q' = ½ q ⊗ ω by Taylor
 * series in whole numbers counting units of 2^-200 (60 digits), with no invariant held. Slow, and right to far more
 * digits than a double has.
 */
const BITS = 200n;
const ONE = 1n << BITS;
const DEGREE = 56;

export interface Sample {
  orientation: number[];
  spin: number[];
}

/** Orientation and spin (principal frame) at each of the ascending `times`, from exactly the doubles given. */
export function exactRotation(
  orientation: number[],
  spin: number[],
  moments: number[],
  times: number[],
): Sample[] {
  const I = moments.map(fixed);
  const k = [divide(I[1] - I[2], I[0]), divide(I[2] - I[0], I[1]), divide(I[0] - I[1], I[2])];
  let w = spin.map(fixed);
  let q = unit(orientation.map(fixed));
  let now = 0n;
  let last = ONE;
  return times.map((time) => {
    const target = fixed(time);
    while (now < target) {
      const series = expand(q, w, k);
      let h = target - now < 2n * last ? target - now : 2n * last;
      while (!converged(series, h)) h >>= 1n;
      const state = series.map((coefficients) => evaluate(coefficients, h));
      w = state.slice(0, 3);
      q = state.slice(3);
      now += h;
      last = h;
    }
    return { orientation: q.map(double), spin: w.map(double) };
  });
}

/** The Taylor coefficients of ω (three) and q (four). */
function expand(q: bigint[], w: bigint[], k: bigint[]): bigint[][] {
  const [x, y, z] = w.map((value) => [value]);
  const [qx, qy, qz, qw] = q.map((value) => [value]);
  const product = (a: bigint[], b: bigint[], n: number): bigint => {
    let sum = 0n;
    for (let i = 0; i <= n; i++) sum += a[i] * b[n - i];
    return sum >> BITS;
  };
  for (let n = 0; n < DEGREE; n++) {
    const times = BigInt(n + 1);
    const p = (a: bigint[], b: bigint[]): bigint => product(a, b, n);
    const next = [
      ((k[0] * p(y, z)) >> BITS) / times,
      ((k[1] * p(z, x)) >> BITS) / times,
      ((k[2] * p(x, y)) >> BITS) / times,
      (p(qw, x) + p(qy, z) - p(qz, y)) / (2n * times),
      (p(qw, y) + p(qz, x) - p(qx, z)) / (2n * times),
      (p(qw, z) + p(qx, y) - p(qy, x)) / (2n * times),
      -(p(qx, x) + p(qy, y) + p(qz, z)) / (2n * times),
    ];
    [x, y, z, qx, qy, qz, qw].forEach((series, i) => {
      series.push(next[i]);
    });
  }
  return [x, y, z, qx, qy, qz, qw];
}

/** Whether the last terms, with the step h, are below 1e-45. */
function converged(series: bigint[][], h: bigint): boolean {
  const term = (c: bigint[], n: number): bigint => {
    let value = c[n];
    for (let i = 0; i < n; i++) value = (value * h) >> BITS;
    return magnitude(value);
  };
  const small = ONE >> 150n;
  return series.every((c) => term(c, DEGREE) < small && term(c, DEGREE - 1) < small);
}

const evaluate = (c: bigint[], h: bigint): bigint =>
  c.reduceRight((sum, value) => ((sum * h) >> BITS) + value);

const magnitude = (a: bigint): bigint => (a < 0n ? -a : a);

const divide = (a: bigint, b: bigint): bigint => (a << BITS) / b;

function unit(q: bigint[]): bigint[] {
  const square = q.reduce((sum, value) => sum + value * value, 0n);
  let root = ONE;
  for (let i = 0; i < 2000; i++) {
    const better = (root + square / root) >> 1n;
    if (magnitude(better - root) <= 1n) break;
    root = better;
  }
  return q.map((value) => divide(value, root));
}

/** The double as a multiple of 2^-200: exact for all that are not tinier than about 1e-44. */
function fixed(value: number): bigint {
  let doublings = 0n;
  let scaled = value;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    doublings++;
  }
  return (BigInt(scaled) << BITS) >> doublings;
}

const double = (value: bigint): number => Number(value >> (BITS - 100n)) / 2 ** 100;
