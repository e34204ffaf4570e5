/** One command line over changed inputs, in a process of its own; what must not come of it is thrown. */

import { spawnSync } from "node:child_process";
import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { takeNumbers } from "../../src/throwfile/types.js";
import type { Program } from "../cli/program.js";
import { LEFT_OUT } from "./cases.js";
import { Chance } from "./chance.js";
import { mutateModel } from "./models.js";
import { Place } from "./place.js";
import { mutateText } from "./texts.js";

/** s of the processor's time: starting Node and whole bakes by two threads are among it, which a busy machine makes twice as dear. And s after which a process is ended whatever it does. */
const MOST_SECONDS = 15;
const MOST_WHERE_LEFT_OUT = 150;
const PATIENCE = 600;
/** Takes of a throw file that are worth a process's time. */
const MOST_TAKES = 12;

const FILE = "in/lob.throws.yaml";
const MODEL = "in/spanner.glb";
const BAKED = "in/clips";
const SHARDS = "in/shards";

/** Tells the processor's time that it took, when it ends. */
const TELL_TIME = `--import=data:text/javascript,${encodeURIComponent(
  'process.on("exit", () => { const { user, system } = process.cpuUsage(); console.error("took " + (user + system)); })',
)}`;

/** What each command is given, and which of it is changed. */
const COMMANDS: [string, string[], string[]][] = [
  ["bake", [FILE, "-o", "out", "--jobs", "1"], [FILE, MODEL]],
  ["bake", [FILE, "-o", "out", "--jobs", "2"], [FILE]],
  ["bake", [FILE, "-o", BAKED, "--only", "lob", "--jobs", "1"], [`${BAKED}/takes.json`]],
  ["weigh", [MODEL, "--sheet", "out/spanner.svg"], [MODEL]],
  ["weigh", [FILE, "--json"], [FILE, MODEL]],
  ["ways", [FILE, "--only", "back", "--takes", "1-1"], [FILE]],
  ["strobe", [FILE, "-o", "out"], [FILE]],
  ["strobe", [`${BAKED}/lob.glb`, "-o", "out"], [`${BAKED}/lob.glb`]],
  ["strobe", [BAKED, "-o", "out"], [`${BAKED}/takes.json`, `${BAKED}/lob.glb`]],
  ["csv", [FILE, "-o", "out", "--rate", "60"], [FILE]],
  ["verify", [FILE, "-o", BAKED], [FILE, MODEL, `${BAKED}/takes.json`, `${BAKED}/lob.glb`]],
  ["verify", ["-o", BAKED, "--against", BAKED], [`${BAKED}/takes.json`]],
  ["preview", [FILE, "--page", "out/page.html"], [FILE, MODEL]],
  ["preview", [BAKED, "--page", "out/page.html"], [`${BAKED}/takes.json`, `${BAKED}/lob.glb`]],
  ["merge", [SHARDS, "-o", "out"], [`${SHARDS}/takes.1-of-2.jsonl`, `${SHARDS}/takes.2-of-2.jsonl`]],
  ["new", ["out/first"], []],
];

const ARGUMENTS = [
  ...["", "-", "--", "-o", "--json", "--only", "--takes", "1-2", "2-1", "0-0", "1e9-2e9", "-1", "0", "x"],
  ...["NaN", "1e400", "--jobs", "--shard", "2/1", "1/1", "--resume", "--dry-run", "--rate", "--density"],
  ...["out", "out/a/b", "out/../out", "in/nothing.yaml", MODEL, FILE, BAKED, "/dev/null", "/dev/null/x"],
  ...["/proc/x", "lob", "toss", "constructor", "é".repeat(300), "\n", "a b", "*", "$(x)", "--against"],
];

/**
 * @param given folder with `in`'s content
 * @returns what came of it, in a word
 */
export function commandCase(program: Program, given: string, number: number): string {
  const chance = new Chance(3, number);
  const [command, usual, changed] = COMMANDS[number % COMMANDS.length];
  const place = new Place(given);
  try {
    for (const name of changed) if (chance.below(3) > 0) changeFile(join(place.cwd, name), chance);
    const args = [command, ...(chance.below(4) === 0 ? mutateArguments(usual, chance) : usual)];
    return run(program, place, args);
  } finally {
    place.remove();
  }
}

function changeFile(path: string, chance: Chance): void {
  const bytes = new Uint8Array(readFileSync(path));
  if (path.endsWith(".glb")) {
    writeFileSync(path, mutateModel(bytes, chance));
    return;
  }
  const text = new TextDecoder().decode(bytes);
  if (path.endsWith(".jsonl")) {
    const lines = text.trimEnd().split("\n");
    const at = chance.below(lines.length);
    lines[at] = mutateText(lines[at], lines, chance).replaceAll("\n", " ");
    writeFileSync(path, `${lines.join("\n")}\n`);
    return;
  }
  let other = mutateText(text, [text], chance);
  while (path.endsWith(".yaml") && isMuchWork(other)) other = mutateText(text, [text], chance);
  writeFileSync(path, other);
}

function isMuchWork(text: string): boolean {
  try {
    const { throws } = parseThrowFile("a", text);
    return [...throws.values()].some(({ takes }) => takeNumbers(takes).length > MOST_TAKES);
  } catch {
    return false;
  }
}

function mutateArguments(args: readonly string[], chance: Chance): string[] {
  const changed = [...args];
  for (let count = chance.few(3); count > 0; count--) {
    const [at, way] = [chance.below(changed.length), chance.below(3)];
    // what is written must be looked for in the output folder alone
    if (/^(-o|--page|--sheet)$/.test(changed[at - 1] ?? "")) continue;
    if (way === 0) changed.splice(at, 1);
    else if (way === 1) changed.splice(at, 0, chance.pick(ARGUMENTS));
    else changed[at] = chance.pick(ARGUMENTS);
  }
  return changed.map((arg) => arg.replaceAll("\0", ""));
}

function run({ folder }: Program, place: Place, args: readonly string[]): string {
  const before = place.listing();
  const { status, signal, stderr } = spawnSync(
    process.execPath,
    [TELL_TIME, join(folder, "bin/tossbake.js"), ...args],
    {
      cwd: place.cwd,
      env: { ...process.env, NODE_OPTIONS: "", ...place.env },
      encoding: "utf8",
      timeout: PATIENCE * 1000,
      killSignal: "SIGKILL",
      maxBuffer: 1 << 28,
    },
  );
  const fault = (what: string) => new Error(`${what}: ${JSON.stringify(args)}\n${stderr.slice(0, 2000)}`);
  if (status === null) throw fault(`ended by ${signal}`);
  if (![0, 1, 2, 3].includes(status)) throw fault(`answers ${status}`);
  const said = stderr.replace(/took \d+\n$/, "");
  if (/fault of tossbake|\n\s+at .+:\d+:\d+/.test(said)) throw fault("an own fault");
  if (/undefined|\[object/.test(said)) throw fault("told badly");
  if (status >= 2 && said.trim() === "") throw fault("no word of why");
  const seconds = Number(/took (\d+)\n$/.exec(stderr)?.[1]) / 1e6;
  const isLeftOut = / is left out: /.test(said);
  if (!(seconds <= (isLeftOut ? MOST_WHERE_LEFT_OUT : MOST_SECONDS))) throw fault(`took ${seconds} s`);
  const touched = changes(before, place.listing(), args);
  if (touched.length > 0) throw fault(`touched ${touched.join(", ")}`);
  if (status >= 2) checkLeft(place, fault);
  return isLeftOut ? LEFT_OUT : `ended with ${status}`;
}

/** What is other than before, where nothing may be: a bake into the folder of clips may change that. */
function changes(before: readonly string[], after: readonly string[], args: readonly string[]): string[] {
  const differ = [
    ...before.filter((line) => !after.includes(line)),
    ...after.filter((line) => !before.includes(line)),
  ];
  const isOutput = args.includes(BAKED) && args[0] === "bake";
  return differ.filter((line) => !(isOutput && line.startsWith(`work/${BAKED}`)));
}

/** What is refused leaves nothing half made. */
function checkLeft(place: Place, fault: (what: string) => Error): void {
  let left: string[] = [];
  try {
    left = readdirSync(join(place.cwd, "out"), { recursive: true }).map(String);
  } catch {
    // it was not made at all
  }
  if (left.some((name) => /\.part|\.tossbake/.test(name))) throw fault(`left ${left.join(", ")}`);
}
