/** What should be known of some takes of a throw or chain, gathered take by take. */

import type { ThrowEntry } from "../throwfile/types.js";
import { type Nearest, SAME_MOTION } from "./nearest.js";
import { type ChosenChain, isChain } from "./plan.js";

/** Hz at which some importers sample every clip again; between two samples they take the short way round. */
export const RESAMPLED_AT = 30;

/** Of a take, plain data. */
export interface TakeNote {
  /** Of the clip. */
  name: string;
  take: number;
  /** rad/s, never exceeded. */
  greatestRate: number;
  /** Of the aim. */
  warnings: readonly string[];
}

export interface TakeWarning {
  throwName: string;
  /** Ascending. */
  takes: number[];
  /** That of the first of them; the others' may differ in its numbers. */
  text: string;
  differs: boolean;
}

export interface ThrowNotes {
  name: string;
  prop: string;
  isChain: boolean;
  /** How many there are. */
  takes: number;
  /** Those that turn further than half round between two such samples: how many, the greatest rate, the first one's name. */
  fast: { count: number; most: number; name: string };
  /** What the aim warns of, and takes that are no other than an earlier one; those that differ in nothing but their numbers once. */
  warnings: TakeWarning[];
}

export const emptyNotes = (entry: ThrowEntry | ChosenChain): ThrowNotes => ({
  name: entry.name,
  prop: entry.prop,
  isChain: isChain(entry),
  takes: 0,
  fast: { count: 0, most: 0, name: "" },
  warnings: [],
});

/** Adds a take's to the notes of its throw or chain; of a chain's parts the throws' own notes tell. */
export function addNote(notes: ThrowNotes, note: TakeNote, nearest: Nearest | null): void {
  notes.takes++;
  if (notes.isChain) return;
  const { fast } = notes;
  if (note.greatestRate > Math.PI * RESAMPLED_AT) {
    if (fast.count++ === 0) fast.name = note.name;
    fast.most = Math.max(fast.most, note.greatestRate);
  }
  for (const text of textsOf(note, nearest)) {
    const known = notes.warnings.find((warning) => kindOf(warning.text) === kindOf(text));
    if (!known) notes.warnings.push({ throwName: notes.name, takes: [note.take], text, differs: false });
    else {
      known.takes.push(note.take);
      known.differs ||= text !== known.text;
    }
  }
}

/** The text without its numbers. */
const kindOf = (text: string): string => text.replace(/\d+(\.\d+)?(e[-+]\d+)?/g, "#");

const textsOf = ({ warnings }: TakeNote, nearest: Nearest | null): string[] => [
  ...warnings,
  ...(nearest && nearest.distance < SAME_MOTION
    ? [
        `moves exactly as take ${nearest.take}: leave something open (a..b, scatter, wobble) to tell them apart`,
      ]
    : []),
];
