import { describe, expect, it } from "vitest";
import { shapeModel } from "../../src/prop/shape.js";
import { solidOf } from "../../src/review/outline.js";
import { stripPicture } from "../../src/review/page/strip-picture.js";
import { bakedPage } from "./page-fixture.js";

const data = await bakedPage();
const prop = data.props.plank;
const model = shapeModel("plank", { box: [0.5, 0.2, 0.05] });
const solid = await solidOf(model, { scale: 1, centerOfMass: prop.centerOfMass });
const shown = { solid, turned: [0, 0, 0, 1] as const };

const numbersOf = (path: string) => (path.match(/-?[\d.]+(e-?\d+)?/g) ?? []).map(Number);

describe("a strip", () => {
  it("holds the whole course and all poses within its frame, release on the left", () => {
    for (const { takes } of data.throws)
      for (const { motion } of takes) {
        const { viewBox, path, poses } = stripPicture(motion, prop, shown);
        const [left, top, width, height] = numbersOf(viewBox);
        expect(poses).toHaveLength(7);
        const slack = 0.02 * Math.max(width, height);
        for (const drawn of [path, ...poses])
          numbersOf(drawn).forEach((value, i) => {
            const [least, size] = i % 2 === 0 ? [left, width] : [top, height];
            expect(value).toBeGreaterThanOrEqual(least - slack);
            expect(value).toBeLessThanOrEqual(least + size + slack);
          });
        const course = numbersOf(path);
        expect(course[0]).toBeLessThanOrEqual(course[course.length - 2]);
      }
  });

  it("has the apex above the ends: y is down in SVG", () => {
    const heights = numbersOf(stripPicture(data.throws[0].takes[0].motion, prop).path).filter(
      (_, i) => i % 2 === 1,
    );
    expect(Math.min(...heights)).toBeLessThan(Math.min(heights[0], heights[heights.length - 1]));
  });

  it("draws a small prop larger, and says by how much; a large one in true scale", () => {
    const { motion } = data.throws[0].takes[0];
    expect(stripPicture(motion, prop).larger).toBe(1);
    const small = stripPicture(motion, { ...prop, reach: 0.01 });
    // a course of about 3 m, of which the reach has to be 9 %
    expect(small.larger).toBeCloseTo(27, -1);
  });

  it("spreads a prop that turns in place", () => {
    const { motion } = data.throws[0].takes[0];
    const still = { ...motion, parts: motion.parts.map((part) => ({ ...part, turnsAlone: true })) };
    const { path, viewBox, poses } = stripPicture(still, prop, shown);
    expect(path).toBe("");
    expect(numbersOf(viewBox)[2]).toBeGreaterThan(5 * prop.reach);
    expect(new Set(poses.map((pose) => pose.slice(0, 12))).size).toBe(poses.length);
  });
});
