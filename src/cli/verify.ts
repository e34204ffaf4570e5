import { basename, dirname, join, resolve } from "node:path";
import { Command } from "commander";
import { bake } from "../bake/bake.js";
import { RequestError } from "../math/request-error.js";
import {
  checkFolder,
  compareFiles,
  compareSheets,
  contentsOf,
  isBeingBaked,
  readBakedFolder,
  sheetsIn,
} from "../node/baked-folder.js";
import { type OpenedThrowFile, openThrowFile } from "../node/throw-file.js";
import type { TakesRecord } from "../record/clip-record.js";
import { compareBakes, type Drift, type FolderFile } from "../record/compare.js";
import { fallsOtherwise } from "../record/compare-host.js";
import { driftLines } from "../record/compare-report.js";
import { formatRecord } from "../record/format.js";
import { recordOf } from "../record/record-of.js";
import { shapesOfProps } from "../review/drift-shapes.js";
import { type NamedSheet, sheetsInput, sheetsOf } from "../review/sheets.js";
import { counted } from "./counted.js";
import {
  type Compared,
  refuseCompared,
  shapesOfFolder,
  shortNames,
  writeDriftSheets,
} from "./drift-pictures.js";
import { ExitCode } from "./exit-code.js";
import { progress } from "./progress.js";

/** Of all takes. */
const TAKES_SHEET = "takes.svg";

interface Options {
  output: string;
  against?: string;
  sheets?: string;
  json?: boolean;
}

interface Comparison {
  drifts: Drift[];
  /** What both sides are, for the last line. */
  checked: TakesRecord;
  title: string;
  compared: Compared;
}

export const verifyCommand = (answer: (code: number) => void) =>
  new Command("verify")
    .description(
      "say what a folder's clips and takes.json differ in from what the throw file bakes now; writes nothing but, on request, pictures",
    )
    .argument(
      "[throwfile]",
      "the throw file that was baked; with --against, only one that has a host is needed",
    )
    .requiredOption("-o, --output <dir>", "folder that was baked into")
    .option("--against <dir>", "compare with this folder instead: what changed from it to the folder of -o")
    .option(
      "--sheets <dir>",
      "draw the takes that drifted, before and after over each other, into this folder",
    )
    .option("--json", "print every difference as JSON")
    .addHelpText(
      "after",
      "\nExamples:\n  tossbake verify quay.throws.yaml -o out\n  tossbake verify -o out --against out-before\n  tossbake verify quay.throws.yaml -o out --sheets drift",
    )
    .action(async (path: string | undefined, options: Options) => {
      const { output, against = output, sheets } = options;
      if (sheets !== undefined) await refuseCompared(sheets, [output, against]);
      const { drifts, checked, title, compared } = await compare(path, options);
      const isDrift = drifts.length > 0;
      process.stdout.write(
        options.json
          ? formatRecord({ drift: isDrift, rows: drifts })
          : isDrift
            ? `${driftLines(drifts).join("\n")}\n\n${title}: ${counted(drifts.length, "difference")}\n`
            : `${title}: no drift in ${counted(checked.clips.length, "take")}\n`,
      );
      if (!isDrift) return;
      for (const folder of new Set([output, against]))
        if (await isBeingBaked(folder))
          process.stderr.write(
            `a bake into ${folder} is at work, or was stopped and may have left files of two bakes: wait for it, or bake again (with --resume to go on)\n`,
          );
      answer(ExitCode.checkFailed);
      if (sheets === undefined) return;
      const told = await writeDriftSheets(sheets, drifts, compared);
      (options.json ? process.stderr : process.stdout).write(told);
    });

function compare(path: string | undefined, { output, against }: Options): Promise<Comparison> {
  if (against !== undefined) return compareFolders(path, output, against);
  if (path !== undefined) return compareWithBake(path, output);
  throw new RequestError(
    ["verify"],
    "no throw file is named",
    "name the one that was baked, or --against a folder",
  );
}

async function compareWithBake(path: string, folder: string): Promise<Comparison> {
  const before = await readBakedFolder(folder);
  const opened = await openThrowFile(path);
  const shown = progress();
  const baked = await bake(opened.file, opened.models, { onTake: shown.update }).finally(shown.end);
  const now = await recordOf(opened.file, opened.text, baked);
  const contents = new Map(baked.files.map(({ name, content }) => [name, content]));
  const files = [
    ...(await compareFiles([now, before.record], async (name) => contents.get(name), contentsOf(folder))),
    ...(await checkFolder(folder, now, modelsIn(folder, path, opened))),
    ...(await checkSheets(folder, before.record, now, () => sheetsOf(sheetsInput(opened.file, baked)))),
  ];
  return {
    drifts: compareBakes(before, { record: now }, files, opened.file.host),
    checked: now,
    title: `${folder} beside ${path}`,
    compared: {
      before: { name: basename(resolve(folder)), record: before.record, shapes: shapesOfFolder(folder) },
      now: { name: basename(path), record: now, shapes: shapesOfProps(baked.props) },
      host: opened.file.host,
    },
  };
}

/** Sheets that lie beside the clips; without any, none is drawn. */
async function checkSheets(
  folder: string,
  before: TakesRecord,
  now: TakesRecord,
  draw: () => Promise<NamedSheet[]>,
): Promise<FolderFile[]> {
  const throwsIn = (record: TakesRecord) => [...new Set(record.clips.map((clip) => clip.throw))];
  const throws = throwsIn(now);
  const shows = new Map<string, readonly string[]>([
    ...throws.map((name) => [`${name}.svg`, [name]] as const),
    [TAKES_SHEET, throws] as const,
  ]);
  const gone = throwsIn(before).filter((name) => !throws.includes(name));
  const present = await sheetsIn(folder, [...shows.keys(), ...gone.map((name) => `${name}.svg`)]);
  const isAny = [...shows.keys()].some((name) => present.has(name));
  const fresh = isAny ? await draw() : [];
  return [
    ...(await compareSheets(
      folder,
      fresh.map((sheet) => ({ ...sheet, shows: shows.get(sheet.name) ?? [] })),
    )),
    ...gone.flatMap((name): FolderFile[] =>
      present.has(`${name}.svg`) ? [{ name: `${name}.svg`, state: "stray", shows: [name] }] : [],
    ),
  ];
}

/** The throw file's own models that lie in the folder. */
function modelsIn(folder: string, path: string, { file }: OpenedThrowFile): Set<string> {
  const paths = [...file.props.values()].flatMap(({ model }) =>
    model === undefined ? [] : [resolve(dirname(path), model)],
  );
  return new Set(paths.filter((model) => dirname(model) === resolve(folder)).map((model) => basename(model)));
}

async function compareFolders(path: string | undefined, folder: string, other: string): Promise<Comparison> {
  const [now, before] = [await readBakedFolder(folder), await readBakedFolder(other)];
  const host = path === undefined ? undefined : (await openThrowFile(path)).file.host;
  if (path === undefined) {
    checkAxes(folder, now.record);
    checkAxes(other, before.record);
  }
  const known = new Set(
    [now, before].flatMap(({ record }) => Object.values(record.props).map(({ source }) => basename(source))),
  );
  const own = async (name: string, record: TakesRecord) =>
    (await checkFolder(name, record, known)).map((file) => ({ ...file, name: join(name, file.name) }));
  const files = [
    ...(await compareFiles([now.record, before.record], contentsOf(other), contentsOf(folder))),
    ...(await own(folder, now.record)),
    ...(await own(other, before.record)),
  ];
  const [beforeName, nowName] = shortNames(other, folder);
  return {
    drifts: compareBakes(before, now, files, host),
    checked: now.record,
    title: `${folder} against ${other}`,
    compared: {
      before: { name: beforeName, record: before.record, shapes: shapesOfFolder(other) },
      now: { name: nowName, record: now.record, shapes: shapesOfFolder(folder) },
      host,
    },
  };
}

/** A record does not name its host; one whose things do not fall along -Y has one, and its numbers would be told wrongly. */
function checkAxes(folder: string, { clips }: TakesRecord) {
  const clip = fallsOtherwise(clips);
  if (!clip) return;
  throw new RequestError(
    [join(folder, "takes.json")],
    `${clip.name} does not fall along -Y: the numbers are those of a host`,
    "name the throw file too, which says in which axes and unit",
  );
}
