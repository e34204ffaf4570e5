/**
 * The complete elliptic integral of the first kind of the complementary modulus `k1` = √(1 − k²), 0 to 1, by the
 * arithmetic-geometric mean (Abramowitz & Stegun, 17.6); infinite for 0.
 */
export function completeK(k1: number): number {
  if (k1 === 0) return Number.POSITIVE_INFINITY;
  let [a, b] = [1, k1];
  // Digits double with each step; the last ones differ by rounding alone.
  for (let step = 0; step < 40 && Math.abs(a - b) > 1e-15 * a; step++)
    [a, b] = [(a + b) / 2, Math.sqrt(a * b)];
  return Math.PI / (a + b);
}
