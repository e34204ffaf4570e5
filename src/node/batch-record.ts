/** The record of a batch, written as its takes come in, and what is told of them. */

import type { Nearest } from "../bake/nearest.js";
import { nearestFinder } from "../bake/nearest.js";
import { addNote, emptyNotes, type ThrowNotes } from "../bake/notes.js";
import { isChain, type Planned } from "../bake/plan.js";
import type { TakeMotion } from "../bake/take-motion.js";
import type { TakesRecord } from "../record/clip-record.js";
import { clipText, recordPieces, withNearest } from "../record/format.js";
import type { PlainTake } from "../record/plain-take.js";
import { addFigures, emptySummary, type ThrowSummary } from "../record/throw-summary.js";
import type { Kept } from "./kept-record.js";

/** Where text goes, piece by piece. */
export interface TextSink {
  write(text: string): Promise<void>;
}

export type Told = Pick<PlainTake, "figures" | "note" | "text"> & {
  motion?: TakeMotion;
  compared: { course: PlainTake["compared"]["course"]; samples?: Float64Array };
};

/** Takes of a throw that are kept to be drawn: more arcs over each other are a blot. */
const DRAWN = 200;

export interface BatchReport {
  throws: ThrowSummary[];
  /** Of each throw's and chain's first takes. */
  motions: { name: string; prop: string; takes: { motion: TakeMotion }[]; takeCount: number }[];
  notes: ThrowNotes[];
  left: { name: string; reason: string }[];
}

type Head = Omit<TakesRecord, "clips">;

/** A record in the order of its takes, written to a sink. */
class RecordWriter {
  #isEmpty = true;
  readonly #pieces;

  constructor(
    head: Head,
    private readonly sink: TextSink,
  ) {
    this.#pieces = recordPieces(head);
  }

  start = (): Promise<void> => this.sink.write(this.#pieces.start);

  async clip(text: string, nearest: Nearest | null): Promise<void> {
    await this.sink.write(this.#pieces.clip(withNearest(text, nearest), this.#isEmpty));
    this.#isEmpty = false;
  }

  end = (): Promise<void> => this.sink.write(this.#pieces.end(this.#isEmpty));
}

/**
 * @param head of the record of these takes alone
 * @param reachOf a prop
 * @param order names of all throws and chains, those kept too
 */
export async function batchRecord(
  parts: AsyncIterable<{ planned: Planned; takes: Told[]; left: { name: string; reason: string }[] }>,
  {
    head,
    plan,
    order,
    reachOf,
    kept,
    keepsNearest = false,
    file,
    shown,
  }: {
    head: Head;
    plan: readonly Planned[];
    order: readonly string[];
    reachOf: (prop: string) => number;
    kept?: Kept;
    /** Where the takes are but some of their throws'. */
    keepsNearest?: boolean;
    /** For the record with the lines kept. */
    file?: TextSink;
    /** For the record of these takes alone. */
    shown?: TextSink;
  },
): Promise<BatchReport> {
  const written = file && new RecordWriter({ ...head, props: kept?.props(head.props) ?? head.props }, file);
  const fresh = shown && new RecordWriter(head, shown);
  const told = new Map(plan.map(({ entry }) => [entry.name, teller(entry, reachOf(entry.prop))]));
  const left: BatchReport["left"] = [];
  const waiting = [...order];
  const keep = async (name: string, take?: number) => {
    for (const { nearest, ...line } of kept?.before(name, take) ?? [])
      await written?.clip(clipText(line), nearest);
  };
  await written?.start();
  await fresh?.start();
  for await (const { planned, takes, left: leftOut } of parts) {
    const { name } = planned.entry;
    while (waiting[0] !== name) await keep(waiting.shift() as string);
    const { tell } = told.get(name) as ReturnType<typeof teller>;
    for (const take of takes) {
      const nearest = tell(take);
      await keep(name, take.figures.take);
      const former = keepsNearest ? kept?.nearestOf(take.figures.name, take.text) : undefined;
      await written?.clip(take.text, former === undefined ? nearest : former);
      await fresh?.clip(take.text, nearest);
    }
    left.push(...leftOut);
  }
  for (const name of waiting) await keep(name);
  await written?.end();
  await fresh?.end();
  return {
    throws: Array.from(told.values(), ({ summary }) => summary).filter(({ takes }) => takes > 0),
    motions: Array.from(told.values(), ({ summary: { name, prop, takes }, motions }) => ({
      name,
      prop,
      takes: motions.map((motion) => ({ motion })),
      takeCount: takes,
    })).filter(({ takes }) => takes.length > 0),
    notes: Array.from(told.values(), ({ notes }) => notes),
    left,
  };
}

/** Gathers what is told of a throw's or chain's takes, and finds the nearest of each. */
function teller(entry: Planned["entry"], reach: number) {
  const nearestTo = nearestFinder(reach);
  const notes = emptyNotes(entry);
  const motions: TakeMotion[] = [];
  const summary = emptySummary(entry.name, entry.prop, isChain(entry));
  return {
    notes,
    summary,
    motions,
    tell({ figures, note, motion, compared: { course, samples } }: Told): Nearest | null {
      if (motion && motions.length < DRAWN) motions.push(motion);
      const nearest = nearestTo(figures.take, course, samples);
      addNote(notes, note, nearest);
      addFigures(summary, figures);
      return nearest;
    },
  };
}
