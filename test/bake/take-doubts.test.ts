import { expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import { takeDoubts } from "../../src/bake/take-doubts.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";

const at = (speed: number, turns: number) =>
  takeDoubts({ velocity: [0, 0, speed], spin: [0, 2 * Math.PI * turns, 0] });

const text = (release: string, arrive: string, spin: string) =>
  parseThrowFile(
    "slip.throws.yaml",
    `props: { peg: { shape: { box: [0.02, 0.03, 0.2] } } }
throws: { toss: { prop: peg, release: { at: ${release} }, arrive: ${arrive}, spin: ${spin} } }`,
  );
const none = () => Promise.reject(new Error("a shape needs no model"));

it("nothing that a hand does is doubted", () => {
  // fastest throws and flicks: see the source
  expect(at(47, 50)).toEqual([]);
});

it("a speed that nothing is thrown at is, with the keys that answer", () => {
  expect(at(355, 1).join()).toMatch(/^leaves at 355 m\/s, .*places are in metres.*host\.unit/);
});

it("a spin in degrees is", () => {
  expect(at(5, 540).join()).toMatch(/^turns 540 times a second: spin\.rate is in turns a second/);
});

it("the doubts of a bake's takes are in its notes", async () => {
  const file = text("[0, 120, 0]", "{ at: [0, 100, 320], after: 0.9 }", "{ axis: short, turns: 1 }");
  const warnings = (await bake(file, none)).notes.flatMap((notes) => notes.warnings);
  expect(warnings.map((warning) => warning.text)).toEqual([expect.stringMatching(/^leaves at 3\d\d m\/s/)]);
});

it("places in millimetres get a message that says so, not one of the tolerance alone", async () => {
  const file = text("[0, 1200, 0]", "{ at: [0, 1000, 3200], after: 0.9 }", "{ axis: short, turns: 1 }");
  await expect(bake(file, none)).rejects.toThrow(
    /the flight goes up to 3200 m from .*; likeliest the places are meant in another unit: write metres .*host\.unit/,
  );
});
