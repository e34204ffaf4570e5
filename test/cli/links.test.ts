import { spawnSync } from "node:child_process";
import {
  existsSync,
  lstatSync,
  mkdirSync,
  readFileSync,
  readlinkSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { describe, expect, it } from "vitest";
import { run, Workplace } from "./folder.js";

// What is expected is what links are for: reading goes through them, and nothing that is written does. The project's own choice, no source.

/** A place whose output folder exists. */
function prepared(): Workplace {
  const place = new Workplace();
  mkdirSync(place.out);
  mkdirSync(place.path("elsewhere"));
  return place;
}
const bake = (place: Workplace, ...args: string[]) => run("bake", place.throwFile, "-o", place.out, ...args);
const isLink = (path: string) => lstatSync(path).isSymbolicLink();

describe("what is read may be a link", () => {
  it("to the throw file, whose models are sought beside the link, and to a model", async () => {
    const place = prepared();
    expect((await bake(place)).code).toBe(0);
    mkdirSync(place.path("linked"));
    symlinkSync(place.throwFile, place.path("linked", "lob.throws.yaml"));
    const file = place.path("linked", "lob.throws.yaml");
    const without = await run("bake", file, "-o", place.path("linked", "out"));
    expect(without.code).toBe(2);
    expect(without.err).toMatch(/spanner\.glb: does not exist/);
    symlinkSync(place.path("spanner.glb"), place.path("linked", "spanner.glb"));
    expect((await run("bake", file, "-o", place.path("linked", "out"))).code).toBe(0);
    expect(place.contents(place.path("linked", "out"))).toEqual(place.contents());
  });

  it("to nothing, or to itself: one message, exit code 2", async () => {
    const place = prepared();
    symlinkSync("nowhere.yaml", place.path("a.yaml"));
    symlinkSync("b.yaml", place.path("b.yaml"));
    for (const name of ["a.yaml", "b.yaml"]) {
      const { code, err } = await run("bake", place.path(name), "-o", place.out);
      expect({ code, lines: err.trimEnd().split("\n").length }).toEqual({ code: 2, lines: 1 });
      expect(err).toContain(name);
    }
  });
});

describe("what is written goes through no link", () => {
  it("but the output folder's own, which stays one", async () => {
    const place = prepared();
    const out = place.path("link");
    symlinkSync(place.out, out);
    expect((await run("bake", place.throwFile, "-o", out)).code).toBe(0);
    expect(isLink(out)).toBe(true);
    expect(Object.keys(place.contents())).toEqual(
      expect.arrayContaining(["lob.glb", "takes.json", "toss.glb"]),
    );
  });

  it("a link in the place of a clip or of the record is replaced, what it names stays as it is", async () => {
    const place = prepared();
    expect((await bake(place)).code).toBe(0);
    const fresh = place.contents();
    const names = ["lob.glb", "takes.json"];
    const was = new Map<string, string>();
    for (const name of names) {
      const target = place.path("elsewhere", name);
      writeFileSync(target, `${readFileSync(place.path("out", name), "latin1")} `, "latin1");
      was.set(name, readFileSync(target, "latin1"));
      spawnSync("ln", ["-sf", target, place.path("out", name)]);
      expect(readlinkSync(place.path("out", name))).toBe(target);
    }
    expect((await bake(place)).code).toBe(0);
    for (const name of names) {
      expect(isLink(place.path("out", name))).toBe(false);
      expect(readFileSync(place.path("elsewhere", name), "latin1")).toBe(was.get(name));
    }
    expect(place.contents()).toEqual(fresh);
  });

  it.each<[string, (place: Workplace, path: string) => void]>([
    ["a link to somebody's file", (place, path) => symlinkSync(place.path("elsewhere", "mine.txt"), path)],
    ["a link to nothing", (place, path) => symlinkSync(place.path("elsewhere", "nothing"), path)],
    ["a link to a folder", (place, path) => symlinkSync(place.path("elsewhere"), path)],
    ["a link to itself", (_, path) => symlinkSync("lob.glb", path)],
    ["a pipe", (_, path) => void spawnSync("mkfifo", [path])],
  ])("%s is not tossbake's, and nothing is written", async (_, make) => {
    const place = prepared();
    writeFileSync(place.path("elsewhere", "mine.txt"), "mine");
    make(place, place.path("out", "lob.glb"));
    const { code, out, err } = await bake(place);
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).toMatch(/out\/lob\.glb: stands there already and is not tossbake's[^\n]*\n$/);
    expect(place.contents(place.path("elsewhere"))).toEqual({ "mine.txt": "bWluZQ==" });
    expect(place.contents()).toEqual({});
  });

  it("a file whose name is another by its case alone is left alone where the file system tells them apart", async () => {
    const place = prepared();
    writeFileSync(place.path("out", "LOB.glb"), "mine");
    const isBlind = existsSync(place.path("out", "lob.glb"));
    const { code, err } = await bake(place);
    expect({ code, err }).toEqual(
      isBlind ? { code: 2, err: expect.stringContaining("stands there already") } : { code: 0, err: "" },
    );
    expect(readFileSync(place.path("out", "LOB.glb"), "utf8")).toBe("mine");
  });

  it.each(["", "files"])(
    "a link where a bake keeps its unfinished work is refused, and nothing behind it is touched: %s",
    async (inner) => {
      const place = prepared();
      const letter = place.path("elsewhere", "letter.txt");
      writeFileSync(letter, "dear");
      if (inner) mkdirSync(`${place.out}/.tossbake-part`);
      symlinkSync(
        place.path("elsewhere"),
        [place.out, ".tossbake-part", ...(inner ? [inner] : [])].join("/"),
      );
      for (const more of [[], ["--resume"]]) {
        const { code, err } = await bake(place, ...more);
        expect({ code, lines: err.trimEnd().split("\n").length }).toEqual({ code: 2, lines: 1 });
        expect(err).toContain(".tossbake-part");
      }
      expect(readFileSync(letter, "utf8")).toBe("dear");
    },
  );

  it("a pipe in the record's place is not waited for", async () => {
    const place = prepared();
    writeFileSync(place.path("out", "lob.glb"), "mine");
    spawnSync("mkfifo", [place.path("out", "takes.json")]);
    expect((await bake(place)).err).toContain("stands there already");
  });

  it.each<[string, (place: Workplace) => string[], string]>([
    ["a table", ({ throwFile, out }) => ["csv", throwFile, "-o", out, "--only", "toss"], "toss_01.csv"],
    ["a sheet", ({ throwFile, out }) => ["strobe", throwFile, "-o", out, "--only", "toss"], "toss.svg"],
    [
      "a sheet of props",
      (place) => ["weigh", place.throwFile, "--sheet", place.path("out", "props.svg")],
      "props.svg",
    ],
  ])("a link in the place of %s is replaced too", async (_, args, name) => {
    const place = prepared();
    const target = place.path("elsewhere", "mine.txt");
    writeFileSync(target, "mine");
    symlinkSync(target, place.path("out", name));
    expect((await run(...args(place))).code).toBe(0);
    expect(isLink(place.path("out", name))).toBe(false);
    expect(readFileSync(target, "utf8")).toBe("mine");
  });

  it("new makes no file where a link to nothing stands", async () => {
    const place = prepared();
    symlinkSync(place.path("elsewhere", "anchor.glb"), place.path("out", "anchor.glb"));
    expect((await run("new", place.out)).code).toBe(2);
    expect(place.contents(place.path("elsewhere"))).toEqual({});
  });
});
