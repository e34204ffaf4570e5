import { describe, expect, test } from "vitest";
import { RequestError } from "../../src/math/request-error.js";
import { throwFileError } from "../../src/throwfile/errors.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { errorOf } from "./faults-of.js";
import { QUAY } from "./quay.js";

describe("a wrong throw file's message", () => {
  test("has a line for each fault: place, key, what is wrong, what would be right", () => {
    const error = errorOf(
      QUAY.replace("takes: 24", "taks: 24").replace("after: 0.9..1.0", "after: 1.0..0.9"),
    );
    expect(error?.message.split("\n")).toEqual([
      "quay.throws.yaml:10:5 throws.lob-to-bench.taks: unknown key; the nearest known key is takes",
      'quay.throws.yaml:12:37 throws.lob-to-bench.arrive.after: a range the wrong way round (found "1.0..0.9"); the smaller end first',
    ]);
  });

  test("tells ten faults and counts the rest", () => {
    const keys = Array.from({ length: 14 }, (_, i) => `wrong${i}: 1\n`).join("");
    const error = errorOf(keys + QUAY);
    expect(error?.faults).toHaveLength(10);
    expect(error?.faults.map((f) => f.line)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10]);
    expect(error?.more).toBe(4);
    expect(error?.message.split("\n").at(-1)).toBe("and 4 more");
  });

  test("holds nothing that a terminal would obey", () => {
    const error = errorOf(`seed: 1\n"\\e[31mred\\a\\u202e": "\\e[2J"\nframeRate: "\\e[2J\\u009b"\n`);
    expect(error?.message).toMatch(/red/);
    // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what must not be there
    expect(error?.message).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202e]/);
  });
});

test("a request that cannot be met is told at its key, or at the nearest that is written", () => {
  const file = parseThrowFile("quay.throws.yaml", QUAY);
  const told = (...path: string[]) =>
    throwFileError(
      file,
      new RequestError(["throws", "lob-to-bench", ...path], "too slow (found 3)", "at least 7"),
    ).message;
  expect(told("arrive", "after")).toBe(
    "quay.throws.yaml:12:37 throws.lob-to-bench.arrive.after: too slow (found 3); at least 7",
  );
  expect(told("arc", "speed")).toBe(
    "quay.throws.yaml:8:3 throws.lob-to-bench.arc.speed: too slow (found 3); at least 7",
  );
});

describe("a key that is not there yet", () => {
  test("may say what is the default anyway", () => {
    const bake =
      "bake: { keys: linear, layout: one-node, files: per-throw, container: glb, mesh: true, pack: float }\n";
    expect(errorOf(bake + QUAY.replace("density", "solid: auto\n    density"))).toBeUndefined();
  });
});
