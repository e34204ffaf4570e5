import { describe, expect, it } from "vitest";
import { cutNormal } from "../../src/draw/cut-normal.js";

describe("the cut bell curve", () => {
  // Python 3's statistics.NormalDist().inv_cdf(T + u (1 − 2 T)), T = Φ(−3) = 0.0013498980316300945 (math.erfc)
  it.each([
    [0.001, -2.827288835871115],
    [0.05, -1.633186318914487],
    [0.2, -0.8387317137915762],
    [0.5, 0],
    [0.7, 0.5228481654337888],
    [0.93, 1.4671993834554717],
    [0.9999, 2.9782223121370226],
  ])("has at the quantile %f the value %f", (quantile, value) => {
    expect(Math.abs(cutNormal(quantile) - value)).toBeLessThan(4e-15);
  });

  it("ends at three standard deviations", () => {
    expect(cutNormal(0)).toBeCloseTo(-3, 14);
    expect(cutNormal(1)).toBeCloseTo(3, 14);
    for (let i = 0; i <= 1000; i++) expect(Math.abs(cutNormal(i / 1000))).toBeLessThanOrEqual(3);
  });

  it("rises all the way and is the same on both sides", () => {
    let last = Number.NEGATIVE_INFINITY;
    for (let i = 0; i <= 4096; i++) {
      const value = cutNormal(i / 4096);
      expect(value).toBeGreaterThan(last);
      expect(Math.abs(value + cutNormal(1 - i / 4096))).toBeLessThan(1e-12);
      last = value;
    }
  });
});
