import { basename, join } from "node:path";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fileNames } from "../../src/review/file-names.js";

const named = (...names: string[]) => fileNames(names, "animation");

describe("names of files for clips that may be called anything", () => {
  it("are the clips' own where those are safe, letters of other scripts included", () => {
    expect(named("lob_01", "Wurf nach links".replaceAll(" ", "_"), "投げる", "a.b", "x-1")).toEqual([
      "lob_01",
      "Wurf_nach_links",
      "投げる",
      "a.b",
      "x-1",
    ]);
  });

  it("leave no folder, hide nothing, and hold no markup", () => {
    expect(
      named("../../etc/passwd", "..", "C:\\temp\\x", "<script>&", ".hidden", "-rf", "a\u202egnp.svg"),
    ).toEqual(["etc-passwd", "animation-2", "C-temp-x", "script-&", "hidden", "rf", "a-gnp.svg"]);
  });

  it("are numbers where there is none", () => {
    expect(named("", "ok", "///", "\ud800")).toEqual(["animation-1", "ok", "animation-3", "animation-4"]);
  });

  it("are each another, whatever the case and however accents are written", () => {
    expect(named("Walk", "walk", "walk-2", "WALK", "\u00e9", "e\u0301")).toEqual([
      "Walk",
      "walk-2",
      "walk-2-2",
      "WALK-3",
      "\u00e9",
      "\u00e9-2",
    ]);
    expect(fileNames(["takes", "x"], "animation", ["takes"])).toEqual(["takes-2", "x"]);
  });

  it("are no devices of some systems", () => {
    // Microsoft Learn, "Naming Files, Paths, and Namespaces"
    for (const name of ["con", "NUL", "lpt1", "aux.glb"]) expect(named(name)[0]).toMatch(/^[a-z0-9]+-$/i);
  });

  it("hold all that for any names", () => {
    fc.assert(
      fc.property(fc.array(fc.string({ unit: "binary", maxLength: 80 }), { maxLength: 8 }), (names) => {
        const files = fileNames(names, "animation");
        expect(new Set(files.map((name) => name.toLowerCase())).size).toBe(names.length);
        for (const name of files) {
          expect(basename(join("/out", `${name}.svg`))).toBe(`${name}.svg`);
          expect(new TextEncoder().encode(`${name}.svg`).length).toBeLessThanOrEqual(255);
          expect(name).toMatch(/^[^-.\\/:]/);
        }
      }),
    );
  });
});
