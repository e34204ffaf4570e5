/** What is wrong with a throw file, and the one error class that says so. */

import type { RequestError } from "../math/request-error.js";
import type { KeyPath, Position, ThrowFile } from "./types.js";

export interface Fault extends Position {
  readonly path: KeyPath;
  /** What is wrong, with the value found. */
  readonly fault: string;
  /** What would be right. */
  readonly remedy: string;
}

const MOST_FAULTS = 10;

/**
 * A throw file that is wrong. `message` is ready to print: a line for each fault,
 * `FILE:LINE:COLUMN KEY.PATH: what is wrong; what would be right`.
 */
export class ThrowFileError extends Error {
  override name = "ThrowFileError";
  /** In the order of the file, at most ten. */
  readonly faults: readonly Fault[];

  constructor(
    readonly file: string,
    faults: readonly Fault[],
    /** How many faults there are beyond those told. */
    readonly more = Math.max(0, faults.length - MOST_FAULTS),
  ) {
    const told = faults.slice(0, MOST_FAULTS);
    const lines = told.map((f) => {
      const key = f.path.length > 0 ? ` ${pathText(f.path)}` : "";
      return `${file}:${f.line}:${f.column}${key}: ${f.fault}; ${f.remedy}`;
    });
    if (more > 0) lines.push(`and ${more} more`);
    super(lines.join("\n"));
    this.faults = told;
  }
}

/** A request of the core's, its path complete from the top of the file, told with line and column. */
export function throwFileError(file: ThrowFile, error: RequestError): ThrowFileError {
  const { path, fault, remedy } = error;
  return new ThrowFileError(file.name, [{ ...file.locate(path), path, fault, remedy }]);
}

/** Keys with dots between; one that could be misread, or is long, in quotes. */
export const pathText = (path: KeyPath): string =>
  path.map((key) => (/^[\w<>-]{1,64}$/.test(String(key)) ? String(key) : quote(String(key)))).join(".");

/** A value as a message shows it: short, on one line, nothing that a terminal would obey. */
export function shown(value: unknown): string {
  if (value === undefined || value === null) return "nothing";
  if (typeof value === "string") return quote(value);
  if (Array.isArray(value)) {
    const plain = value.every((v) => typeof v === "number" || typeof v === "string");
    const text = plain ? `[${value.slice(0, 8).map(bare).join(", ")}]` : "";
    return text !== "" && value.length <= 8 && text.length <= 60 ? text : `a list of ${value.length}`;
  }
  if (typeof value === "object") return "a map";
  return String(value);
}

const bare = (value: unknown): string =>
  typeof value === "string" && /^[\w.+±-]+$/.test(value) ? value : shown(value);

function quote(text: string): string {
  const short = text.length > 60 ? `${text.slice(0, 57)}…` : text;
  // JSON leaves delete, C1 controls and direction marks as they are.
  return JSON.stringify(short).replace(
    /[\u007f-\u009f\u200e\u200f\u2028-\u202e\u2066-\u2069]/g,
    (c) => `\\u${c.charCodeAt(0).toString(16).padStart(4, "0")}`,
  );
}
