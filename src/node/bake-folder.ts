/** A throw file baked into a folder, by threads and in steps of which a stopped run loses the last alone. */

import { join } from "node:path";
import { clipName, fileName } from "../bake/files.js";
import { type Planned, type PlanOptions, planOf } from "../bake/plan.js";
import { playerWarnings } from "../bake/player-warnings.js";
import { type LoadedProp, loadProps } from "../bake/props.js";
import { textSha256 } from "../math/hash.js";
import type { PropRecord } from "../record/clip-record.js";
import { recordHead } from "../record/record-of.js";
import { VERSION } from "../record/version.js";
import { sheetsOf } from "../review/sheets.js";
import { type BatchOptions, batch } from "./batch.js";
import { type BatchReport, batchRecord, type TextSink } from "./batch-record.js";
import { Interrupted } from "./interrupted.js";
import { keptLines } from "./kept-record.js";
import { MachineError } from "./machine-error.js";
import { unwritable } from "./output-folder.js";
import { ShardWriter, shardName } from "./shard-record.js";
import { spareOthers } from "./spare-others.js";
import { type BatchHeader, giveFiles, openStaging, partsIn, type Staging, writeWhole } from "./staging.js";
import { TextFile } from "./text-file.js";
import type { OpenedThrowFile } from "./throw-file.js";

export interface FolderOptions
  extends PlanOptions,
    Pick<BatchOptions, "jobs" | "signal" | "onTakes" | "onNote"> {
  /** Goes on from a run that was stopped. */
  resume?: boolean;
  /** Draws THROW.svg of each throw and chain, and takes.svg: not of a share, nor of some of a throw's takes. */
  sheets?: boolean;
  /** Gets the record of these takes. */
  shown?: TextSink;
}

export interface FolderReport extends BatchReport {
  props: Record<string, PropRecord>;
  /** What some players will do to the files. */
  warnings: string[];
}

/**
 * @param output folder to write to; none: nothing is written
 * @throws as `bake` does; MachineError for a folder that cannot be written, Interrupted; the folder is then as it was, but for what `resume` goes on from
 */
export async function bakeFolder(
  path: string,
  opened: OpenedThrowFile,
  output: string | undefined,
  options: FolderOptions,
): Promise<FolderReport> {
  const { file, text } = opened;
  const { only, takes, shard } = options;
  const plan = planOf(file, { only, takes, shard });
  const props = await loadProps(file, new Set(plan.map(({ entry }) => entry.prop)), opened.models);
  const models = Object.fromEntries(Array.from(props, ([name, { sha256 }]) => [name, sha256]));
  const context = { throwFile: path, text, models };
  const told = (report: BatchReport, head: { props: Record<string, PropRecord> }): FolderReport => ({
    ...report,
    props: head.props,
    warnings: playerWarnings(file, report.notes, props),
  });
  if (output === undefined) {
    const head = await recordHead(file, text, props);
    const parts = batch({ ...context, output: "" }, opened, props, plan, options);
    return told(await recorded(parts, { head, plan, opened, props, options }), head);
  }
  const last = shard ? shardName(shard) : "takes.json";
  const drawn = options.sheets && !shard && !takes;
  const sheetNames = drawn ? [...plan.map(({ entry }) => `${entry.name}.svg`), "takes.svg"] : [];
  await spareOthers(output, [...filesOf(opened, plan), ...sheetNames, last], opened.inputs);
  const header = await headerOf(opened, models, options);
  const staging = await openStaging(output, header, { shard, resume: options.resume ?? false });
  if (staging.isStale)
    options.onNote?.(
      `what a stopped bake had made in ${output} is thrown away: --resume would have gone on from it`,
    );
  try {
    const head = await recordHead(file, text, props);
    const parts = batch({ ...context, output, staging: staging.path }, opened, props, plan, {
      ...options,
      hasFiles: staging.wasReady,
    });
    const report = await recorded(parts, { head, plan, opened, props, options, output, staging });
    if (drawn) await writeSheets(opened, props, report, staging.path, only === undefined);
    await giveFiles(staging.path, output, last, options.signal).catch((error) => {
      throw isAbort(error) ? new Interrupted() : unwritable(output, error);
    });
    await staging.finish();
    return told(report, head);
  } catch (error) {
    throw await givenUp(error, output, staging);
  }
}

/** The sheet of all takes is of all throws. */
async function writeSheets(
  { file }: OpenedThrowFile,
  props: ReadonlyMap<string, LoadedProp>,
  { motions }: BatchReport,
  staging: string,
  ofAll: boolean,
): Promise<void> {
  const input = { title: file.name.replace(/^.*[\\/]/, ""), props, throws: motions };
  for (const { name, content } of await sheetsOf(input))
    if (ofAll || name !== "takes.svg") await writeWhole(staging, `files/${name}`, content);
}

/** Writes the record, or the shard's, beside the files. */
async function recorded(
  parts: ReturnType<typeof batch>,
  {
    head,
    plan,
    opened: { file },
    props,
    options,
    output,
    staging,
  }: {
    head: Awaited<ReturnType<typeof recordHead>>;
    plan: readonly Planned[];
    opened: OpenedThrowFile;
    props: ReadonlyMap<string, LoadedProp>;
    options: FolderOptions;
    output?: string;
    staging?: Staging;
  },
): Promise<BatchReport> {
  const { only, takes, shard, shown } = options;
  const isPart = only !== undefined || takes !== undefined;
  const kept = isPart && output !== undefined ? await keptLines(output, file, plan) : undefined;
  const common = {
    head,
    plan,
    order: [...file.throws.keys(), ...file.chains.keys()],
    reachOf: (name: string) => (props.get(name) as LoadedProp).prop.reach,
    shown,
  };
  if (!staging || output === undefined) return batchRecord(parts, common);
  const target = await TextFile.create(
    join(staging.path, "files", shard ? shardName(shard) : "takes.json"),
  ).catch((error) => {
    throw unwritable(output, error);
  });
  try {
    if (shard) {
      const writer = new ShardWriter(target, { shard, head, plan, reachOf: common.reachOf });
      await writer.start();
      const report = await batchRecord(writer.passing(parts), common);
      await writer.end();
      await target.close();
      return report;
    }
    const report = await batchRecord(parts, {
      ...common,
      kept,
      keepsNearest: takes !== undefined,
      file: target,
    });
    await target.close();
    return report;
  } catch (error) {
    await target.abandon();
    throw isSystemError(error) ? unwritable(output, error) : error;
  }
}

/** What a bake goes on from must be the same, or the takes of two would stand side by side. */
async function headerOf(
  { file, text }: OpenedThrowFile,
  models: Record<string, string>,
  { only, takes, shard }: FolderOptions,
): Promise<BatchHeader> {
  return {
    version: VERSION,
    "throw file": (await textSha256(text)).slice(0, 16),
    ...Object.fromEntries(
      Object.entries(models).map(([name, sha256]) => [
        file.props.get(name)?.model ?? `shape of ${name}`,
        sha256.slice(0, 16),
      ]),
    ),
    ...(only && { "--only": [...only].sort().join(" ") }),
    ...(takes && { "--takes": takes.join("-") }),
    ...(shard && { "--shard": `${shard.index}/${shard.of}` }),
  };
}

function filesOf({ file }: OpenedThrowFile, plan: readonly Planned[]): string[] {
  const names = new Set<string>();
  for (const { entry, numbers } of plan)
    for (const number of numbers) names.add(fileName(file, entry.name, clipName(entry, number)));
  if (file.bake.container === "glb") return [...names];
  return [...names].flatMap((name) => [name.replace(/\.gltf$/, ".bin"), name]);
}

/** Leaves what is worth going on from, and takes the rest away. */
async function givenUp(error: unknown, output: string, staging: Staging): Promise<unknown> {
  if (error instanceof Interrupted) {
    await staging.leave();
    return error;
  }
  const isFull = error instanceof MachineError && error.isFull;
  const done = isFull ? await partsIn(staging.path).catch(() => new Set()) : new Set();
  if (isFull && done.size > 0) {
    await staging.leave();
    return new MachineError(
      `${output}: cannot be written (the disk is full); make room and go on with --resume, or remove ${staging.path}`,
      true,
    );
  }
  await staging.discard().catch(() => undefined);
  return error;
}

const isAbort = (error: unknown): boolean => error instanceof DOMException && error.name === "AbortError";

const isSystemError = (error: unknown): boolean =>
  error instanceof Error && typeof (error as NodeJS.ErrnoException).code === "string" && "syscall" in error;
