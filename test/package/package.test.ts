import { execFileSync, spawnSync } from "node:child_process";
import {
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { blocks, examples, layFirstThrow, section } from "../house/readme.js";
import { ROOT } from "../house/sources.js";

// The package as npm packs it, installed into an empty folder, and the README followed there. Sizes and contents: the project's own choice.

const MOST_BYTES = 1_000_000;
const LONG = 300_000;

let place: string;
let project: string;
let packed: { filename: string; size: number; files: { path: string }[] };

/** npm would take settings of the run it is within for its own. */
const environment = Object.fromEntries(Object.entries(process.env).filter(([name]) => !/^npm_/i.test(name)));

const npm = (cwd: string, ...args: string[]): string =>
  execFileSync("npm", args, { cwd, env: environment, encoding: "utf8", stdio: ["ignore", "pipe", "pipe"] });

beforeAll(() => {
  place = mkdtempSync(join(tmpdir(), "tossbake-package-"));
  const source = join(place, "source");
  // what Git knows and what is about to be committed: packing must not touch the folder that the other tests read
  const names = execFileSync("git", ["ls-files", "--cached", "--others", "--exclude-standard"], {
    cwd: ROOT,
    encoding: "utf8",
  });
  for (const name of names.trim().split("\n")) {
    if (name.startsWith("test/") || !existsSync(join(ROOT, name))) continue;
    mkdirSync(dirname(join(source, name)), { recursive: true });
    cpSync(join(ROOT, name), join(source, name));
  }
  symlinkSync(join(ROOT, "node_modules"), join(source, "node_modules"));
  npm(source, "run", "build");
  [packed] = JSON.parse(npm(source, "pack", "--json", "--ignore-scripts"));

  project = join(place, "project");
  mkdirSync(project);
  npm(project, "init", "--yes");
  npm(project, "install", "--prefer-offline", "--no-audit", "--no-fund", join(source, packed.filename));
}, LONG);
afterAll(() => rmSync(place, { recursive: true, force: true }));

function sh(command: string, cwd = project): { code: number | null; out: string; err: string } {
  const { status, stdout, stderr } = spawnSync("sh", ["-c", command], {
    cwd,
    env: environment,
    encoding: "utf8",
  });
  return { code: status, out: stdout, err: stderr };
}

/** The command lines that a section has in its blocks. */
const commandsOf = (heading: string): string[] =>
  blocks(section(heading), "sh")
    .flatMap((block) => block.split("\n"))
    .filter((line) => line.startsWith("npx tossbake"));

describe("the package", () => {
  it("is under a megabyte, and holds what it needs and nothing of the workshop", () => {
    expect(packed.size).toBeLessThan(MOST_BYTES);
    const paths = packed.files.map(({ path }) => path);
    for (const path of [
      "LICENSE",
      "README.md",
      "CHANGELOG.md",
      "THIRD-PARTY.md",
      "bin/tossbake.js",
      "dist/index.js",
      "dist/index.d.ts",
      "assets/starter/anchor.glb",
      "assets/starter/.gitattributes",
    ])
      expect(paths).toContain(path);
    expect(
      paths.filter((path) => /^(src|test|\.ci)\/|\.test\.|node_modules|^assets\/(?!starter)/.test(path)),
    ).toEqual([]);
  });

  it("runs no script where it is installed, and neither does anything it brings along", () => {
    const { packages } = JSON.parse(readFileSync(join(project, "package-lock.json"), "utf8"));
    const installed = Object.keys(packages).filter((path) => existsSync(join(project, path, "package.json")));
    expect(installed.length).toBeGreaterThan(10);
    const scripts = installed.flatMap((path) => {
      const { name, scripts = {} } = JSON.parse(readFileSync(join(project, path, "package.json"), "utf8"));
      return ["preinstall", "install", "postinstall"]
        .filter((hook) => hook in scripts)
        .map((hook) => `${name} ${hook}`);
    });
    expect(scripts).toEqual([]);
  });

  it("names no host, and no file that is not there", () => {
    const own = JSON.parse(readFileSync(join(project, "node_modules/tossbake/package.json"), "utf8"));
    for (const path of [own.types, own.bin.tossbake, own.exports["."].types, own.exports["."].default])
      expect(statSync(join(project, "node_modules/tossbake", path)).isFile()).toBe(true);
    expect(JSON.stringify(own)).not.toMatch(/https?:|git\+/);
  });
});

describe("installed into an empty folder", () => {
  it(
    "every command of the README's first throw works there, and those that keep it true",
    () => {
      layFirstThrow(project);
      const commands = [...commandsOf("Your first throw"), "npx tossbake verify first.throws.yaml -o clips"];
      expect(commands).toHaveLength(3);
      for (const command of commands) expect({ command, ...sh(command) }).toMatchObject({ code: 0, err: "" });
      expect(
        readdirSync(join(project, "clips"))
          .filter((name) => /\.(glb|json)$/.test(name))
          .sort(),
      ).toEqual(["caught.glb", "lob-to-bench.glb", "takes.json"]);
      const { code, out } = sh(
        "npx tossbake ways first.throws.yaml --only caught --takes 1-1 && npx tossbake schema > throws.schema.json",
      );
      expect(code).toBe(0);
      expect(out).toMatch(/^caught, take 1/);
      expect(JSON.parse(readFileSync(join(project, "throws.schema.json"), "utf8"))).toHaveProperty(
        "properties",
      );
    },
    LONG,
  );

  it(
    "the starter is made and baked by the commands that it prints",
    () => {
      const made = sh("npx tossbake new starter");
      expect(made).toMatchObject({ code: 0, err: "" });
      const next = made.out
        .split("\n")
        .filter((line) => line.startsWith("  ") && /^ {2}(cd|npx) /.test(line));
      expect(next).toHaveLength(3);
      const ran = sh(next.join(" && "));
      expect(ran).toMatchObject({ code: 0, err: "" });
      expect(readdirSync(join(project, "starter/clips"))).toContain("takes.json");
    },
    LONG,
  );

  it(
    "the README's scripts run",
    () => {
      for (const [i, code] of examples.entries()) {
        writeFileSync(join(project, `example-${i}.mjs`), code);
        expect({ i, ...sh(`node example-${i}.mjs`) }).toMatchObject({ code: 0, err: "" });
      }
    },
    LONG,
  );

  it(
    "npm can list what is installed as a bill of materials",
    () => {
      const bill = JSON.parse(npm(project, "sbom", "--sbom-format", "cyclonedx", "--omit", "dev"));
      expect(bill.components.map(({ name }: { name: string }) => name)).toEqual(
        expect.arrayContaining(["tossbake", "yaml", "zod"]),
      );
    },
    LONG,
  );
});
