import { describe, expect, it } from "vitest";
import { passage, polhodeThrough } from "../../src/aim/closed-form.js";
import { momentumCone } from "../../src/aim/cone.js";
import { coneCurve } from "../../src/aim/curve.js";
import { problemOf } from "../../src/aim/problem.js";
import { search } from "../../src/aim/search.js";
import { turningOf } from "../../src/aim/turning.js";
import { multiplyVector, transpose } from "../../src/math/mat3.js";
import { fromAxisAngle, IDENTITY } from "../../src/math/quat.js";
import { distance, length, type Vec3 } from "../../src/math/vec3.js";
import { BODIES, randomProblems } from "./problems.js";

const unlike = randomProblems(96, "search").filter(({ body }) => body !== "sphere");

describe("the cone of momenta", () => {
  it("holds the directions that lie on one polhode at both ends", () => {
    for (const random of unlike) {
      const { body, end } = problemOf(random);
      const curve = coneCurve(body, momentumCone(body, end)!);
      for (let angle = 0; angle < 6.3; angle += 0.1) {
        const m = curve.at(angle);
        const arrived = multiplyVector(transpose(end), m);
        expect(Math.abs(length(m) - 1)).toBeLessThan(1e-15);
        const off = polhodeThrough(body, m).energy - polhodeThrough(body, arrived).energy;
        // relative to the spread of inverse moments: what decides on the polhode
        expect(Math.abs(off) / body.d13).toBeLessThan(4e-14);
      }
    }
  });

  it("crosses the separatrix where it says", () => {
    for (const random of unlike) {
      const { body, end } = problemOf(random);
      const curve = coneCurve(body, momentumCone(body, end)!);
      for (const angle of curve.crossings)
        expect(
          Math.abs(polhodeThrough(body, curve.at(angle)).energy - body.inverse[1]) / body.d13,
        ).toBeLessThan(1e-7);
    }
  });

  it("is everything where the end pose leaves the ellipsoid of inertia as it was", () => {
    const axes = [[1, 0, 0] as const, [0, 1, 0] as const, [0, 0, 1] as const];
    for (const end of [IDENTITY, ...axes.map((axis) => fromAxisAngle(axis, Math.PI))]) {
      const problem = problemOf({ moments: BODIES.book, start: IDENTITY, end, duration: 1 });
      expect(momentumCone(problem.body, problem.end)).toBeUndefined();
    }
  });
});

describe("the search", () => {
  it("finds on its grid what it finds on one twenty times as fine, pairs about to merge included", () => {
    let found = 0;
    for (const random of unlike.slice(0, 48)) {
      const problem = problemOf(random);
      const bounds = { leastTurns: 0, mostTurns: 6, mostTurning: 8 };
      // a search may overstep the bound of turning by a little, and what rounding decides is not the grid's
      const momenta = (even?: number) =>
        search(problem, bounds, undefined, even).filter(({ momentum }) => {
          const { turning, growth } = turningOf(problem.body, momentum, problem.end);
          return turning < 7.999 && growth < 1e9;
        });
      const usual = momenta();
      for (const { momentum } of momenta(1920))
        expect(
          usual.some((other) => distance(other.momentum, momentum) < 1e-6 * length(momentum)),
          `${random.body}: ${momentum}`,
        ).toBe(true);
      found += usual.length;
    }
    expect(found).toBeGreaterThan(2000);
  });

  it("sees two ways until they merge", () => {
    // as the end pose turns on, ways come and go in pairs, which lie as close as one likes before they go: like the roots of a parabola
    const momenta = (angle: number): Vec3[] => {
      const end = fromAxisAngle([1, 2, -0.5], angle);
      const problem = problemOf({ moments: BODIES.book, start: IDENTITY, end, duration: 1 });
      return search(problem, { leastTurns: 0, mostTurns: 3, mostTurning: 9 }).map(({ momentum }) => momentum);
    };
    const closest = (all: Vec3[]): number =>
      Math.min(...all.flatMap((a, i) => all.slice(0, i).map((b) => distance(a, b))));
    let merged = 0;
    for (let i = 1; i < 24; i++) {
      let [from, to] = [0.1 * i, 0.1 * (i + 1)];
      const [first, last] = [momenta(from).length, momenta(to).length];
      if (Math.abs(first - last) !== 2) continue;
      for (let k = 0; k < 34; k++) {
        const middle = (from + to) / 2;
        if (momenta(middle).length === first) from = middle;
        else to = middle;
      }
      const more = momenta(first > last ? from : to);
      // two ways may also leave together by way of the bound of turns, or one after the other
      if (Math.abs(momenta(from).length - momenta(to).length) !== 2) continue;
      merged++;
      expect(closest(more)).toBeLessThan(1e-3);
    }
    expect(merged).toBeGreaterThan(2);
  });

  it("takes only directions that start and end on one branch of the polhode", () => {
    // about the least and about the greatest moment's axis there are two branches each, which no motion joins (Poinsot)
    for (const random of unlike) {
      const { body, end } = problemOf(random);
      const curve = coneCurve(body, momentumCone(body, end)!);
      for (let angle = 0.05; angle < 6.3; angle += 0.1) {
        const m = curve.at(angle);
        const own = polhodeThrough(body, m).own;
        const arrived = multiplyVector(transpose(end), m)[own];
        if (Math.abs(arrived) > 1e-6) expect(passage(body, m, end) !== undefined).toBe(arrived * m[own] > 0);
      }
    }
  });
});
