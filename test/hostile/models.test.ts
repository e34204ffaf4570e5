import { describe, expect, it } from "vitest";
import { ThrowFileError } from "../../src/throwfile/errors.js";
import { runCases, SOAK, told } from "./cases.js";
import { changedModel, checkTold, modelCase } from "./model-case.js";
import { readModels } from "./models.js";

// What is expected is what a program must not do to anybody: no outside source.

const CASES = SOAK ? 2_000 : 400;

const models = await readModels();

describe("a model changed anyhow", () => {
  it("is refused with its name and the place, or weighed, and what is written can be read", async () => {
    const tally = await runCases(CASES, (number) => modelCase(changedModel(models, number)));
    if (SOAK) console.log(`${CASES} models: ${told(tally)}`);
    expect(tally.faults).toEqual([]);
    // the changes must leave some of them whole, or nothing behind the reader would be tried
    expect(tally.counts["weighed and spliced"]).toBeGreaterThan(CASES / 10);
    expect(tally.counts["refused when weighed"]).toBeGreaterThan(CASES / 50);
  }, 3_600_000);
});

describe("the cases themselves", () => {
  it("are the same each time, and hardly two of them alike", () => {
    const hashes = (): string[] =>
      Array.from({ length: 200 }, (_, number) =>
        Buffer.from(changedModel(models, number)).toString("base64"),
      );
    expect(hashes()).toEqual(hashes());
    expect(new Set(hashes()).size).toBeGreaterThan(190);
  });

  it("show a fault", async () => {
    expect(() => checkTold(new TypeError("of a fault"))).toThrow("of a fault");
    expect(() => checkTold(new ThrowFileError("a", []))).toThrow(ThrowFileError);
  });
});
