import { describe, expect, test } from "vitest";
import { kindOf } from "../../src/prop/kind.js";

describe("kinds of body", () => {
  test("go by the moments, of which those within 1 % are equal", () => {
    // Landau & Lifshitz, Mechanics, §32: three equal moments, two, none; oblate and prolate by the odd one.
    expect(kindOf([2, 2.01, 2.02]).kind).toBe("spherical top");
    expect(kindOf([1, 1.009, 2]).kind).toBe("oblate symmetric top");
    expect(kindOf([1, 2, 2.01]).kind).toBe("prolate symmetric top");
    expect(kindOf([1, 1.02, 2]).kind).toBe("asymmetric top");
  });

  test("a thin disc wobbles twice a turn", () => {
    // Tuleja et al., "Feynman's wobbling plate", Am. J. Phys. 75 (2007) 240: 2 : 1 for a thin disc and a small tilt.
    expect(kindOf([1, 1, 2]).axes.short).toEqual({ behaviour: "steady", wobblesPerTurn: 2 });
  });

  test("a slender rod spun about its length wobbles as seldom as its moments stand to each other", () => {
    // Regular precession, Landau & Lifshitz, Mechanics, §33: rate L/I1 where the spin is L/I3.
    const { long } = kindOf([0.1, 5, 5]).axes;
    expect(long).toEqual({ behaviour: "steady", wobblesPerTurn: expect.closeTo(0.02, 14) });
  });

  test("about the axes across a symmetric body a spin neither holds nor tumbles", () => {
    expect(kindOf([1, 1, 2]).axes.middle).toEqual({ behaviour: "drifts" });
    expect(kindOf([1, 2, 2]).axes.short).toEqual({ behaviour: "drifts" });
  });

  test("a small tilt grows about the middle axis alone, as the linearised equations say", () => {
    // Euler's equations I ω' = I ω × ω near ω = (0, 1, 0): a' = λ c (I2 − I3)/I1, c' = (I1 − I2)/I3 a; growth √((I2−I1)(I3−I2)/(I1 I3)).
    // For 1, 2, 3: √(1/3), in a turn exp(2π/√3) = 37.62.
    const { long, middle, short } = kindOf([1, 2, 3]).axes;
    expect(middle).toEqual({
      behaviour: "tumbles",
      growthPerTurn: expect.closeTo(Math.exp((2 * Math.PI) / Math.sqrt(3)), 9),
    });
    expect([long.behaviour, short.behaviour]).toEqual(["steady", "steady"]);
  });

  test("the wobble of a body of three moments is what its equations of motion give", () => {
    // Counted in a numerical integration below: turns of the short (long) axis about the angular momentum, per turn of the body.
    for (const axis of [0, 2] as const) {
      const moments = [1, 1.6, 2.3] as const;
      const behaviour = kindOf([...moments]).axes[axis === 0 ? "long" : "short"];
      const counted = countWobbles(moments, axis);
      expect(behaviour).toEqual({ behaviour: "steady", wobblesPerTurn: expect.closeTo(counted, 3) });
    }
  });
});

/** Classical Runge–Kutta on Euler's equations and the rotation matrix, 60 turns with a tilt of a thousandth. */
function countWobbles(moments: readonly [number, number, number], axis: 0 | 2): number {
  const [p, q] = axis === 0 ? [1, 2] : [0, 1];
  const rate = (s: number[]): number[] => {
    const [w0, w1, w2, ...R] = s;
    const w = [w0, w1, w2];
    const euler = [0, 1, 2].map((i) => {
      const [j, k] = [(i + 1) % 3, (i + 2) % 3];
      return ((moments[j] - moments[k]) * w[j] * w[k]) / moments[i];
    });
    // R' = R [ω]×, rows of R
    const turning = [0, 3, 6].flatMap((r) => [
      R[r + 1] * w[2] - R[r + 2] * w[1],
      R[r + 2] * w[0] - R[r] * w[2],
      R[r] * w[1] - R[r + 1] * w[0],
    ]);
    return [...euler, ...turning];
  };
  let s = [0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1];
  s[axis] = 1;
  s[p] = 1e-3;
  const L = [0, 1, 2].map((i) => moments[i] * s[i]);
  const size = Math.hypot(...L);
  const unit = L.map((value) => value / size);
  const across = [0, 0, 0].map((_, i) => (i === q ? 1 : 0));
  const third = [0, 1, 2].map(
    (i) => unit[(i + 1) % 3] * across[(i + 2) % 3] - unit[(i + 2) % 3] * across[(i + 1) % 3],
  );
  const step = 0.01;
  const turns = 60;
  const steps = Math.round((2 * Math.PI * turns) / step);
  let angle = 0;
  let before: number | undefined;
  for (let n = 0; n < steps; n++) {
    const k1 = rate(s);
    const k2 = rate(s.map((v, i) => v + (step / 2) * k1[i]));
    const k3 = rate(s.map((v, i) => v + (step / 2) * k2[i]));
    const k4 = rate(s.map((v, i) => v + step * k3[i]));
    s = s.map((v, i) => v + (step / 6) * (k1[i] + 2 * k2[i] + 2 * k3[i] + k4[i]));
    const column = [3 + axis, 6 + axis, 9 + axis].map((i) => s[i]);
    const along = (e: number[]) => e.reduce((sum, value, i) => sum + value * column[i], 0);
    // across × third = unit × …: angle counted the way the body turns about L
    const azimuth = Math.atan2(along(third), along(across));
    if (before !== undefined) {
      let change = azimuth - before;
      if (change > Math.PI) change -= 2 * Math.PI;
      if (change < -Math.PI) change += 2 * Math.PI;
      angle += change;
    }
    before = azimuth;
  }
  return angle / (2 * Math.PI) / turns;
}
