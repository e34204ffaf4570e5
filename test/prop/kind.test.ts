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

  test("a thin disc wobbles twice a turn, at 3° a little less often", () => {
    // Tuleja et al., "Feynman's wobbling plate", Am. J. Phys. 75 (2007) 240: 2 : 1 for a thin disc and a small tilt. At a tilt θ the axis
    // goes round at L/I1 (Landau & Lifshitz, Mechanics, §33) and turns are 2E/L = L (cos²θ/I3 + sin²θ/I1) a second.
    const tilt = (3 * Math.PI) / 180;
    expect(kindOf([1, 1, 2]).axes.short).toEqual({
      behaviour: "steady",
      wobblesPerTurn: 2,
      wobblesPerTurnAtWobble: expect.closeTo(1 / (Math.cos(tilt) ** 2 / 2 + Math.sin(tilt) ** 2), 12),
    });
  });

  test("a slender rod spun about its length wobbles as seldom as its moments stand to each other", () => {
    // Regular precession, Landau & Lifshitz, Mechanics, §33: rate L/I1 where the spin is L/I3.
    const { long } = kindOf([0.1, 5, 5]).axes;
    expect(long).toMatchObject({ behaviour: "steady", wobblesPerTurn: expect.closeTo(0.02, 14) });
  });

  test("about the axes across a symmetric body it turns over as its wobble rolls it round its own axis", () => {
    // With L tilted by θ, 45° of phase between the odd axis and the other one, the body turns about its odd axis at (1/I3 − 1/I1) L sin θ cos 45°
    // seen from L (§33), and half a turn brings the other side up; a turn is 2π/2E.
    const expected = (odd: number, other: number) => {
      const along = Math.sin((3 * Math.PI) / 180) ** 2 / 2;
      return (along / odd + (1 - along) / other) / (2 * Math.abs(1 / odd - 1 / other) * Math.sqrt(along));
    };
    for (const axis of ["long", "middle"] as const)
      expect(kindOf([1, 1, 2]).axes[axis]).toEqual({
        behaviour: "drifts",
        turnsPerFlip: expect.closeTo(expected(2, 1), 9),
        turnsRound: "short",
      });
    for (const axis of ["middle", "short"] as const)
      expect(kindOf([0.1, 5, 5]).axes[axis]).toEqual({
        behaviour: "leans",
        turnsPerFlip: expect.closeTo(expected(0.1, 5), 9),
        turnsRound: "long",
      });
  });

  test("a body of one moment is steady about any axis, which a wobble leaves where it is in space", () => {
    const any = { behaviour: "steady", wobblesPerTurn: 1, wobblesPerTurnAtWobble: 1 };
    expect(kindOf([2, 2, 2]).axes).toEqual({ long: any, middle: any, short: any });
  });

  test("a small tilt grows about the middle axis alone, as the linearised equations say", () => {
    // Euler's equations I ω' = I ω × ω near ω = (0, 1, 0): a' = λ c (I2 − I3)/I1, c' = (I1 − I2)/I3 a; growth √((I2−I1)(I3−I2)/(I1 I3)).
    // For 1, 2, 3: √(1/3), in a turn exp(2π/√3) = 37.62.
    const { long, middle, short } = kindOf([1, 2, 3]).axes;
    expect(middle).toMatchObject({
      behaviour: "tumbles",
      growthPerTurn: expect.closeTo(Math.exp((2 * Math.PI) / Math.sqrt(3)), 9),
    });
    expect([long.behaviour, short.behaviour]).toEqual(["steady", "steady"]);
  });

  test("a slender oar tumbles about its middle axis though two of its moments are within 1 %", () => {
    const { kind, axes } = kindOf([0.0012, 0.8137, 0.8144]);
    expect(kind).toBe("prolate symmetric top");
    // √((I2−I1)(I3−I2)/(I1 I3)) = 0.7628…, exp(2π × that)
    expect(axes.middle).toMatchObject({
      behaviour: "tumbles",
      growthPerTurn: expect.closeTo(120.69, 1),
      turnsRound: "long",
    });
    expect([axes.long.behaviour, axes.short.behaviour]).toEqual(["steady", "leans"]);
  });

  test("the wobble of a body of three moments is what its equations of motion give", () => {
    // Counted in a numerical integration below: turns of the short (long) axis about the angular momentum, per turn of the body.
    for (const axis of [0, 2] as const) {
      const moments = [1, 1.6, 2.3] as const;
      const behaviour = kindOf([...moments]).axes[axis === 0 ? "long" : "short"];
      const counted = countWobbles(moments, axis);
      expect(behaviour).toMatchObject({ behaviour: "steady", wobblesPerTurn: expect.closeTo(counted, 3) });
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
