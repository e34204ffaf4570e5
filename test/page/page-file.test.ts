import { createHash } from "node:crypto";
import { existsSync, readFileSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
// @ts-expect-error it is a script of the build, without types
import { bundlePage } from "../../assets/build-page.js";
import type { PageData } from "../../src/review/page-data.js";
import type { Program } from "../cli/program.js";
import { HARM } from "./hostile.js";
import { installPage } from "./installed.js";
import { Workshop, yard } from "./throws.js";

// the program and its page are bundled first
vi.setConfig({ testTimeout: 120_000, hookTimeout: 120_000 });

let program: Program;
const workshop = new Workshop(yard());
const page = join(workshop.folder, "yard.html");

beforeAll(async () => {
  program = await installPage();
});
afterAll(() => {
  program?.remove();
  workshop.remove();
});

const write = (source: string, output: string) => program.run(["preview", source, "--page", output]);
const textsOf = (html: string, tag: string): string[] =>
  [...html.matchAll(new RegExp(`<${tag}(?: [^>]*)?>(.*?)</${tag}>`, "gs"))].map((match) => match[1]);
const dataOf = (html: string): PageData =>
  JSON.parse(/<script type="application\/json"[^>]*>(.*?)<\/script>/s.exec(html)?.[1] ?? "");

describe("preview --page", () => {
  it("writes the page, and the same bytes again", () => {
    expect(write(workshop.path, page)).toEqual({
      code: 0,
      out: `${workshop.path} is shown by ${page}\n`,
      err: "",
    });
    const first = readFileSync(page);
    write(workshop.path, page);
    expect(readFileSync(page).equals(first)).toBe(true);
  });

  it("is bundled to the same bytes wherever", async () => {
    const again = join(workshop.folder, "again");
    await bundlePage(again);
    for (const name of ["page.js", "page.css", "body.html"])
      expect(
        readFileSync(join(again, name)).equals(readFileSync(join(program.folder, "dist/page", name))),
      ).toBe(true);
  });

  it("holds all it needs, and a policy under which it can load nothing else", () => {
    const html = readFileSync(page, "utf8");
    const outside = html
      .replace(/<script.*?<\/script>/gs, "")
      .match(/(?:src|href|action)\s*=\s*"(?!data:)[^"]*"|url\((?!data:)/g);
    expect(outside).toBeNull();
    const policy = /http-equiv="Content-Security-Policy" content="([^"]*)"/.exec(html)?.[1] ?? "";
    expect(policy).toContain("default-src &#39;none&#39;");
    expect(policy).not.toMatch(/unsafe|self|\*|https?:/);
    // CSP 3, 2.3.1: base64 of the SHA-256 of the element's text
    const hash = (text: string) => `sha256-${createHash("sha256").update(text).digest("base64")}`;
    const [style] = textsOf(html, "style");
    expect(policy).toContain(`style-src &#39;${hash(style)}&#39;`);
    const script = textsOf(html, "script").at(-1) ?? "";
    expect(policy).toContain(`script-src &#39;${hash(script)}&#39;`);
  });

  it("is under 1.2 MB without its clips", () => {
    const html = readFileSync(page, "utf8");
    const clips = [...html.matchAll(/<script type="text\/plain"[^>]*>(.*?)<\/script>/gs)];
    expect(clips).toHaveLength(2);
    const rest = clips.reduce((size, [whole]) => size - whole.length, Buffer.byteLength(html));
    // the bar that was set for it
    expect(rest).toBeLessThan(1_200_000);
  });

  it("shows a baked folder as it is, by the true flight that its record states", () => {
    const out = join(workshop.folder, "out");
    expect(program.run(["bake", workshop.path, "-o", out]).code).toBe(0);
    const [fromFile, folderPage] = [readFileSync(page, "utf8"), join(workshop.folder, "out.html")];
    expect(write(out, folderPage).code).toBe(0);
    const [fresh, kept] = [dataOf(fromFile), dataOf(readFileSync(folderPage, "utf8"))];
    expect(kept.title).toBe("out");
    expect(kept.throws.map(({ name }) => name)).toEqual(fresh.throws.map(({ name }) => name));
    fresh.throws.forEach(({ takes }, i) => {
      takes.forEach((take, j) => {
        const other = kept.throws[i].takes[j];
        expect(other.record).toEqual(take.record);
        const [mine, theirs] = [take.motion.parts[0], other.motion.parts[0]];
        expect(theirs.start).toBeCloseTo(mine.start, 11);
        expect(theirs.apex).toBeCloseTo(mine.apex ?? Number.NaN, 9);
        for (const key of ["centerOfMass", "velocity", "gravity", "spin"] as const)
          theirs.launch[key].forEach((value, axis) => {
            expect(value).toBeCloseTo(mine.launch[key][axis], 9);
          });
      });
    });
  });

  it("writes nothing where the throw file is wrong, and leaves the old page", () => {
    const old = readFileSync(page);
    const wrong = new Workshop(yard().replace("prop: lid", "prop: lit"));
    const { code, err } = write(wrong.path, page);
    expect(code).toBe(2);
    expect(err).toContain("throws.skim.prop: no prop has this name");
    expect(readFileSync(page).equals(old)).toBe(true);
    const fresh = join(wrong.folder, "fresh.html");
    write(wrong.path, fresh);
    expect(existsSync(fresh)).toBe(false);
    wrong.remove();
  });

  it("never writes over what it is made of", () => {
    const model = join(workshop.folder, "spanner.glb");
    const link = join(workshop.folder, "link.html");
    symlinkSync(model, link);
    for (const output of [workshop.path, model, link]) {
      const before = readFileSync(output);
      const { code, err } = write(workshop.path, output);
      expect([code, err]).toEqual([2, expect.stringContaining("choose another folder with --page")]);
      expect(readFileSync(output).equals(before)).toBe(true);
    }
    const record = join(workshop.folder, "out/takes.json");
    const before = readFileSync(record);
    expect(write(join(workshop.folder, "out"), record).code).toBe(2);
    expect(readFileSync(record).equals(before)).toBe(true);
  });

  it("tells of a place that cannot be written to", () => {
    const file = join(workshop.folder, "file");
    writeFileSync(file, "");
    const { code, err } = write(workshop.path, join(file, "page.html"));
    expect([code, err]).toEqual([3, expect.stringContaining("with --page")]);
  });

  it.each(["axes: [z, x, y]", "unit: 0.01"])(
    "refuses a folder that was baked for a host with %s, in words",
    (host) => {
      const other = new Workshop(`host: { ${host} }\n${yard()}`);
      const out = join(other.folder, "out");
      expect(program.run(["bake", other.path, "-o", out, "--no-strobe"]).code).toBe(0);
      const output = join(other.folder, "page.html");
      const { code, err } = write(out, output);
      expect([code, err]).toEqual([2, expect.stringMatching(/a host.*name the throw file instead/)]);
      expect(existsSync(output)).toBe(false);
      other.remove();
    },
  );

  it("names takes that are left out, and ends with 1", () => {
    const wide = new Workshop(yard().replace("    hold:", "    limits: { maxHeight: 1.3 }\n    hold:"));
    const output = join(wide.folder, "page.html");
    const { code, err } = write(wide.path, output);
    expect(code).toBe(1);
    expect(err).toContain("lob_01 is left out: ");
    const { throws } = dataOf(readFileSync(output, "utf8"));
    expect(throws[0].takes).toEqual([]);
    expect(throws[0].unheld.map(({ name }) => name)).toEqual(["lob_01", "lob_02", "lob_03", "lob_04"]);
    wide.remove();
  });

  it("holds markup in a record as text alone", () => {
    const out = join(workshop.folder, "out");
    const path = join(out, "takes.json");
    const text = readFileSync(path, "utf8");
    const record = JSON.parse(text);
    record.clips[0].draws = { [HARM.script]: HARM.comment };
    record.clips[0].throw = HARM.script;
    record.clips[1].file = `../${HARM.attribute}.glb`;
    writeFileSync(path, JSON.stringify(record));
    const output = join(workshop.folder, "hostile.html");
    expect(write(out, output).code).toBe(0);
    writeFileSync(path, text);
    const html = readFileSync(output, "utf8");
    expect(dataOf(html).throws[0].name).toBe(HARM.script);
    // data, two files, the program
    expect(html.match(/<script/g)).toHaveLength(4);
    expect(html).not.toContain("window.hit='script'</script>");
  });
});
