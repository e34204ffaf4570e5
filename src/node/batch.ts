/** A batch: all takes of a plan, by as many threads as there are, handed on in the plan's order whichever is done first. */

import type { Planned } from "../bake/plan.js";
import type { LoadedProp } from "../bake/props.js";
import type { ThrowFile } from "../throwfile/types.js";
import { Interrupted } from "./interrupted.js";
import { type Part, partsIn, readPart } from "./staging.js";
import { type Workers, workersOf } from "./thread-pool.js";
import type { OpenedThrowFile } from "./throw-file.js";
import { type BatchContext, type Work, workerOf } from "./work.js";

/** Takes of one piece of work; `vary: even` looks back over the takes before, which a thread does again for each piece. */
const PIECE = { chance: 64, even: 128 } as const;

export interface BatchOptions {
  jobs?: number;
  signal: AbortSignal;
  /** Told as takes are done. */
  onTakes?: (done: number, total: number) => void;
  /** Told what should be known before the takes are made. */
  onNote?: (text: string) => void;
  /** Files of several takes are there already. */
  hasFiles?: boolean;
}

/** The part of a throw's or chain's takes that come next. */
export interface MadePart extends Part {
  planned: Planned;
}

interface Piece {
  planned: Planned;
  work: Extract<Work, { part: number }>;
}

/**
 * Bakes what no earlier run has, and answers part after part; the last answer comes when the files of several takes are written too.
 *
 * @throws what the first of the takes throws that cannot be, in the plan's order; Interrupted when `signal` asks to stop
 */
export async function* batch(
  context: BatchContext,
  opened: OpenedThrowFile,
  props: ReadonlyMap<string, LoadedProp>,
  plan: readonly Planned[],
  { jobs, signal, onTakes, onNote, hasFiles = false }: BatchOptions,
): AsyncGenerator<MadePart> {
  const { file } = opened;
  const pieces = piecesOf(file, plan);
  const total = plan.reduce((sum, { numbers }) => sum + numbers.length, 0);
  const there = context.staging === undefined ? new Set<number>() : await partsIn(context.staging);
  const open = pieces.filter(({ work }) => !there.has(work.part));
  const takes = open.reduce((sum, { work }) => sum + work.numbers.length, 0);
  const workers = workersOf(
    context,
    { jobs, takes, pieces: open.length },
    () => workerOf(context, opened, props),
    () => signal.aborted,
    onNote,
  );
  let done = total - takes;
  onTakes?.(done, total);
  const made = new Map<number, Promise<Part | undefined>>();
  for (const { work } of open) {
    const part = workers.run(work).then((answer) => {
      done += work.numbers.length;
      if (!signal.aborted) onTakes?.(done, total);
      return answer;
    });
    // looked at in its turn
    part.catch(() => undefined);
    made.set(work.part, part);
  }
  try {
    const files: Promise<unknown>[] = [];
    for (const [i, { planned, work }] of pieces.entries()) {
      const answer = await unlessStopped(signal, made.get(work.part));
      made.delete(work.part);
      const part = answer ?? (await readPart(context.staging as string, work.part));
      yield { ...part, planned };
      if (!hasFiles) for (const piece of filesAfter(i)) files.push(started(workers, piece));
    }
    await unlessStopped(signal, Promise.all(files));
  } finally {
    await workers.end();
  }

  function filesAfter(i: number): Work[] {
    const { files } = file.bake;
    const isLast = pieces[i + 1]?.planned !== pieces[i].planned;
    if (context.staging === undefined || files === "per-take" || !isLast) return [];
    if (files === "per-throw") return [fileWork(pieces, [pieces[i].planned])];
    return i === pieces.length - 1 ? [fileWork(pieces, plan)] : [];
  }
}

/** A file that fails is found out when its turn comes. */
function started(workers: Workers, piece: Work): Promise<unknown> {
  const file = workers.run(piece);
  file.catch(() => undefined);
  return file;
}

/** @throws Interrupted */
function unlessStopped<T>(signal: AbortSignal, promise: Promise<T> | undefined): Promise<T | undefined> {
  return new Promise((resolve, reject) => {
    const stop = () => reject(new Interrupted());
    if (signal.aborted) stop();
    signal.addEventListener("abort", stop);
    Promise.resolve(promise)
      .then(resolve, reject)
      .finally(() => signal.removeEventListener("abort", stop));
  });
}

function piecesOf(file: ThrowFile, plan: readonly Planned[]): Piece[] {
  const pieces: Piece[] = [];
  for (const planned of plan) {
    const { entry, numbers } = planned;
    const size = PIECE[file.throws.get(entry.name)?.vary ?? "even"];
    for (let from = 0; from < numbers.length; from += size)
      pieces.push({
        planned,
        work: { part: pieces.length, name: entry.name, numbers: numbers.slice(from, from + size) },
      });
  }
  return pieces;
}

const fileWork = (pieces: readonly Piece[], of: readonly Planned[]): Work => ({
  file: of.map((planned) => ({
    name: planned.entry.name,
    parts: pieces.filter((piece) => piece.planned === planned).map(({ work }) => work.part),
  })),
});
