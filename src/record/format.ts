/** takes.json as text: stable under version control, so that a line that differs is motion that differs. */

import { rounded } from "../math/rounded.js";

const WIDTH = 100;

/** JSON of rounded numbers, two spaces deep, in which what fits on one line of 100 characters stands on one. */
export const formatRecord = (record: unknown): string => `${layOut(rounded(record), "", "")}\n`;

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
