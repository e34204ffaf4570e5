import { spawnSync } from "node:child_process";
import { chmodSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { Command } from "commander";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { commandTree } from "../../src/cli/command-tree.js";
import { run, THROWS } from "./folder.js";
import { Program } from "./program.js";

// The shells themselves say what a script completes; what should be offered is what the commands' own help lists.

let program: Program;
let folder: string;
const scripts: Record<string, string> = {};

beforeAll(async () => {
  program = await Program.install();
  folder = mkdtempSync(join(tmpdir(), "completion-"));
  mkdirSync(join(folder, "bin"));
  mkdirSync(join(folder, "clips"));
  writeFileSync(join(folder, "lob.throws.yaml"), `${THROWS}chains: { pair: { throws: [lob] } }\n`);
  writeFileSync(join(folder, "a model.glb"), "");
  const shim = join(folder, "bin", "tossbake");
  writeFileSync(
    shim,
    `#!/bin/sh\nexec "${process.execPath}" "${join(program.folder, "bin/tossbake.js")}" "$@"\n`,
  );
  chmodSync(shim, 0o755);
  for (const shell of ["bash", "zsh", "fish"]) {
    const { code, out, err } = await run("completion", shell);
    expect({ code, err }).toEqual({ code: 0, err: "" });
    scripts[shell] = join(folder, `tossbake.${shell}`);
    writeFileSync(scripts[shell], out);
  }
});
afterAll(() => {
  program.remove();
  rmSync(folder, { recursive: true, force: true });
});

const environment = () => ({
  ...process.env,
  HOME: folder,
  PATH: `${join(folder, "bin")}:${process.env.PATH}`,
});
const sh = (shell: string, args: string[]) =>
  spawnSync(shell, args, { cwd: folder, env: environment(), encoding: "utf8" });
const has = (shell: string) => spawnSync(shell, ["-c", "true"]).status === 0;

/** What bash offers for the last of the words. */
function bashOffers(...words: string[]): string[] {
  const line = words.map((word) => `'${word}'`).join(" ");
  const script = `source '${scripts.bash}'; COMP_WORDS=(tossbake ${line}); COMP_CWORD=${words.length}
    _tossbake 2>/dev/null; printf '%s\\n' "\${COMPREPLY[@]}"`;
  const { stdout, stderr } = sh("bash", ["--norc", "-c", script]);
  expect(stderr).toBe("");
  return stdout.split("\n").filter((word) => word !== "");
}

/** The words of a page of help that stand at the beginning of its lines, in a group of commands or options. */
const helpWords = (help: string, pattern: RegExp) => [...help.matchAll(pattern)].map(([, word]) => word);

describe("bash", () => {
  it("offers every command that help lists, and those that begin as typed", async () => {
    const listed = helpWords((await run("--help")).out, /^ {2}([a-z]+) {2,}\S/gm);
    expect(listed.length).toBeGreaterThan(6);
    expect(bashOffers("").sort()).toEqual(listed.sort());
    expect(bashOffers("ve")).toEqual(["verify"]);
  });

  it.each(["bake", "weigh", "ways", "verify", "completion"])("offers %s's options", async (command) => {
    const { out } = await run(command, "--help");
    const listed = helpWords(out, /^ {2}(?:-\w, )?(--[a-z-]+)/gm);
    expect(bashOffers(command, "--").sort()).toEqual(listed.sort());
  });

  it.each([
    [
      ["bake", ""],
      ["a model.glb", "bin", "clips", "lob.throws.yaml"],
    ],
    [["bake", "lo"], ["lob.throws.yaml"]],
    [
      ["bake", "lob.throws.yaml", "-o", ""],
      ["bin", "clips"],
    ],
    [["bake", "lob.throws.yaml", "--output", "c"], ["clips"]],
    [["new", "c"], ["clips"]],
    [
      ["completion", ""],
      ["bash", "zsh", "fish"],
    ],
    [["completion", "z"], ["zsh"]],
    [
      ["bake", "lob.throws.yaml", "--only", ""],
      ["lob", "toss", "pair"],
    ],
    [["bake", "lob.throws.yaml", "--only", "lob", "to"], ["toss"]],
    [
      ["bake", "--json", "lob.throws.yaml", "--only", "lob", "-o", "clips", "--o"],
      ["--output", "--only"],
    ],
    [
      ["bake", "lob.throws.yaml", "--only", "lob", "-o", ""],
      ["bin", "clips"],
    ],
    [["bake", "lob.throws.yaml", "--takes", ""], []],
    [["bake", "none.yaml", "--only", ""], []],
    [["schema", ""], []],
  ])("after %j offers %j", (words, offered) => {
    // nothing but the script's own files are left out
    const found = bashOffers(...words).filter((name) => !/^tossbake\./.test(name));
    expect(found.sort()).toEqual([...offered].sort());
  });
});

describe.runIf(has("fish"))("fish", () => {
  const offers = (line: string) =>
    sh("fish", ["--no-config", "-c", `source '${scripts.fish}'; complete -C '${line}'`])
      .stdout.split("\n")
      .map((entry) => entry.split("\t")[0])
      .filter((word) => word !== "");

  it("offers commands, options, names and words", async () => {
    const listed = helpWords((await run("--help")).out, /^ {2}([a-z]+) {2,}\S/gm);
    expect(offers("tossbake ").sort()).toEqual(listed.sort());
    expect(offers("tossbake bake --dr")).toEqual(["--dry-run"]);
    expect(offers("tossbake bake lob.throws.yaml --only ")).toEqual(["lob", "pair", "toss"]);
    expect(offers("tossbake completion z")).toEqual(["zsh"]);
    expect(offers("tossbake bake lob")).toEqual(["lob.throws.yaml"]);
  });
});

describe.runIf(has("zsh"))("zsh", () => {
  it("can read the script", () => {
    expect(sh("zsh", ["-n", scripts.zsh])).toMatchObject({ status: 0, stderr: "" });
  });

  it("offers commands, options and names where Tab is pressed", () => {
    // a terminal of zsh's own, in which the word is completed and the line is then printed instead of run
    const press = (typed: string) =>
      sh("zsh", [
        "-f",
        "-c",
        `zmodload zsh/zpty; zpty z zsh -f -i
         zpty -w z "PS1=; autoload -U compinit; compinit -u -D; source '${scripts.zsh}'"
         zpty -w z 'show() { print -r -- "<\${BUFFER}>"; BUFFER= }; zle -N show; bindkey "^T" show; print rea""dy'
         zpty -r -m z line '*ready*'
         zpty -w -n z $'${typed}\\t\\x14'
         zpty -r -m z line '*<*>*'; print -r -- "$line"; zpty -d z`,
      ]).stdout.match(/<([^<>]*)>/)?.[1];
    expect(press("tossbake verif")).toBe("tossbake verify ");
    expect(press("tossbake bake --dr")).toBe("tossbake bake --dry-run ");
    expect(press("tossbake bake lob.throws.yaml --only to")).toBe(
      "tossbake bake lob.throws.yaml --only toss ",
    );
    expect(press("tossbake new cl")).toBe("tossbake new clips/");
  });
});

describe("completion", () => {
  it("needs a shell's name, and knows three", async () => {
    expect(await run("completion")).toMatchObject({
      code: 2,
      err: expect.stringMatching(/no shell is named; one of bash, zsh, fish/),
    });
    expect(await run("completion", "dash")).toMatchObject({
      code: 2,
      out: "",
      err: expect.stringMatching(/bash, zsh, fish/),
    });
  });

  it("reads choices, lists and kinds of value off the tree, whatever commands there come to be", () => {
    const toss = new Command("toss")
      .argument("<dir...>", "")
      .option("-s, --side <side>", "a side")
      .option("--page <file>", "a page");
    toss.options[0].choices(["heads", "tails"]);
    const [tree] = commandTree(new Command("program").addCommand(toss)).commands;
    expect(tree).toMatchObject({ name: "toss", arguments: ["folder"], isList: true });
    expect(tree.options.map(({ short, long, value }) => [short, long, value])).toEqual([
      ["s", "side", ["heads", "tails"]],
      [undefined, "page", "file"],
      ["h", "help", undefined],
    ]);
  });
});
