import { describe, expect, it } from "vitest";
import { cross, dot, length, normalize, perpendicular, type Vec3 } from "../../src/math/vec3.js";

describe("vectors", () => {
  it("lengths neither overflow nor vanish", () => {
    // 2² + 3² + 6² = 7²
    expect(length([2, 3, -6])).toBe(7);
    expect(length([2e200, 3e200, 6e200]) / 1e200).toBeCloseTo(7, 14);
    expect(length([2e-200, 3e-200, 6e-200]) / 1e-200).toBeCloseTo(7, 14);
    expect(length([2e307, 3e307, 6e307]) / 1e307).toBeCloseTo(7, 14);
    expect(length([0, -Number.MIN_VALUE, 0])).toBe(Number.MIN_VALUE);
    expect(length([0, 0, 0])).toBe(0);
    expect(length([1, Number.NaN, 2])).toBeNaN();
  });

  it("unit vectors have length 1 at every scale, and zero stays zero", () => {
    for (const s of [5e-324, 1e-320, 1e-310, 1e-160, 1e-3, 1, 1e160, 1e307]) {
      const unit = normalize([s, -s, s]);
      for (const x of unit) expect(Math.abs(x)).toBeCloseTo(1 / Math.sqrt(3), 14);
    }
    expect(normalize([0, 0, 0])).toEqual([0, 0, 0]);
  });

  it("a perpendicular is a unit vector at right angles, the same for the same direction", () => {
    for (const v of [
      [1, 0, 0],
      [0, -2, 0],
      [0, 0, 3],
      [1, 1, 1],
      [1e-9, 1, 0],
      [-3, 2, 5],
      [1e-200, 0, 0],
    ] as Vec3[]) {
      // biome-ignore format: a list of vectors
      const p = perpendicular(v);
      expect(Math.abs(dot(p, normalize(v)))).toBeLessThan(1e-15);
      expect(length(p)).toBeCloseTo(1, 14);
      expect(perpendicular(v)).toEqual(p);
    }
  });

  it("cross products follow the right hand", () => {
    expect(cross([1, 0, 0], [0, 1, 0])).toEqual([0, 0, 1]);
    expect(cross([0, 1, 0], [0, 0, 1])).toEqual([1, 0, 0]);
  });
});
