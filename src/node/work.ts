/** One piece of a batch's work, done alone by whichever thread it falls to. */

import { filesOf, isUnheld } from "../bake/bake.js";
import { clipName } from "../bake/files.js";
import type { NamedTrack } from "../bake/graft.js";
import { type ChosenChain, chosenNamed } from "../bake/plan.js";
import { type LoadedProp, loadProps } from "../bake/props.js";
import { plainTake } from "../record/plain-take.js";
import type { ThrowEntry } from "../throwfile/types.js";
import { MachineError } from "./machine-error.js";
import { unwritable } from "./output-folder.js";
import { type Part, readPart, writePart, writeWhole } from "./staging.js";
import { type OpenedThrowFile, openedText } from "./throw-file.js";

/** What a thread has to know of the batch: plain data. */
export interface BatchContext {
  throwFile: string;
  text: string;
  /** Hashes of the props' models, as the batch began. */
  models: Record<string, string>;
  output: string;
  /** Where files and parts go; none: nothing is written. */
  staging?: string;
}

/** Some takes of a throw or chain, which are the batch's `part`th; or a file of what some parts hold. */
export type Work =
  | { part: number; name: string; numbers: readonly number[] }
  | { file: { name: string; parts: readonly number[] }[] };

/** Answers the part where nothing is written, else when all is. */
export type Worker = (work: Work, isStopped?: () => boolean) => Promise<Part | undefined>;

/** Opens the throw file once, and weighs each prop once, when it is first thrown: unless they are at hand. */
export function workerOf(
  context: BatchContext,
  opened = openedText(context.throwFile, context.text),
  known: ReadonlyMap<string, LoadedProp> = new Map(),
): Worker {
  const { staging } = context;
  const props = new Map(Array.from(known, ([name, loaded]) => [name, Promise.resolve(loaded)]));
  const propOf = (name: string): Promise<LoadedProp> => {
    const loaded = props.get(name) ?? loadSame(opened, name, context);
    props.set(name, loaded);
    return loaded;
  };
  return async (work, isStopped = () => false) => {
    if ("file" in work) {
      await writeFile(opened, propOf, context, work.file);
      return undefined;
    }
    const entry = chosenNamed(opened.file, work.name);
    const loaded = await propOf(entry.prop);
    const part = await makePart(opened, entry, loaded, work.numbers, isStopped);
    if (staging === undefined || isStopped()) return part;
    try {
      if (opened.file.bake.files === "per-take")
        for (const take of part.takes) {
          await writeClips(opened, loaded, work.name, [take.clip as NamedTrack], staging);
          delete take.clip;
        }
      await writePart(staging, work.part, part);
    } catch (error) {
      throw isSystemError(error) ? unwritable(context.output, error) : error;
    }
    return undefined;
  };
}

async function makePart(
  { file }: OpenedThrowFile,
  entry: ThrowEntry | ChosenChain,
  loaded: LoadedProp,
  numbers: readonly number[],
  isStopped: () => boolean,
): Promise<Part> {
  const part: Part = { takes: [], left: [] };
  for (const number of numbers) {
    // lets a signal through
    await new Promise((done) => setImmediate(done));
    if (isStopped()) break;
    try {
      part.takes.push(plainTake(file, entry, loaded, number));
    } catch (reason) {
      if (!isUnheld(reason)) throw reason;
      part.left.push({ name: clipName(entry, number), reason: reason.message });
    }
  }
  return part;
}

async function writeFile(
  opened: OpenedThrowFile,
  propOf: (name: string) => Promise<LoadedProp>,
  { staging, output }: BatchContext,
  throws: { name: string; parts: readonly number[] }[],
): Promise<void> {
  const clips = [];
  for (const { name, parts } of throws) {
    const prop = await propOf(chosenNamed(opened.file, name).prop);
    for (const index of parts)
      for (const { clip } of (await readPart(staging as string, index)).takes)
        clips.push({ ...(clip as NamedTrack), throwName: name, prop });
  }
  const files = filesOf(opened.file, clips);
  try {
    for (const { name, content } of files) await writeWhole(staging as string, `files/${name}`, content);
  } catch (error) {
    throw unwritable(output, error);
  }
}

async function writeClips(
  { file }: OpenedThrowFile,
  prop: LoadedProp,
  throwName: string,
  clips: readonly NamedTrack[],
  staging: string,
): Promise<void> {
  const filed = clips.map((clip) => ({ ...clip, throwName, prop }));
  for (const { name, content } of filesOf(file, filed)) await writeWhole(staging, `files/${name}`, content);
}

/** A model that changes while a batch runs would be two models in one batch. */
async function loadSame(
  { file, models }: OpenedThrowFile,
  name: string,
  context: BatchContext,
): Promise<LoadedProp> {
  const loaded = (await loadProps(file, new Set([name]), models)).get(name) as LoadedProp;
  if (loaded.sha256 === context.models[name]) return loaded;
  throw new MachineError(`${loaded.source}: has changed while it was thrown; bake again`);
}

const isSystemError = (error: unknown): boolean =>
  error instanceof Error && typeof (error as NodeJS.ErrnoException).code === "string" && "syscall" in error;
