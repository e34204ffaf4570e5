import { Command } from "commander";
import { bake } from "../bake/bake.js";
import type { TakeWarning } from "../bake/notes.js";
import { RequestError } from "../math/request-error.js";
import { mergeRecord } from "../node/kept-record.js";
import { writeFiles } from "../node/output-folder.js";
import { spareInputs } from "../node/spare-inputs.js";
import { openThrowFile } from "../node/throw-file.js";
import type { ClipRecord, TakesRecord } from "../record/clip-record.js";
import { formatRecord } from "../record/format.js";
import { recordOf } from "../record/record-of.js";
import { ExitCode } from "./exit-code.js";
import { progress } from "./progress.js";
import { span, table } from "./table.js";
import { takeList } from "./take-list.js";
import { takeRange } from "./take-range.js";

interface Options {
  output?: string;
  only?: string[];
  takes?: [number, number];
  dryRun?: boolean;
  json?: boolean;
}

/** A take that is further from its mark than this, in m or rad, has missed it. */
const MISS_METRES = 1e-4;
const MISS_RADIANS = (0.01 * Math.PI) / 180;

export const bakeCommand = (answer: (code: number) => void) =>
  new Command("bake")
    .description("solve every throw of a throw file and write its clips and takes.json")
    .argument("<throwfile>", "what is thrown and how (YAML or JSON)")
    .option("-o, --output <dir>", "folder for the clips; needed unless --dry-run")
    .option("--only <name...>", "these throws and chains alone; others' clips and records stay as they are")
    .option("--takes <a-b>", "these takes alone, such as 3-7; with --dry-run", takeRange)
    .option("--dry-run", "solve and print, but write nothing")
    .option("--json", "print the record instead of the table")
    .addHelpText("after", "\nExample:\n  tossbake bake quay.throws.yaml -o out")
    .action(async (path: string, options: Options) => {
      if (options.takes && !options.dryRun)
        throw new RequestError(
          ["--takes"],
          "a throw's file holds all its takes, so that some of them cannot be written alone",
          "add --dry-run to see them, or list the takes wanted under the throw's own takes",
        );
      const { output } = options;
      if (output === undefined && !options.dryRun)
        throw new RequestError(["--output"], "no folder is named to write to", "add -o DIR, or --dry-run");
      const { file, text, models, inputs } = await openThrowFile(path);
      const shown = progress();
      const { only, takes } = options;
      const baked = await bake(file, models, { only, takes, onTake: shown.update }).finally(shown.end);
      const fresh = await recordOf(file, text, baked);
      if (output !== undefined && !options.dryRun) {
        const record = await mergeRecord(output, fresh, file);
        const files = [...baked.files, { name: "takes.json", content: formatRecord(record) }];
        await spareInputs(
          output,
          files.map(({ name }) => name),
          inputs,
        );
        await writeFiles(output, files);
      }
      const notes = [...baked.warnings, ...baked.notes.flatMap(({ warnings }) => warnings).map(warningText)];
      if (options.json) {
        process.stdout.write(formatRecord(fresh));
        for (const note of notes) process.stderr.write(`${note}\n`);
      } else process.stdout.write(report(fresh, notes, options));
      for (const { name, reason } of baked.unheld)
        process.stderr.write(`${name} is left out: ${reason.message}\n`);
      if (fresh.clips.some(missed) || baked.unheld.length > 0) answer(ExitCode.checkFailed);
    });

const missed = ({ miss }: ClipRecord) =>
  (miss.position ?? 0) > MISS_METRES || (miss.angle ?? 0) > MISS_RADIANS;

function warningText({ throwName, takes, text, differs }: TakeWarning): string {
  const more = differs ? ` (take ${takes[0]}; other numbers for the others)` : "";
  return `${throwName}, ${takeList(takes)}: ${text}${more}`;
}

function missLine({ name, miss }: ClipRecord): string {
  const ways = [
    (miss.position ?? 0) > MISS_METRES
      ? [`its mark by ${((miss.position ?? 0) * 1000).toPrecision(3)} mm`]
      : [],
    (miss.angle ?? 0) > MISS_RADIANS
      ? [`its orientation by ${(((miss.angle ?? 0) * 180) / Math.PI).toPrecision(3)}°`]
      : [],
  ];
  return `${name} misses ${ways.flat().join(" and ")}`;
}

function report(record: TakesRecord, notes: readonly string[], options: Options): string {
  const names = [...new Set(record.clips.map((clip) => clip.throw))];
  const rows = names.map((name) => {
    const clips = record.clips.filter((clip) => clip.throw === name);
    return [
      name,
      clips[0].prop,
      String(clips.length),
      span(
        clips.map((clip) => clip.duration),
        2,
      ),
      span(
        clips.map((clip) => clip.turns),
        2,
      ),
      span(
        clips.map((clip) => clip.keys.translation + clip.keys.rotation),
        0,
      ),
      span(
        clips.map((clip) => clip.bytes),
        0,
      ),
      Math.max(...clips.map((clip) => clip.error * 1000)).toFixed(3),
      clips[0].file,
    ];
  });
  const warnings = Object.entries(record.props).flatMap(([name, prop]) =>
    prop.warnings.map((text) => `${name}: ${text}`),
  );
  const misses = record.clips.filter(missed).map(missLine);
  const head = ["throw", "prop", "takes", "time s", "turns", "keys", "bytes/clip", "within mm", "file"];
  const end = options.dryRun
    ? ", nothing written (--dry-run)"
    : ` written to ${options.output}, with takes.json`;
  return `${table(head, rows)}\n\n${[...warnings, ...notes, ...misses].map((line) => `${line}\n`).join("")}${counted(record.clips.length, "take")} of ${whatIsIn(record)}${end}\n`;
}

function whatIsIn({ clips }: TakesRecord): string {
  const names = (isChain: boolean) =>
    new Set(clips.filter(({ parts }) => (parts !== undefined) === isChain).map((clip) => clip.throw)).size;
  const [throws, chains] = [names(false), names(true)];
  return [
    ...(throws > 0 || chains === 0 ? [counted(throws, "throw")] : []),
    ...(chains > 0 ? [counted(chains, "chain")] : []),
  ].join(" and ");
}

const counted = (count: number, what: string) => `${count} ${what}${count === 1 ? "" : "s"}`;
