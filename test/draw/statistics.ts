/** Pearson's chi-square of counts in equally likely cells. */
export function chiSquare(shares: readonly number[], cells: number): number {
  const counts = new Array<number>(cells).fill(0);
  for (const share of shares) counts[Math.min(cells - 1, Math.floor(share * cells))]++;
  const expected = shares.length / cells;
  return counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
}

/** NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.4, upper critical values of chi-square, 0.001, 15 degrees of freedom. */
export const CHI_SQUARE_16_CELLS = 37.697;

/** Pearson's correlation. */
export function correlation(a: readonly number[], b: readonly number[]): number {
  const mean = (v: readonly number[]) => v.reduce((s, x) => s + x, 0) / v.length;
  const [ma, mb] = [mean(a), mean(b)];
  let [ab, aa, bb] = [0, 0, 0];
  a.forEach((x, i) => {
    ab += (x - ma) * (b[i] - mb);
    aa += (x - ma) ** 2;
    bb += (b[i] - mb) ** 2;
  });
  return ab / Math.sqrt(aa * bb);
}

/** Bound of a chance correlation of n pairs: 3.291 / √n, the normal distribution's two-sided 0.001 (e-Handbook, 1.3.6.7.1). */
export const chanceCorrelation = (n: number): number => 3.291 / Math.sqrt(n);
