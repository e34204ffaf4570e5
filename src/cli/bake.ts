import { Command } from "commander";
import { RequestError } from "../math/request-error.js";
import { bakeFolder } from "../node/bake-folder.js";
import { Interrupted, watchForStop } from "../node/interrupted.js";
import { type OpenedThrowFile, openThrowFile } from "../node/throw-file.js";
import { bakeReport, noteLines } from "./bake-report.js";
import { ExitCode } from "./exit-code.js";
import { jobCount } from "./job-count.js";
import { progress } from "./progress.js";
import { shardOf } from "./shard-of.js";
import { takeRange } from "./take-range.js";

interface Options {
  output?: string;
  only?: string[];
  takes?: [number, number];
  jobs?: number;
  shard?: { index: number; of: number };
  resume?: boolean;
  strobe: boolean;
  dryRun?: boolean;
  json?: boolean;
}

export const bakeCommand = (answer: (code: number) => void) =>
  new Command("bake")
    .description("solve every throw of a throw file and write its clips and takes.json")
    // optional for the parser alone: the names after --only take up a throw file behind them
    .argument("[throwfile]", "what is thrown and how (YAML or JSON)")
    .usage("[options] <throwfile>")
    .option("-o, --output <dir>", "folder for the clips; needed unless --dry-run")
    .option("--only <name...>", "these throws and chains alone; others' clips and records stay as they are")
    .option(
      "--takes <a-b>",
      "these takes alone, such as 3-7; with --dry-run or with bake: { files: per-take }",
      takeRange,
    )
    .option("--jobs <n>", "threads that share the work; default as many as there are cores", jobCount)
    .option("--resume", "go on where a bake into this folder was stopped")
    .option(
      "--shard <i/n>",
      "this machine's share of the takes, such as 2/8, with bake: { files: per-take }; tossbake merge puts them together",
      shardOf,
    )
    .option("--no-strobe", "draw no sheets (THROW.svg, takes.svg)")
    .option("--dry-run", "solve and print, but write nothing")
    .option("--json", "print the record instead of the table")
    .addHelpText("after", "\nExample:\n  tossbake bake quay.throws.yaml -o out")
    .action(async (path: string | undefined, options: Options, command: Command) => {
      const only = options.only && [...options.only];
      // no throw has a dot in its name
      const throwFile = path ?? (only?.at(-1)?.includes(".") ? only.pop() : undefined);
      if (throwFile === undefined) return command.error("error: missing required argument 'throwfile'");
      const { output, dryRun = false } = options;
      if (output === undefined && !dryRun)
        throw new RequestError(["--output"], "no folder is named to write to", "add -o DIR, or --dry-run");
      const opened = await openThrowFile(throwFile);
      checkTakes(opened, options);
      await bakeAndTell(throwFile, opened, { ...options, only }, answer);
    });

async function bakeAndTell(
  path: string,
  opened: OpenedThrowFile,
  { only, takes, shard, jobs, resume, strobe, dryRun = false, json = false, output }: Options,
  answer: (code: number) => void,
): Promise<void> {
  const shown = progress();
  const stop = watchForStop();
  let counts: [number, number] = [0, 0];
  const printed: string[] = [];
  try {
    const report = await bakeFolder(path, opened, dryRun ? undefined : output, {
      only,
      takes,
      shard,
      jobs,
      resume,
      sheets: strobe,
      signal: stop.signal,
      onTakes: (done, total) => {
        counts = [done, total];
        shown.update(done, total);
      },
      onNote: (text) => process.stderr.write(`${text}\n`),
      ...(json && { shown: { write: async (text) => void printed.push(text) } }),
    }).finally(shown.end);
    if (json) for (const text of printed) process.stdout.write(text);
    else
      process.stdout.write(
        bakeReport(
          report,
          dryRun ? ", nothing written (--dry-run)" : ` written to ${output}${withRecord(shard)}`,
        ),
      );
    for (const line of [...(json ? noteLines(report) : []), ...leftOut(report.left)])
      process.stderr.write(`${line}\n`);
    if (report.throws.some(({ missed }) => missed.length > 0) || report.left.length > 0)
      answer(ExitCode.checkFailed);
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    const kept = dryRun
      ? ""
      : `; what is done is kept, and the same command with --resume goes on from there`;
    throw new Interrupted(`stopped after ${counts[0]} of ${counts[1]} takes${kept}`);
  } finally {
    stop.end();
  }
}

const withRecord = (shard?: Options["shard"]) =>
  shard ? `: shard ${shard.index} of ${shard.of}, for tossbake merge` : ", with takes.json";

const leftOut = (left: readonly { name: string; reason: string }[]) =>
  left.map(({ name, reason }) => `${name} is left out: ${reason}`);

function checkTakes({ file }: OpenedThrowFile, { takes, dryRun }: Options): void {
  if (takes && !dryRun && file.bake.files !== "per-take")
    throw new RequestError(
      ["--takes"],
      "a throw's file holds all its takes, so that some of them cannot be written alone",
      "add --dry-run to see them, list the takes wanted under the throw's own takes, or write bake: { files: per-take }",
    );
}
