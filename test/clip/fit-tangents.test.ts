import { expect, it } from "vitest";
import { TangentFitter } from "../../src/clip/fit-tangents.js";
import { hermiteWeights } from "../../src/clip/hermite.js";
import { angleBetween, normalize, type Quat } from "../../src/math/quat.js";

it("directions that a segment can play are played by the one that is fitted to them", () => {
  const from = Float64Array.of(0, 0, 0, 1);
  const to = Float64Array.of(0.8, 0.1, 0, 0.5916);
  const tangents = [0.5, 0.9, -0.3, 0.4, 1.2, -0.6, 0.2, -0.9];
  const count = 14;
  const shares = Float64Array.from({ length: count }, (_, n) => (n + 1) / (count + 1));
  const targets = new Float64Array(4 * count);
  const weights = new Float64Array(4);
  shares.forEach((share, n) => {
    hermiteWeights(share, weights);
    const h = [0, 1, 2, 3].map(
      (i) =>
        weights[0] * from[i] + weights[1] * tangents[i] + weights[2] * to[i] + weights[3] * tangents[4 + i],
    );
    const size = Math.hypot(...h);
    targets.set(
      h.map((x) => x / size),
      4 * n,
    );
  });
  const found = new Float64Array(8);
  new TangentFitter(count).fit(count, shares, targets, from, to, found);
  let worst = 0;
  shares.forEach((share, n) => {
    hermiteWeights(share, weights);
    const h = [0, 1, 2, 3].map(
      (i) => weights[0] * from[i] + weights[1] * found[i] + weights[2] * to[i] + weights[3] * found[4 + i],
    );
    const q = normalize(h as unknown as Quat);
    worst = Math.max(worst, angleBetween(q, [...targets.subarray(4 * n, 4 * n + 4)] as unknown as Quat));
  });
  // The damping keeps it from nothing at all.
  expect(worst).toBeLessThan(1e-5);
});
