/** takes.json as text: stable under version control, so that a line that differs is motion that differs. */

import { rounded } from "../math/rounded.js";
import type { ClipRecord, TakesRecord } from "./clip-record.js";

const WIDTH = 100;

/** JSON of rounded numbers, two spaces deep, in which what fits on one line of 100 characters stands on one. */
export const formatRecord = (record: unknown): string => `${layOut(rounded(record), "", "")}\n`;

/** The record as it is formatted whole, in pieces: what stands before its clips, each clip with what parts it from the one before, and what stands behind them. */
export const recordPieces = (head: Omit<TakesRecord, "clips">) => ({
  start: formatRecord(head).replace(/\n\}\n$/, ',\n  "clips": ['),
  clip: (text: string, isFirst: boolean): string => `${isFirst ? "" : ","}\n${text}`,
  end: (isEmpty: boolean): string => (isEmpty ? "]\n}\n" : "\n  ]\n}\n"),
});

/** A clip as it stands in the record, up to its `nearest`. */
export const clipText = (clip: Omit<ClipRecord, "nearest">): string =>
  layOut(rounded(clip), "    ", "").replace(/\n {4}\}$/, ",");

/** What `clipText` answered, completed. */
export const withNearest = (text: string, nearest: ClipRecord["nearest"]): string =>
  `${text}\n${layOut(rounded(nearest), "      ", '"nearest": ')}\n    }`;

/** @param key what stands on the value's first line before it, behind the indent */
function layOut(value: unknown, indent: string, key: string): string {
  const flat = indent + key + oneLine(value);
  // a comma may follow
  if (value === null || typeof value !== "object" || flat.length < WIDTH) return flat;
  const deeper = `${indent}  `;
  const isList = Array.isArray(value);
  const lines = isList
    ? value.map((item) => layOut(item, deeper, ""))
    : Object.entries(value).map(([name, item]) => layOut(item, deeper, `${JSON.stringify(name)}: `));
  return `${indent}${key}${isList ? "[" : "{"}\n${lines.join(",\n")}\n${indent}${isList ? "]" : "}"}`;
}

function oneLine(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(oneLine).join(", ")}]`;
  if (value === null || typeof value !== "object") return JSON.stringify(value);
  const members = Object.entries(value).map(([key, item]) => `${JSON.stringify(key)}: ${oneLine(item)}`);
  return members.length === 0 ? "{}" : `{ ${members.join(", ")} }`;
}
