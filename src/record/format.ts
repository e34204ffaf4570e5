/** takes.json as text: stable under version control, so that a line that differs is motion that differs. */

/** Digits that stand in the record; below `NOTHING` a number is rounding and is written 0. */
const DIGITS = 12;
const NOTHING = 1e-12;
const WIDTH = 100;

/** A number with 12 significant digits, differences from zero below 1e-12 as 0; other values as they are. */
export function rounded(value: unknown): unknown {
  if (typeof value === "number") return Math.abs(value) < NOTHING ? 0 : Number(value.toPrecision(DIGITS));
  if (Array.isArray(value)) return value.map(rounded);
  if (value !== null && typeof value === "object")
    return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, rounded(inner)]));
  return value;
}

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
