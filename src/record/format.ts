/** takes.json as text: stable under version control, so that a line that differs is motion that differs. */

import { rounded } from "../math/rounded.js";

const WIDTH = 100;

/** JSON of rounded numbers, two spaces deep, in which what fits on one line of 100 characters stands on one. */
export const formatRecord = (record: unknown): string => `${layOut(rounded(record), "")}\n`;

function layOut(value: unknown, indent: string): string {
  const flat = oneLine(value);
  if (value === null || typeof value !== "object" || indent.length + flat.length <= WIDTH) return flat;
  const deeper = `${indent}  `;
  const isList = Array.isArray(value);
  const lines = isList
    ? value.map((item) => deeper + layOut(item, deeper))
    : Object.entries(value).map(([key, item]) => `${deeper}${JSON.stringify(key)}: ${layOut(item, deeper)}`);
  return `${isList ? "[" : "{"}\n${lines.join(",\n")}\n${indent}${isList ? "]" : "}"}`;
}

function oneLine(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(oneLine).join(", ")}]`;
  if (value === null || typeof value !== "object") return JSON.stringify(value);
  const members = Object.entries(value).map(([key, item]) => `${JSON.stringify(key)}: ${oneLine(item)}`);
  return members.length === 0 ? "{}" : `{ ${members.join(", ")} }`;
}
