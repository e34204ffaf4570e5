import { expect, test } from "vitest";
import { bake } from "../../src/bake/bake.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";

// What is expected is this program's own promise: every take differs, or the user is told.
const warningsOf = async (release: string) => {
  const file = parseThrowFile(
    "crate.throws.yaml",
    `props: { crate: { shape: { box: [0.1, 0.2, 0.3] } } }
throws: { heave: { prop: crate, takes: 4, release: ${release}, arrive: { at: [0, 1, 2], after: 1 }, spin: { axis: short, turns: 2 } } }`,
  );
  return (await bake(file, () => Promise.reject())).notes.flatMap(({ warnings }) => warnings);
};

test("takes that nothing tells apart are named", async () => {
  const [warning, ...others] = await warningsOf("{ at: [0, 1, 0] }");
  expect(others).toEqual([]);
  expect(warning).toMatchObject({ throwName: "heave", takes: [2, 3, 4] });
  expect(warning.text).toContain("moves exactly as take 1");
});

test("takes that differ are not", async () => {
  expect(await warningsOf("{ at: [0, 1, 0], scatter: 0..3 }")).toEqual([]);
});
