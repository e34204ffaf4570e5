import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { run, Workplace } from "./folder.js";

describe("tossbake strobe", () => {
  test("writes a sheet for each throw and one of all takes, and nothing else", async () => {
    const place = new Workplace();
    const { code, out } = await run("strobe", place.throwFile, "-o", place.out);
    expect(code).toBe(0);
    expect(out).toBe(`3 sheets written to ${place.out}\n`);
    expect(readdirSync(place.out).sort()).toEqual(["lob.svg", "takes.svg", "toss.svg"]);
    expect(readFileSync(place.path("out", "lob.svg"), "utf8")).toContain(">lob_01, one of 3 takes<");
  });

  test("--only and --takes choose the throws and the take that is drawn", async () => {
    const place = new Workplace();
    await run("strobe", place.throwFile, "--only", "lob", "--takes", "3-3", "-o", place.out);
    expect(readdirSync(place.out).sort()).toEqual(["lob.svg", "takes.svg"]);
    expect(readFileSync(place.path("out", "lob.svg"), "utf8")).toContain(">lob_03<");
  });

  test("some throws of a file whose clips go together can be drawn alone", async () => {
    const place = new Workplace();
    place.edit("lob.throws.yaml", "seed: 1", "seed: 1\nbake: { files: together }");
    const { code } = await run("strobe", place.throwFile, "--only", "toss", "-o", place.out);
    expect(code).toBe(0);
  });

  test("an unknown throw is said to be, and nothing is written", async () => {
    const place = new Workplace();
    const { code, err } = await run("strobe", place.throwFile, "--only", "lop", "-o", place.out);
    expect(code).toBe(2);
    expect(err).toContain('there is no throw "lop"');
    expect(() => readdirSync(place.out)).toThrow();
  });

  test("--only of a baked file says that it is of no use there", async () => {
    const place = new Workplace();
    const { code, err } = await run("strobe", place.path("spanner.glb"), "--only", "lob", "-o", place.out);
    expect(code).toBe(2);
    expect(err).toContain("--only");
  });
});
