import { existsSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import type { TakesRecord } from "../../src/record/clip-record.js";
import { run, THROWS, Workplace } from "./folder.js";

// What comes out of an option is what was asked for; exit codes: the project's own choice.

const recordIn = (place: Workplace): TakesRecord =>
  JSON.parse(readFileSync(place.path("out/takes.json"), "utf8"));
const names = (record: TakesRecord) => record.clips.map((clip) => clip.name);
const ALL = ["lob_01", "lob_02", "lob_03", "toss_01", "toss_02"];

describe("bake --dry-run", () => {
  it("prints what a bake would, and writes nothing", async () => {
    const place = new Workplace();
    const dry = await run("bake", place.throwFile, "-o", place.out, "--dry-run", "--json");
    expect(dry.code).toBe(0);
    expect(existsSync(place.out)).toBe(false);
    const wet = await run("bake", place.throwFile, "-o", place.out, "--json");
    expect(dry.out).toBe(wet.out);
    expect(wet.out).toBe(readFileSync(place.path("out/takes.json"), "utf8"));
  });

  it("needs no folder", async () => {
    const place = new Workplace();
    const { code, out } = await run("bake", place.throwFile, "--dry-run");
    expect(code).toBe(0);
    expect(out).toMatch("nothing written");
  });

  it("says so under its table", async () => {
    const place = new Workplace();
    const { out, err } = await run("bake", place.throwFile, "-o", place.out, "--dry-run");
    expect(out).toMatch(/^throw +prop +takes/);
    expect(out).toMatch("5 takes of 2 throws, nothing written (--dry-run)");
    // progress is for terminals alone
    expect(err).toBe("");
  });
});

describe("bake --takes", () => {
  it("solves these takes alone, each as it is in a whole bake but for the takes it is beside", async () => {
    const place = new Workplace();
    const whole = JSON.parse(
      (await run("bake", place.throwFile, "-o", place.out, "--json")).out,
    ) as TakesRecord;
    const part = JSON.parse(
      (await run("bake", place.throwFile, "-o", place.out, "--takes", "2-3", "--dry-run", "--json")).out,
    ) as TakesRecord;
    expect(names(part)).toEqual(["lob_02", "lob_03", "toss_02"]);
    for (const clip of part.clips)
      expect({ ...clip, nearest: null }).toEqual({
        ...whole.clips.find(({ name }) => name === clip.name),
        nearest: null,
      });
    expect(part.clips[0].nearest).toBeNull();
  });

  it("leaves out throws and props that have none of them", async () => {
    const place = new Workplace();
    const { out } = await run(
      "bake",
      place.throwFile,
      "-o",
      place.out,
      "--takes",
      "3-9",
      "--dry-run",
      "--json",
    );
    expect(names(JSON.parse(out))).toEqual(["lob_03"]);
    expect(Object.keys(JSON.parse(out).props)).toEqual(["spanner"]);
  });

  it("cannot be written while a file holds all takes of a throw", async () => {
    const place = new Workplace();
    const { code, out, err } = await run("bake", place.throwFile, "-o", place.out, "--takes", "1-2");
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).toMatch(/--takes: .*file holds all its takes.*--dry-run/);
    expect(existsSync(place.out)).toBe(false);
  });

  it.each(["", "3", "0-2", "3-1", "a-b", "1-2-3", "1-", "-2", "1.5-2", "1-99999999999"])(
    'is refused as "%s"',
    async (takes) => {
      const place = new Workplace();
      const { code, err } = await run(
        "bake",
        place.throwFile,
        "-o",
        place.out,
        "--dry-run",
        `--takes=${takes}`,
      );
      expect(code).toBe(2);
      expect(err).toMatch("such as 3-7");
    },
  );

  it("is refused where no throw has any of them, with the last there is", async () => {
    const place = new Workplace();
    const { code, err } = await run("bake", place.throwFile, "-o", place.out, "--dry-run", "--takes", "7-9");
    expect(code).toBe(2);
    expect(err).toMatch("no throw has a take from 7 to 9; the last take is 3");
  });
});

describe("bake --only", () => {
  it("bakes these throws, and keeps the others' files and lines", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    const before = { files: place.contents(), record: recordIn(place) };
    place.edit("lob.throws.yaml", "[0, 1, 3]", "[0, 1, 3.2]");
    const { code, out } = await run("bake", place.throwFile, "-o", place.out, "--only", "toss", "--json");
    expect(code).toBe(0);
    expect(names(JSON.parse(out))).toEqual(["toss_01", "toss_02"]);
    const after = { files: place.contents(), record: recordIn(place) };
    expect(names(after.record)).toEqual(ALL);
    expect(after.files["lob.glb"]).toBe(before.files["lob.glb"]);
    expect(after.files["toss.glb"]).not.toBe(before.files["toss.glb"]);
    expect(after.record.clips.slice(0, 3)).toEqual(before.record.clips.slice(0, 3));
    expect(after.record.props.spanner).toEqual(before.record.props.spanner);
  });

  it("lets a throw go that the throw file no longer has, with its prop; its file stays", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", / {2}toss.*\n/, "  third: { like: lob }\n");
    await run("bake", place.throwFile, "-o", place.out, "--only", "third");
    expect(names(recordIn(place))).toEqual([
      "lob_01",
      "lob_02",
      "lob_03",
      "third_01",
      "third_02",
      "third_03",
    ]);
    expect(Object.keys(recordIn(place).props)).toEqual(["spanner"]);
    expect(Object.keys(place.contents())).toContain("toss.glb");
  });

  it("keeps the prop of a kept throw even where the throw file has dropped it", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", / {2}pin:.*\n/, "");
    place.edit("lob.throws.yaml", "{ like: lob, prop: pin, takes: 2 }", "{ like: lob }");
    await run("bake", place.throwFile, "-o", place.out, "--only", "lob");
    const record = recordIn(place);
    expect(names(record)).toEqual(ALL);
    expect(record.clips[3].prop).toBe("pin");
    expect(Object.keys(record.props)).toEqual(["spanner", "pin"]);
  });

  it("is refused for a throw that is not there", async () => {
    const place = new Workplace();
    const { code, err } = await run("bake", place.throwFile, "-o", place.out, "--only", "lobb");
    expect(code).toBe(2);
    expect(err).toMatch('there is no throw "lobb"; one of lob, toss');
    expect(existsSync(place.out)).toBe(false);
  });
});

describe("--jobs", () => {
  it("says so where no more than one thread can work, as from the sources, and makes all takes", async () => {
    const text = THROWS.replace("takes: 3", "takes: 70\n    vary: chance");
    const place = new Workplace(text);
    const bake = (...args: string[]) => run("bake", place.throwFile, "--dry-run", "--only", "lob", ...args);
    const { code, err, out } = await bake("--jobs", "2");
    expect(code).toBe(0);
    expect(err).toMatch(/^one thread does the work: .*bake-worker\.js is not there/);
    // nobody asked for more
    expect(await bake()).toEqual({ code, err: "", out });
  });
});
