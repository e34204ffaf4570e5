/**
 * Picks at most `most` of the whole numbers `low` to `high`, evenly spread and the ends among them, into `out`. Returns how many.
 */
export function spreadSamples(low: number, high: number, most: number, out: Int32Array): number {
  const all = high - low + 1;
  if (all <= 0) return 0;
  if (all <= most) {
    for (let i = 0; i < all; i++) out[i] = low + i;
    return all;
  }
  for (let i = 0; i < most; i++) out[i] = low + Math.round((i * (all - 1)) / (most - 1));
  return most;
}
