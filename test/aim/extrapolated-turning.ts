/**
 * A second opinion on where a free body's turning ends, which shares no code with the program: Euler's equations and q' = ½ q ⊗ ω by Gragg's
 * midpoint rule, extrapolated (Bulirsch & Stoer; Hairer, Nørsett & Wanner, Solving Ordinary Differential Equations I, II.9) to
 * order 16, in steps of 0.4 rad; nothing is held constant.
 */
const SEQUENCE = [2, 4, 6, 8, 10, 12, 14, 16];

/** The quaternion [x, y, z, w] at the end; `spin` in rad/s in the principal frame. */
export function extrapolatedEnd(
  moments: readonly number[],
  start: readonly number[],
  spin: readonly number[],
  duration: number,
): number[] {
  let y = [...start, ...spin];
  let carry = y.map(() => 0);
  for (let left = duration; left > 0; ) {
    // |dω/dt| ≤ |ω|², so that the rate cannot double within half a radian of it
    const h = Math.min(left, 0.4 / Math.max(1e-9, Math.hypot(...y.slice(4))));
    [y, carry] = step(moments, y, carry, h);
    left = left - h < 1e-15 * duration ? 0 : left - h;
  }
  const size = Math.hypot(...y.slice(0, 4));
  return y.slice(0, 4).map((c) => c / size);
}

function slope(I: readonly number[], y: readonly number[]): number[] {
  const [x, v, z, w, p, q, r] = y;
  return [
    0.5 * (w * p + v * r - z * q),
    0.5 * (w * q + z * p - x * r),
    0.5 * (w * r + x * q - v * p),
    -0.5 * (x * p + v * q + z * r),
    ((I[1] - I[2]) / I[0]) * q * r,
    ((I[2] - I[0]) / I[1]) * r * p,
    ((I[0] - I[1]) / I[2]) * p * q,
  ];
}

/** One step; the gain is extrapolated and added with a carried remainder, so that long flights gather no rounding. */
function step(I: readonly number[], y: number[], carry: number[], H: number): [number[], number[]] {
  const table: number[][] = [];
  const first = slope(I, y);
  SEQUENCE.forEach((n, row) => {
    const h = H / n;
    // gains over y, so that small ones keep their digits
    let before = y.map(() => 0);
    let now = first.map((s) => h * s);
    for (let i = 1; i < n; i++) {
      const s = slope(
        I,
        y.map((v, c) => v + now[c]),
      );
      [before, now] = [now, before.map((v, c) => v + 2 * h * s[c])];
    }
    table.push(now);
    for (let k = row - 1; k >= 0; k--) {
      const ratio = (n / SEQUENCE[k]) ** 2;
      table[k] = table[k + 1].map((v, c) => v + (v - table[k][c]) / (ratio - 1));
    }
  });
  const sum = y.map((v, c) => v + (table[0][c] + carry[c]));
  return [sum, sum.map((s, c) => table[0][c] + carry[c] - (s - y[c]))];
}

/** Angle between two orientations, rad. */
export function angleApart(a: readonly number[], b: readonly number[]): number {
  const near = Math.hypot(...a.map((v, i) => v - b[i]));
  const far = Math.hypot(...a.map((v, i) => v + b[i]));
  return 4 * Math.asin(Math.min(1, Math.min(near, far) / 2));
}
