import { describe, expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";

/** Of one throw of a rod. */
const baked = (lines: string) =>
  bake(
    parseThrowFile(
      "rod.yaml",
      `props: { rod: { shape: { cylinder: { radius: 0.02, length: 0.4 } }, points: { end: [0, 0.2, 0] } } }
throws:
  toss:
    prop: rod
${lines}`,
    ),
    () => expect.unreachable(),
  );

describe("what cannot be is said in a moment", () => {
  it("more turns than a clip may have, before a way to them is searched", async () => {
    const asked = baked(`    release: { at: [0, 1, 0], scatter: 0..5 }
    arrive: { at: [0, 1, 2], after: 0.7..0.8, facing: release }
    spin: { axis: left, turns: 1000000 }`);
    // 200,000 rad, the project's own bound, are 31,830.99 turns
    await expect(asked).rejects.toThrow(
      /^rod\.yaml:7:5 throws\.toss\.spin: 1000000 turns are too many for a clip; at most 31830 in all$/,
    );
  });

  it("a body whose moments are no numbers to reckon with", async () => {
    const file = parseThrowFile(
      "needle.yaml",
      `props: { needle: { shape: { cylinder: { radius: 1e-160, length: 200 } }, scale: 0.01, density: 650 } }
throws: { toss: { prop: needle, arrive: { at: [0, 1, 2], after: 0.8 }, spin: { axis: right, turns: 1 } } }`,
    );
    await expect(bake(file, () => expect.unreachable())).rejects.toThrow(
      /^needle\.yaml:1:\d+ props\.needle\.shape: makes a body of [\d.e-]+ kg that reaches 1 m, with moments of .*; check its size/,
    );
  });
});
