/** What a bake tells people. */

import type { TakeWarning, ThrowNotes } from "../bake/notes.js";
import type { PropRecord } from "../record/clip-record.js";
import type { ClipFigures } from "../record/plain-take.js";
import { MISS_METRES, MISS_RADIANS, type Span, type ThrowSummary } from "../record/throw-summary.js";
import { counted } from "./counted.js";
import { span, table } from "./table.js";
import { takeList } from "./take-list.js";

export interface Told {
  throws: readonly ThrowSummary[];
  notes: readonly ThrowNotes[];
  /** What some players will do to the files. */
  warnings: readonly string[];
  props: Readonly<Record<string, PropRecord>>;
}

/** @param end what was done with the takes, behind their number */
export function bakeReport(told: Told, end: string): string {
  const { throws, props } = told;
  const rows = throws.map((made) => [
    made.name,
    made.prop,
    String(made.takes),
    spanned(made.duration, 2),
    spanned(made.turns, 2),
    spanned(made.keys, 0),
    spanned(made.bytes, 0),
    (made.error * 1000).toFixed(3),
    made.file,
  ]);
  const lines = [
    ...Object.entries(props).flatMap(([name, prop]) => prop.warnings.map((text) => `${name}: ${text}`)),
    ...noteLines(told),
    ...throws.flatMap(({ missed }) => missed.map(missLine)),
  ];
  const head = ["throw", "prop", "takes", "time s", "turns", "keys", "bytes/clip", "within mm", "file"];
  const takes = throws.reduce((sum, { takes }) => sum + takes, 0);
  return `${table(head, rows)}\n\n${lines.map((line) => `${line}\n`).join("")}${counted(takes, "take")} of ${whatIsIn(throws)}${end}\n`;
}

/** One line each: what players will do, and what some takes should be known for. */
export const noteLines = ({ warnings, notes }: Pick<Told, "warnings" | "notes">): string[] => [
  ...warnings,
  ...notes.flatMap((made) => made.warnings.map(warningText)),
];

const spanned = (values: Span, decimals: number): string => span(values, decimals);

function warningText({ throwName, takes, text, differs }: TakeWarning): string {
  const more = differs ? ` (take ${takes[0]}; other numbers for the others)` : "";
  return `${throwName}, ${takeList(takes)}: ${text}${more}`;
}

function missLine({ name, miss: { position, angle } }: ClipFigures): string {
  const ways = [
    (position ?? 0) > MISS_METRES ? [`its mark by ${((position ?? 0) * 1000).toPrecision(3)} mm`] : [],
    (angle ?? 0) > MISS_RADIANS ? [`its pose by ${(((angle ?? 0) * 180) / Math.PI).toPrecision(3)}°`] : [],
  ];
  return `${name} misses ${ways.flat().join(" and ")}`;
}

function whatIsIn(made: readonly ThrowSummary[]): string {
  const count = (chains: boolean) => made.filter(({ isChain }) => isChain === chains).length;
  const [throws, chains] = [count(false), count(true)];
  return [
    ...(throws > 0 || chains === 0 ? [counted(throws, "throw")] : []),
    ...(chains > 0 ? [counted(chains, "chain")] : []),
  ].join(" and ");
}
