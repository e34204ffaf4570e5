import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { run, Workplace } from "./folder.js";

const text = (limits: string, back = "[0, 1, 0]") => `
props: { block: { shape: { box: [0.1, 0.1, 0.2] } } }
throws:
  there: { prop: block, takes: 2, release: { at: [0, 1, 0] }, arrive: { at: [0, 1, 2], after: 0.6..0.8 } }
  back: { prop: block, takes: 2, release: { at: [0, 2, 2] }, arrive: { at: ${back}, after: 0.6 }, limits: ${limits} }
chains:
  both: { throws: [there, back], loop: true }
`;
const names = (place: Workplace) =>
  JSON.parse(readFileSync(`${place.out}/takes.json`, "utf8")).clips.map(({ name }: { name: string }) => name);
const ALL = ["there_01", "there_02", "back_01", "back_02", "both_01", "both_02"];

describe("a throw file with a chain", () => {
  it("is baked, alone too, verified and kept", async () => {
    const place = new Workplace(text("{}"));
    const { code, out } = await run("bake", place.throwFile, "-o", place.out);
    expect(code).toBe(0);
    expect(out).toContain("6 takes of 2 throws and 1 chain written");
    expect(names(place)).toEqual(ALL);
    const before = place.contents();
    expect(Object.keys(before).sort()).toEqual([
      "back.glb",
      "back.svg",
      "both.glb",
      "both.svg",
      "takes.json",
      "takes.svg",
      "there.glb",
      "there.svg",
    ]);
    expect((await run("bake", place.throwFile, "-o", place.out, "--only", "both")).code).toBe(0);
    expect(place.contents()).toEqual(before);
    expect((await run("bake", place.throwFile, "-o", place.out, "--only", "back")).code).toBe(0);
    expect(place.contents()["both.glb"]).toBe(before["both.glb"]);
    expect(names(place)).toEqual(ALL);
    expect(await run("verify", place.throwFile, "-o", place.out)).toMatchObject({ code: 0 });
  });

  it("tells of a chain that drifted", async () => {
    const place = new Workplace(text("{}"));
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", "at: [0, 1, 2]", "at: [0, 1.2, 2]");
    const { code, out } = await run("verify", place.throwFile, "-o", place.out);
    expect(code).toBe(1);
    expect(out).toMatch(/^both_01 /m);
  });

  it("ends with 1 where a limit fails in the chain alone, the throws written", async () => {
    // the block reaches 0.05 below its middle: from its own 2 m to 1.05 never under 1, but to 0.95 where there arrives
    const place = new Workplace(text("{ minHeight: 0.96 }", "[0, 1.05, 0]").replace(", loop: true", ""));
    const { code, err } = await run("bake", place.throwFile, "-o", place.out);
    expect(code).toBe(1);
    expect(err).toContain(
      "both_01 is left out: thrown from where there arrives, back does not hold limits.minHeight\n",
    );
    expect(names(place)).toEqual(ALL.slice(0, 4));
  });

  it("ends with 2 where a loop does not close, saying where and by how much", async () => {
    const place = new Workplace(text("{}", "[0, 1, 0.25]"));
    const { code, err } = await run("bake", place.throwFile, "-o", place.out);
    expect(code).toBe(2);
    expect(err).toMatch(
      /lob\.throws\.yaml:7:\d+ chains\.both\.loop: take 1 ends 0\.25 m from where it starts \(found true\); back would need arrive\.at \[0, 1, 0\], or loop: false/,
    );
  });
});
