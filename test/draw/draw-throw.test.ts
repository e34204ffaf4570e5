import { describe, expect, it } from "vitest";
import { type DrawContext, drawThrow } from "../../src/draw/draw-throw.js";
import { length, type Vec3 } from "../../src/math/vec3.js";
import type { ThrowEntry } from "../../src/throwfile/types.js";
import { entry } from "./entry.js";
import { CHI_SQUARE_16_CELLS, chiSquare } from "./statistics.js";

const context: DrawContext = { seed: "lantern-quay", throwName: "lob", take: 1, candidate: 1 };
const draw = (parts: Parameters<typeof entry>[0], change: Partial<DrawContext> = {}) =>
  drawThrow(entry(parts), { ...context, ...change });
const takes = <T>(
  count: number,
  parts: Parameters<typeof entry>[0],
  pick: (drawn: ReturnType<typeof drawThrow>) => T,
): T[] => Array.from({ length: count }, (_, i) => pick(draw(parts, { take: i + 1 })));

describe("what is not spread", () => {
  it("comes out as written, and nothing is recorded", () => {
    const drawn = draw({
      gravity: 3,
      release: {
        at: [0, 1.4, 0],
        point: "grip",
        facing: [
          ["grip", "back"],
          ["short", "up"],
        ],
        scatter: 0,
      },
      arrive: { at: [3, 1, 0.4], after: 0.9 },
      spin: { axis: "short", turns: 1.5 },
      hold: { before: 0.5 },
    });
    expect(drawn).toMatchObject({
      gravity: 3,
      release: {
        at: [0, 1.4, 0],
        point: "grip",
        facing: [
          ["grip", "back"],
          ["short", "up"],
        ],
      },
      arrive: { at: [3, 1, 0.4], point: "grip", after: 0.9 },
      arc: { branch: "low" },
      spin: { axis: "short", turns: 1.5 },
      hold: { before: 0.5, after: 0 },
      draws: {},
    });
    expect(drawn.release.scatter).toBeUndefined();
  });
});

describe("spreads of numbers", () => {
  const N = 3000;
  it("a range is even between its ends", () => {
    const values = takes(N, { arc: { speed: { range: [2, 5] } } }, (d) => d.arc.speed!);
    expect(Math.min(...values)).toBeGreaterThanOrEqual(2);
    expect(Math.max(...values)).toBeLessThanOrEqual(5);
    expect(
      chiSquare(
        values.map((v) => (v - 2) / 3),
        16,
      ),
    ).toBeLessThan(CHI_SQUARE_16_CELLS);
  });

  it("a range of frames is even over the whole frames from the first to the last", () => {
    const values = takes(
      N,
      { arrive: { after: { range: [22 / 30, 37 / 30], frames: 30 } } },
      (d) => d.arrive.after! * 30,
    );
    for (const value of values) expect(Math.abs(value - Math.round(value))).toBeLessThan(1e-12);
    expect(
      chiSquare(
        values.map((v) => (Math.round(v) - 22 + 0.5) / 16),
        16,
      ),
    ).toBeLessThan(CHI_SQUARE_16_CELLS);
  });

  it("a bell curve has its mean and deviation, and nothing beyond three", () => {
    const values = takes(N, { arc: { speed: { normal: [10, 2] } } }, (d) => (d.arc.speed! - 10) / 2);
    expect(Math.max(...values.map(Math.abs))).toBeLessThanOrEqual(3);
    // Abramowitz & Stegun, table 26.1: Φ(−1.15035) = 1/8, Φ(−0.67449) = 1/4, Φ(−0.31864) = 3/8; the cut moves them by less than 0.001
    const edges = [-1.15035, -0.67449, -0.31864, 0, 0.31864, 0.67449, 1.15035];
    const shares = values.map((v) => (edges.filter((edge) => v >= edge).length + 0.5) / 8);
    // e-Handbook, 1.3.6.7.4: 7 degrees of freedom, 0.001
    expect(chiSquare(shares, 8)).toBeLessThan(24.322);
  });

  it("a pick is even over what it names, words and lists too", () => {
    const words = ["a", "b", "c", "d"];
    const drawn = takes(
      N,
      { release: { point: { pick: words } } },
      (d) => (words.indexOf(d.release.point) + 0.5) / 4,
    );
    // e-Handbook, 1.3.6.7.4: 3 degrees of freedom, 0.001
    expect(chiSquare(drawn, 4)).toBeLessThan(16.266);
  });

  it("`each` gives take n the n-th, round and round, whatever the seed and candidate", () => {
    const parts = { arc: { speed: { each: [8, 11, 14] } } };
    expect(takes(7, parts, (d) => d.arc.speed)).toEqual([8, 11, 14, 8, 11, 14, 8]);
    expect(draw(parts, { take: 5, candidate: 9, seed: "other" }).arc.speed).toBe(11);
  });
});

describe("what is left to chance without a spread", () => {
  it("scatter turns about an axis of its own, by its angle", () => {
    const { release, draws } = draw({ release: { scatter: 5 } });
    expect(release.scatter!.angle).toBe(5);
    expect(length(release.scatter!.axis)).toBeCloseTo(1, 14);
    expect(draws).toEqual({ "release.scatter.axis": release.scatter!.axis });
  });

  it("`any` is an orientation or a direction of the prop", () => {
    const drawn = draw(
      { release: { facing: "any" }, spin: { axis: "any", rate: 2 } },
      { wobblesByDefault: false },
    );
    expect(drawn.draws).toEqual({
      "release.facing": (drawn.release.facing as { orientation: unknown }).orientation,
      "spin.axis": drawn.spin!.axis,
    });
    expect(length(drawn.spin!.axis as Vec3)).toBeCloseTo(1, 14);
  });

  it("an axis `any` wishes for nothing where the spin is solved", () => {
    const { spin, draws } = draw({ arrive: { facing: "release" }, spin: { axis: "any", turns: 2 } });
    expect(spin!.axis).toBeUndefined();
    expect(draws).toEqual({});
  });

  it("`rest` draws which face", () => {
    const { arrive } = draw({ arrive: { facing: "rest", floor: 0 } });
    const { rest } = arrive.facing as { rest: number };
    expect(rest).toBeGreaterThanOrEqual(0);
    expect(rest).toBeLessThan(1);
  });

  it("an undecided phase is drawn from the full circle, and recorded where there is a wobble", () => {
    const phases = takes(3000, { spin: { axis: "middle", rate: 1 } }, (d) => d.spin!.phase / 360);
    expect(chiSquare(phases, 16)).toBeLessThan(CHI_SQUARE_16_CELLS);
    const recorded = (spin: object, change = {}) => "spin.phase" in draw({ spin }, change).draws;
    expect(recorded({ axis: "middle", rate: 1 })).toBe(true);
    expect(recorded({ axis: "middle", rate: 1 }, { wobblesByDefault: false })).toBe(false);
    expect(recorded({ axis: "long", rate: 1 })).toBe(false);
    expect(recorded({ axis: "long", rate: 1, wobble: 4 })).toBe(true);
    expect(recorded({ axis: "middle", rate: 1, wobble: 0 })).toBe(false);
    expect(recorded({ axis: "middle", rate: 1, phase: 90 })).toBe(false);
  });
});

describe("the record of draws", () => {
  const parts = {
    release: { at: [{ range: [0, 1] }, 1.4, { normal: [0, 0.1] }], point: { pick: ["grip", "tip"] } },
    arc: {
      through: {
        pick: [
          [1, { range: [2, 3] }, 0],
          [2, { range: [2, 3] }, 0],
        ],
      },
    },
    arrive: { facing: { each: [[["grip", "flight"]], "release"] } },
  } as unknown as Parameters<typeof entry>[0];

  it("names each by its key, with the value as it is used", () => {
    const { release, arc, draws } = draw(parts);
    expect(draws).toEqual({
      "release.at.0": release.at![0],
      "release.at.2": release.at![2],
      "release.point": release.point,
      "arrive.facing": [["grip", "flight"]],
      "arc.through": arc.through,
    });
    expect(release.at![1]).toBe(1.4);
  });

  it("the point drawn for the release is that of the arrival too, unless that has its own", () => {
    const drawn = takes(12, parts, (d) => d);
    for (const d of drawn) expect(d.arrive.point).toBe(d.release.point);
    expect(new Set(drawn.map((d) => d.release.point)).size).toBe(2);
    expect(draw({ ...parts, arrive: { point: "centerOfMass" } }).arrive.point).toBe("centerOfMass");
  });
});

describe("no draw depends on another key", () => {
  const base = {
    release: { at: [{ range: [0, 1] }, 0, 0] as const },
    arrive: { after: { range: [1, 2] as const } },
  };
  const fuller = {
    ...base,
    release: { ...base.release, facing: "any" as const, scatter: { range: [0, 5] as const } },
    arc: { branch: { pick: ["low", "high"] as const } },
    spin: { axis: "any" as const, turns: { normal: [2, 0.3] as const } },
  };

  it.each([
    [1, 1],
    [7, 3],
    [300, 32],
  ])("take %i, candidate %i draws the same with more keys, and with more takes", (take, candidate) => {
    const before = draw(base, { take, candidate });
    for (const parts of [fuller, { ...base, takes: 500 }, { ...base, takes: [3, 7, 300] }]) {
      const after = draw(parts as unknown as Partial<ThrowEntry>, { take, candidate });
      expect(after.release.at).toEqual(before.release.at);
      expect(after.arrive.after).toBe(before.arrive.after);
    }
  });

  it("but on seed, throw, take and candidate", () => {
    const values = [{}, { seed: "x" }, { throwName: "x" }, { take: 2 }, { candidate: 2 }].map(
      (change) => draw(base, change).arrive.after,
    );
    expect(new Set(values).size).toBe(values.length);
  });
});
