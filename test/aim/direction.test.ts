import { describe, expect, it } from "vitest";
import { nearestDirectionWay } from "../../src/aim/direction.js";
import { type Quat, rotate } from "../../src/math/quat.js";
import { normalize, subtract, type Vec3 } from "../../src/math/vec3.js";
import { extrapolatedEnd } from "./extrapolated-turning.js";
import { randomProblems } from "./problems.js";

describe("one direction at the end", () => {
  it("arrives on its target with the turns wished for, whatever the body", () => {
    for (const problem of randomProblems(8, "point first")) {
      const { moments, start, end, duration, turns, axis } = problem;
      const direction = normalize([axis[1], axis[2], -axis[0]]);
      const target = rotate(end, direction);
      const { way } = nearestDirectionWay({ moments, start, duration, direction, target }, { turns });
      // by an integrator that shares no code with the solver
      const reached = extrapolatedEnd(moments, start, way.spin, duration) as unknown as Quat;
      expect(Math.hypot(...subtract(rotate(reached, direction), target))).toBeLessThan(
        Math.max(1e-9, way.predictedRounding),
      );
      if (turns >= 1) expect(Math.abs(way.turns - turns)).toBeLessThan(0.5);
    }
  });

  it("leaves a clean spin clean where one will do", () => {
    // a quarter turn and two whole ones about the short axis bring x onto y: plain kinematics
    const request = {
      moments: [1, 2, 2.9] as Vec3,
      start: [0, 0, 0, 1] as Quat,
      duration: 1,
      direction: [1, 0, 0] as Vec3,
      target: [0, 1, 0] as Vec3,
    };
    const { way, warnings } = nearestDirectionWay(request, { turns: 2.25, axis: [0, 0, 1] });
    expect(way.turns).toBeCloseTo(2.25, 2);
    expect(way.signedShare[2]).toBeGreaterThan(0.99);
    expect(warnings).toEqual([]);
  });
});
