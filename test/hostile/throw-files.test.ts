import { describe, expect, it } from "vitest";
import { ModelError } from "../../src/gltf/model.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { runCases, SOAK, told } from "./cases.js";
import { checkTold, throwCase, throwText } from "./throw-case.js";
import { THROW_FILES } from "./throw-files.js";

// What is expected is what a program must not do to anybody: no outside source.

const CASES = SOAK ? 10_000 : 150;
/** Of the first ones, two are as slow as any: the short version goes without. */
const FIRST = SOAK ? 0 : 64;

describe("a throw file changed anyhow", () => {
  it("is refused with file, line and key, or baked to files that can be read", async () => {
    const tally = await runCases(CASES, (number) => throwCase(throwText(number)), FIRST);
    if (SOAK) console.log(`${CASES} throw files: ${told(tally)}`);
    expect(tally.faults).toEqual([]);
    // the changes must leave some of them whole, or nothing behind the reader would be tried
    expect(tally.counts.baked).toBeGreaterThan(CASES / 10);
    expect(tally.counts["refused when read"]).toBeGreaterThan(CASES / 10);
  }, 7_200_000);
});

describe("the cases themselves", () => {
  it("are the same each time, and hardly two of them alike", () => {
    const texts = Array.from({ length: 200 }, (_, number) => throwText(number));
    expect(Array.from({ length: 200 }, (_, number) => throwText(number))).toEqual(texts);
    expect(new Set(texts).size).toBeGreaterThan(190);
  });

  it("begin from throw files that are right, and a fault is seen", () => {
    for (const text of THROW_FILES) expect(() => parseThrowFile("right.yaml", text)).not.toThrow();
    expect(() => checkTold(new TypeError("of a fault"))).toThrow("of a fault");
    expect(() => checkTold(new ModelError("m", "is", "no"))).toThrow("m: is; no");
  });
});
