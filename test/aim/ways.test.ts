import { describe, expect, it } from "vitest";
import { allWays, nearestWay } from "../../src/aim/ways.js";
import { fromAxisAngle, IDENTITY, multiply, type Quat } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { bruteForce, isSame } from "./brute-force.js";
import { angleApart, extrapolatedEnd } from "./extrapolated-turning.js";
import { BODIES, randomProblems } from "./problems.js";
import { specialPoses } from "./special-poses.js";

/** What an integrator that shares no code with the solver says of a spin's end, rad. */
const missOf = (
  { moments, start, end, duration }: { moments: Vec3; start: Quat; end: Quat; duration: number },
  spin: Vec3,
): number => angleApart(extrapolatedEnd(moments, start, spin, duration), end);

const BOOK = { moments: BODIES.book, start: IDENTITY, duration: 1 };
/** A pose without any symmetry. */
const POSE = fromAxisAngle([1, 2, -0.5], 2);

describe("from pose to pose", () => {
  it("the nearest way ends in the pose, and nearly always within half a turn of the wish, by both measures", () => {
    let far = 0;
    const problems = randomProblems(192, "nearest");
    for (const problem of problems) {
      const { way } = nearestWay(problem, { turns: problem.turns });
      expect(missOf(problem, way.spin)).toBeLessThan(Math.max(1e-9, way.predictedRounding));
      const off = Math.max(Math.abs(way.turns - problem.turns), Math.abs(way.turning - problem.turns));
      expect(off).toBeLessThan(1);
      if (problem.turns >= 1 && off > 0.5) far++;
    }
    // the project's own bar
    expect(far).toBeLessThanOrEqual(problems.length / 100);
  });

  it("special poses are met and their families named", () => {
    for (const { problem, wish, family } of specialPoses(88, "special")) {
      const { way } = nearestWay(problem, wish);
      expect(missOf(problem, way.spin)).toBeLessThan(Math.max(1e-6, 1.01 * way.miss));
      expect(way.miss).toBeLessThan(1.01e-4);
      if (family) expect(way.family).toMatch(family);
    }
  });

  it("no way under three turns that brute force comes upon is missing", () => {
    for (const [i, problem] of randomProblems(16, "missing").entries()) {
      const starts = problem.body === "needle" || problem.body === "long rod" ? 2 : 8;
      const ways = allWays({ ...problem, mostTurns: 3.001, mostTurning: 40 });
      for (const spin of bruteForce(problem, 3, starts, `start ${i}`))
        if (Math.hypot(...spin) * problem.duration < 60 * Math.PI)
          expect(
            ways.some((way) => isSame(way.spin, spin)),
            `${problem.body}: ${spin}`,
          ).toBe(true);
    }
  });

  it("all ways lie within the bounds and end in the pose", () => {
    const ways = allWays({ ...BOOK, end: POSE, leastTurns: 1, mostTurns: 2.5 });
    expect(ways.length).toBeGreaterThan(5);
    for (const way of ways) {
      expect(way.turns).toBeGreaterThanOrEqual(1);
      expect(way.turns).toBeLessThanOrEqual(2.5);
      expect(missOf({ ...BOOK, end: POSE }, way.spin)).toBeLessThan(1e-9);
    }
  });

  it("backspin never answers topspin", () => {
    for (const axis of [0, 1, 2])
      for (const turns of [2, -2]) {
        const wished = [0, 1, 2].map((a) => (a === axis ? 1 : 0)) as unknown as Vec3;
        const { way } = nearestWay(
          { ...BOOK, end: fromAxisAngle([0.1, 0.2, -0.1], 0.3) },
          { turns, axis: wished },
        );
        expect(way.signedShare[axis] * turns).toBeGreaterThan(0.5);
        expect(way.spin[axis] * turns).toBeGreaterThan(0);
      }
  });

  it("without a wish the body turns least", () => {
    const { way, warnings } = nearestWay({ ...BOOK, end: POSE }, {});
    const ways = allWays({ ...BOOK, end: POSE, mostTurns: 2 });
    expect(way.turning).toBeCloseTo(Math.min(...ways.map(({ turning }) => turning)), 12);
    expect(warnings).toEqual([]);
    // at rest where the poses are one
    expect(nearestWay({ ...BOOK, end: IDENTITY }, {}).way.spin.map(Math.abs)).toEqual([0, 0, 0]);
  });

  it("a wish below the least turns is met by the least, and said", () => {
    const { way, warnings } = nearestWay({ ...BOOK, end: POSE }, { turns: 0.1 });
    const least = Math.min(...allWays({ ...BOOK, end: POSE, mostTurns: 2 }).map(({ turns }) => turns));
    expect(way.turns).toBeCloseTo(least, 12);
    expect(warnings.join()).toContain(`${least.toFixed(3)} turns at least`);
  });

  it("a sphere takes the straight way and whole turns more", () => {
    const ball = { moments: BODIES.sphere, start: IDENTITY, duration: 0.5, end: fromAxisAngle([0, 0, 1], 1) };
    // ω T = θ + 2πk about the axis of the rotation: plain kinematics
    const turns = allWays({ ...ball, mostTurns: 2.5 }).map((way) => way.turns);
    const plain = [1, 2 * Math.PI - 1, 2 * Math.PI + 1, 4 * Math.PI - 1, 4 * Math.PI + 1];
    expect(turns.length).toBe(5);
    plain.forEach((angle, i) => {
      expect(turns[i]).toBeCloseTo(angle / (2 * Math.PI), 12);
    });
  });

  it("rounding that many turns about the middle axis let grow is foretold", () => {
    // γ² = (I₂ − I₁)(I₃ − I₂)/(I₁I₃): errors grow by exp(2πγ) a turn about the middle axis (linearised Euler equations)
    const [a, b, c] = BODIES.wrench;
    const growth = Math.sqrt(((b - a) * (c - b)) / (a * c));
    const wrench = { moments: BODIES.wrench, start: IDENTITY, end: IDENTITY, duration: 1 };
    const { way, warnings } = nearestWay(wrench, { turns: 3, axis: [0, 1, 0] });
    expect(way.turns).toBeCloseTo(3, 9);
    expect(way.predictedRounding).toBeGreaterThan(2.2e-16 * Math.exp(2 * Math.PI * growth * 3));
    expect(way.predictedRounding).toBeLessThan(2.2e-13 * Math.exp(2 * Math.PI * growth * 3));
    expect(warnings.join()).toContain("rounding");
  });

  it("moments in another order, with axes named anew, give the same ways", () => {
    // x, y, z → y, x, −z is a rotation: the same body described in another frame
    const swap = fromAxisAngle([1, 1, 0], Math.PI);
    const back: Quat = [-swap[0], -swap[1], -swap[2], swap[3]];
    const [a, b, c] = BOOK.moments;
    const ways = allWays({ ...BOOK, end: POSE, mostTurns: 1.5 });
    const others = allWays({
      moments: [b, a, c],
      start: multiply(BOOK.start, back),
      end: multiply(POSE, back),
      duration: 1,
      mostTurns: 1.5,
    });
    expect(others.length).toBe(ways.length);
    for (const { spin } of ways)
      expect(
        others.some(
          (other) =>
            Math.hypot(other.spin[0] - spin[1], other.spin[1] - spin[0], other.spin[2] + spin[2]) < 1e-8,
        ),
      ).toBe(true);
  });
});
