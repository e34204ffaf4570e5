import { spawnSync } from "node:child_process";
import { cpSync, existsSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { splitGlb } from "../../src/gltf/glb.js";
import { glbOf } from "../gltf/models.js";
import { OWN_BYTES, OWN_TEXT } from "../gltf/own.js";
import { assets, run, Workplace } from "./folder.js";
import { Program } from "./program.js";

// Exit codes (0 done, 1 a check failed, 2 the request is wrong, 3 the machine is) and words: the project's own choice.

const COMMANDS = ["weigh", "ways", "bake", "verify", "schema"];

describe("help", () => {
  it.each(COMMANDS)("of %s has an example that begins as it is typed", async (command) => {
    const { code, out, err } = await run(command, "--help");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    expect(out).toMatch(new RegExp(`Examples?:\\n {2}tossbake ${command}\\b`));
  });

  it("lists every command, on standard output", async () => {
    const { code, out, err } = await run("--help");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    for (const command of COMMANDS) expect(out).toMatch(new RegExp(`^ {2}${command} `, "m"));
  });

  it("is what no command at all gets, as an error", async () => {
    const { code, out, err } = await run();
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).toMatch(/^Usage: tossbake/);
  });

  it("has the package's version", async () => {
    const { version } = JSON.parse(readFileSync(new URL("../../package.json", import.meta.url), "utf8"));
    expect(await run("--version")).toEqual({ code: 0, out: `${version}\n`, err: "" });
  });
});

describe("a command line that is wrong answers 2, says why on standard error and writes nothing", () => {
  it.each<[string, string[], RegExp]>([
    ["an unknown command", ["toss"], /unknown command 'toss'/],
    ["an unknown option", ["bake", "FILE", "-o", "OUT", "--fast"], /unknown option '--fast'/],
    ["no throw file", ["bake", "-o", "OUT"], /missing required argument 'throwfile'/],
    ["no folder", ["bake", "FILE"], /no folder is named.*-o DIR/],
    ["an argument too many", ["bake", "FILE", "FILE", "-o", "OUT"], /too many arguments/],
    ["a density that is no number", ["weigh", "MODEL", "--density", "heavy"], /heavy.*above 0/],
    ["a density of nothing", ["weigh", "MODEL", "--density", "0"], /0.*above 0/],
    [
      "a density beside a throw file",
      ["weigh", "FILE", "--density", "700"],
      /--density: .*props\.NAME\.density/,
    ],
  ])("%s", async (_, args, message) => {
    const place = new Workplace();
    const named: Record<string, string> = {
      FILE: place.throwFile,
      OUT: place.out,
      MODEL: place.path("spanner.glb"),
    };
    const { code, out, err } = await run(...args.map((arg) => named[arg] ?? arg));
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).toMatch(message);
    expect(existsSync(place.out)).toBe(false);
  });
});

describe("a file that is none gets one message of one line", () => {
  const wrongFiles: [string, string, (path: string) => void, RegExp][] = [
    ["that is not there", "none.yaml", () => {}, /none\.yaml: does not exist; /],
    ["in a folder that is not there", "none/none.yaml", () => {}, /none\.yaml: does not exist; /],
    ["that is a folder", "folder.yaml", (path) => mkdirSync(path), /folder\.yaml: is not a file; /],
    ["that is empty", "empty.yaml", (path) => writeFileSync(path, ""), /empty\.yaml:1:1: .*empty.*props/],
    [
      "that is a model",
      "model.yaml",
      (path) => cpSync(assets("props/spanner.glb"), path),
      /model\.yaml: is not text in UTF-8; /,
    ],
    [
      "that is UTF-16",
      "wide.yaml",
      (path) => writeFileSync(path, Buffer.from("\ufeffprops: {}", "utf16le")),
      /wide\.yaml: is not text in UTF-8; /,
    ],
    ["that is JSON of something else", "other.json", (path) => writeFileSync(path, "[1]"), /other\.json:1:1/],
  ];
  it.each(wrongFiles)("a throw file %s", async (_, name, make, message) => {
    const place = new Workplace();
    make(place.path(name));
    for (const args of [
      ["bake", place.path(name), "-o", place.out],
      ["weigh", place.path(name)],
    ]) {
      const { code, out, err } = await run(...args);
      expect({ code, out }).toEqual({ code: 2, out: "" });
      expect(err).toMatch(message);
      expect(err).toMatch(/^[^\n]+\n$/);
    }
    expect(existsSync(place.out)).toBe(false);
  });

  const wrongModels: [string, string, (path: string) => void, RegExp][] = [
    ["that is not there", "none.glb", () => {}, /none\.glb: does not exist; /],
    ["that is a folder", "folder.glb", (path) => mkdirSync(path), /folder\.glb: is not a file; /],
    ["that is empty", "empty.glb", (path) => writeFileSync(path, ""), /empty\.glb: .*JSON/],
    [
      "that is cut off",
      "cut.glb",
      (path) => writeFileSync(path, readFileSync(assets("props/spanner.glb")).subarray(0, 999)),
      /cut\.glb: /,
    ],
    ["that is text", "text.gltf", (path) => writeFileSync(path, "a\nmodel"), /text\.gltf: it is not JSON/],
  ];
  it.each(wrongModels)("a model %s, by itself and in a throw file", async (_, name, make, message) => {
    const place = new Workplace();
    make(place.path(name));
    place.edit("lob.throws.yaml", "spanner.glb", name);
    for (const args of [
      ["bake", place.throwFile, "-o", place.out],
      ["weigh", place.path(name)],
    ]) {
      const { code, out, err } = await run(...args);
      expect({ code, out }).toEqual({ code: 2, out: "" });
      expect(err).toMatch(message);
    }
    expect(existsSync(place.out)).toBe(false);
  });
});

describe("a bake that cannot be leaves its folder as it was", () => {
  it("where one of the throws has no flight: line, column, key, what is wrong and what would be right", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    const before = place.contents();
    place.edit("lob.throws.yaml", "takes: 2 }", "takes: 2, arrive: { after: null }, arc: { speed: 1 } }");
    const { code, out, err } = await run("bake", place.throwFile, "-o", place.out);
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).toMatch(
      /^.*lob\.throws\.yaml:\d+:\d+ throws\.toss\.arc\.speed: .*1 m\/s.*; needs at least .* m\/s\n$/,
    );
    expect(place.contents()).toEqual(before);
  });

  it("where a model would be written over that it is made of", async () => {
    const place = new Workplace();
    place.edit("lob.throws.yaml", "spanner.glb", "lob.glb");
    cpSync(place.path("spanner.glb"), place.path("lob.glb"));
    const before = place.contents(place.root);
    const { code, err } = await run("bake", place.throwFile, "-o", place.root);
    expect(code).toBe(2);
    expect(err).toMatch(/lob\.glb: would be written over/);
    expect(place.contents(place.root)).toEqual(before);
  });

  it("where the throw file would be", async () => {
    const place = new Workplace();
    cpSync(place.throwFile, place.path("takes.json"));
    const { code, err } = await run("bake", place.path("takes.json"), "-o", place.root);
    expect(code).toBe(2);
    expect(err).toMatch(/takes\.json: would be written over/);
    expect(place.contents(place.root)).not.toHaveProperty("lob.glb");
  });

  it("where some throws are baked beside a record that is none", async () => {
    const place = new Workplace();
    mkdirSync(place.out);
    writeFileSync(place.path("out", "takes.json"), '{ "tossbake": "0.1.0", lost');
    const { code, err } = await run("bake", place.throwFile, "-o", place.out, "--only", "toss");
    expect(code).toBe(2);
    expect(err).toMatch(/takes\.json: is not JSON .*; bake again/);
    expect(Object.keys(place.contents())).toEqual(["takes.json"]);
    // a bake of all of them needs no record
    expect((await run("bake", place.throwFile, "-o", place.out)).code).toBe(0);
  });
});

describe("a folder that cannot be written", () => {
  it("is the machine's fault: 3, one message, nothing on standard output", async () => {
    const place = new Workplace();
    // a path below a file, which even an administrator cannot have
    for (const only of [[], ["--only", "toss"]]) {
      const { code, out, err } = await run(
        "bake",
        place.throwFile,
        "-o",
        join(place.throwFile, "out"),
        ...only,
      );
      expect({ code, out }).toEqual({ code: 3, out: "" });
      expect(err).toMatch(/^.*out: cannot be written \(a file stands where a folder should be\); .+\n$/);
    }
  });
});

describe("takes.json", () => {
  it("has throws and takes in the throw file's order, whatever they are called", async () => {
    const place = new Workplace(`
props: { "2": { shape: { box: [0.1, 0.2, 0.3] } }, constructor: { shape: { sphere: 0.1 } } }
throws:
  "10": { prop: "2", takes: 2, arrive: { at: [0, 1, 2], after: 1 } }
  zeal: { like: "10", prop: constructor }
  "9": { like: "10" }
  toString: { like: zeal }
`);
    const { code, out } = await run("bake", place.throwFile, "-o", place.out, "--json");
    expect(code).toBe(0);
    const names = ["10_01", "10_02", "zeal_01", "zeal_02", "9_01", "9_02", "toString_01", "toString_02"];
    const record = JSON.parse(out);
    expect(record.clips.map(({ name }: { name: string }) => name)).toEqual(names);

    // some of them again: the same whole record
    const whole = readFileSync(place.path("out/takes.json"), "utf8");
    for (const only of ["9", "toString", "10"]) {
      expect((await run("bake", place.throwFile, "-o", place.out, "--only", only)).code).toBe(0);
      expect(readFileSync(place.path("out/takes.json"), "utf8")).toBe(whole);
    }
  });

  it("has no number of more than 12 digits", async () => {
    const place = new Workplace();
    const { out } = await run("bake", place.throwFile, "-o", place.out, "--json");
    const numbers = out.replace(/"(\\.|[^"])*"/g, "").match(/-?\d[\d.]*(e[-+]?\d+)?/g)!;
    expect(numbers.length).toBeGreaterThan(200);
    const digits = numbers.map((text) => text.replace(/e.*|[-.]/g, "").replace(/^0+/, "").length);
    expect(Math.max(...digits)).toBe(12);
  });
});

describe("a model with a life of its own", () => {
  it("keeps its bytes, its clip, its unknown extension and what nothing refers to", async () => {
    const place = new Workplace(`
props: { lantern: { model: own.glb } }
throws: { lob: { prop: lantern, takes: 2, release: { scatter: 0..9 }, arrive: { at: [0, 1, 2], after: 1 } } }
`);
    writeFileSync(place.path("own.glb"), glbOf(OWN_TEXT, OWN_BYTES));
    expect((await run("bake", place.throwFile, "-o", place.out)).code).toBe(0);
    const written = splitGlb("", new Uint8Array(readFileSync(place.path("out/lob.glb"))));
    expect(written.binary!.subarray(0, OWN_BYTES.length)).toEqual(OWN_BYTES);
    const json = JSON.parse(new TextDecoder().decode(written.json));
    const own = JSON.parse(OWN_TEXT);
    for (const key of ["extensions", "extensionsUsed", "unknownMember", "cameras", "meshes"])
      expect(json[key]).toEqual(own[key]);
    for (const key of ["nodes", "accessors", "bufferViews", "animations"])
      expect(json[key].slice(0, own[key].length)).toEqual(own[key]);
    expect(json.animations.slice(1).map(({ name }: { name: string }) => name)).toEqual(["lob_01", "lob_02"]);
    // the same JSON text, literals and spaces and all, up to where the new members begin
    const text = new TextDecoder().decode(written.json);
    const extension = OWN_TEXT.slice(OWN_TEXT.indexOf('"extensions":'), OWN_TEXT.indexOf('"scene": 0'));
    expect(text).toContain(extension);
  });
});

describe("in a process of its own", () => {
  let program: Program;
  beforeAll(async () => {
    program = await Program.install();
  });
  afterAll(() => program.remove());

  it("the exit code is the process's", () => {
    expect(program.run(["--version"]).code).toBe(0);
    expect(program.run(["toss"]).code).toBe(2);
    const place = new Workplace();
    expect(program.run(["bake", place.throwFile, "-o", "/dev/null/out"]).code).toBe(3);
  });

  it("nothing but plain text comes out where no terminal listens, with and without NO_COLOR", () => {
    const place = new Workplace();
    for (const env of [{}, { NO_COLOR: "1" }] as Record<string, string>[])
      for (const args of [
        ["weigh", place.throwFile],
        ["bake", place.throwFile, "-o", place.out],
        ["bake"],
        ["--help"],
      ]) {
        const { out, err } = program.run(args, { env });
        expect(out + err).not.toContain("\u001b");
        if (args.length > 1) expect(err).toBe("");
      }
  });

  it("a reader that has seen enough is no fault", () => {
    const command = `{ node bin/tossbake.js schema; echo "code $?" >&2; } | head -c 1`;
    const { stdout, stderr } = spawnSync("sh", ["-c", command], { cwd: program.folder, encoding: "utf8" });
    expect(stdout).toBe("{");
    expect(stderr).toBe("code 0\n");
  });
});
