import { beforeAll, describe, expect, test } from "vitest";
import { motionOf, type TakeMotion } from "../../src/bake/take-motion.js";
import type { Launch } from "../../src/flight/launch.js";
import { weigh } from "../../src/prop/prop.js";
import { shapeModel } from "../../src/prop/shape.js";
import { solidOf } from "../../src/review/outline.js";
import { type SheetProp, type SheetTake, sheetProp } from "../../src/review/sheet-input.js";
import { takesSheet } from "../../src/review/takes-sheet.js";
import { throwSheet } from "../../src/review/throw-sheet.js";
import { boxTake } from "./box-take.js";

const SHAPE = { box: [0.02, 0.05, 0.3] as const };

describe("the sheet of all takes", () => {
  let prop: SheetProp;
  let launch: Launch;
  beforeAll(async () => {
    const weighed = await weigh("pin", SHAPE, {});
    prop = sheetProp(weighed, await solidOf(shapeModel("pin", SHAPE), weighed));
    launch = boxTake(weighed);
  });

  const takes = (count: number): SheetTake[] =>
    Array.from({ length: count }, (_, i) => {
      const own = { ...launch, velocity: [0.3 * Math.sin(i), 4 + 0.5 * Math.cos(i), 3] as const };
      const take: TakeMotion = {
        name: `lob_${i + 1}`,
        throw: "lob",
        take: i + 1,
        prop: "pin",
        duration: launch.duration,
        parts: [
          {
            throw: "lob",
            start: 0,
            launch: own,
            turnsAlone: false,
            apex: own.velocity[1] / 9.80665,
            turns: [],
            release: { point: "centerOfMass", offset: [0, 0, 0] },
            arrival: { point: "centerOfMass", offset: [0, 0, 0] },
            boxes: [],
          },
        ],
      };
      return { name: take.name, motion: motionOf(take, prop.axes), take };
    });

  test("is below 250 kB for two thousand takes, and says how many it leaves out", () => {
    const sheet = takesSheet({ title: "many", throws: [{ title: "lob", prop, takes: takes(2000) }] });
    expect(Buffer.byteLength(sheet)).toBeLessThan(250_000);
    const shown = sheet.match(/>\d+: [\d.]+ s, /g)!.length;
    expect(shown).toBeGreaterThan(200);
    expect(sheet).toContain(`The first ${shown} of 2,000 takes are shown`);
    expect(sheet).toContain(`first ${shown} of 2,000 takes:`);
  }, 60_000);

  test("is below 250 kB for three hundred throws of three takes each, and names those it shows", () => {
    const throws = Array.from({ length: 300 }, (_, i) => ({ title: `lob-${i}`, prop, takes: takes(3) }));
    const sheet = takesSheet({ title: "many", throws });
    expect(Buffer.byteLength(sheet)).toBeLessThan(250_000);
    const shown = sheet.match(/>lob-\d+</g)!.length;
    const count = sheet.match(/>\d+: [\d.]+ s, /g)!.length;
    expect(sheet).toContain(
      `The first ${count} of 900 takes are shown${shown < 300 ? `, of the first ${shown} throws` : ""}`,
    );
  }, 60_000);

  test("shows a single take without a word of others", () => {
    const sheet = takesSheet({ title: "one", throws: [{ title: "lob", prop, takes: takes(1) }] });
    expect(sheet).toContain("1 take of 1 throw.");
    expect(sheet).not.toContain("are shown");
  });

  test("turning alone has no arcs, and both sheets say so", () => {
    const [take] = takes(1);
    const still = { ...launch, velocity: [0, 0, 0] as const, gravity: [0, 0, 0] as const };
    const part = { ...take.take!.parts[0], launch: still, turnsAlone: true, apex: null };
    const motion = { ...take.take!, parts: [part] };
    const turning = { ...take, take: motion, motion: motionOf(motion, prop.axes) };
    const input = { title: "lob", prop, takes: [turning] };
    expect(takesSheet({ title: "one", throws: [input] })).toContain("The turning alone: there are no arcs.");
    const sheet = throwSheet(input);
    expect(sheet).toContain("the turning alone, about its centre of mass");
    expect(sheet).not.toContain("metres from the release");
    expect(sheet).toContain("The same poses in place, turning only");
  });
});
