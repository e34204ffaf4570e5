import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { run, THROWS, Workplace } from "../cli/folder.js";

// What is expected is what a stranger's file must not do: no outside source. Words: the project's own choice.

/** A whole batch of one shard, its record changed. */
async function changed(change: (lines: string[]) => void) {
  const place = new Workplace(THROWS.replace("props:", "bake: { files: per-take }\nprops:"));
  const baked = await run("bake", place.throwFile, "-o", place.path("in", "deep", "shard"), "--shard", "1/1");
  expect(baked.code).toBe(0);
  const path = place.path("in", "deep", "shard", "takes.1-of-1.jsonl");
  const lines = readFileSync(path, "utf8").trimEnd().split("\n");
  change(lines);
  writeFileSync(path, `${lines.join("\n")}\n`);
  return { place, merge: () => run("merge", place.path("in", "deep", "shard"), "-o", place.path("out")) };
}

/** Names of all files below a folder. */
const below = (folder: string): string[] =>
  readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name))
    .sort();

describe("merging the record of a shard that somebody changed", () => {
  it.each(["../../x.glb", "/tmp/x.glb", "..\\x.glb", "sub/x.glb", ".x.glb", "lob_01.txt", "x.glb\u0000"])(
    "takes no file %j",
    async (name) => {
      const { place, merge } = await changed((lines) => {
        const line = JSON.parse(lines[1]);
        line.figures.file = name;
        lines[1] = JSON.stringify(line);
      });
      writeFileSync(place.path("in", "x.glb"), "outside");
      const before = below(place.root);
      const { code, err } = await merge();
      expect(code).toBe(2);
      expect(err).toMatch(/takes\.1-of-1\.jsonl: is not as a shard's record is written \(line 2\); bake/);
      expect(below(place.root)).toEqual(before);
    },
  );

  it.each<[string, (lines: string[]) => void, RegExp]>([
    [
      "a first line of nothing",
      (lines) => lines.splice(0, 1, "{}"),
      /is not as a shard's record is written; /,
    ],
    ["null", (lines) => lines.splice(1, 1, "null"), /\(line 2\)/],
    ["a take without numbers", (lines) => lines.splice(2, 1, '{"of":"lob"}'), /\(line 3\)/],
    [
      "takes of a throw that is none",
      (lines) => lines.splice(1, 1, lines[1].replace('"lob"', '"x"')),
      /no throw/,
    ],
    ["takes in another order", (lines) => lines.splice(1, 0, lines.splice(5, 1)[0]), /another order/],
  ])("refuses %s", async (_, change, message) => {
    const { place, merge } = await changed(change);
    const before = below(place.root);
    const { code, err } = await merge();
    expect(code).toBe(2);
    expect(err).toMatch(message);
    expect(below(place.root)).toEqual(before);
  });

  it("takes one that nobody changed", async () => {
    const { place, merge } = await changed(() => {});
    expect((await merge()).code).toBe(0);
    expect(readdirSync(place.path("out"))).toContain("takes.json");
  });
});
