/** A throw's spin as people say it, spreads as they are written. */

import type { Drawable, ThrowEntry } from "../throwfile/types.js";
import { isSpread } from "../throwfile/types.js";

/** Each as it could stand in the throw file; degrees. */
export interface SpinWords {
  axis?: string;
  turns?: string;
  rate?: string;
  wobble?: string;
  phase?: string;
}

export function spinWords(spin: NonNullable<ThrowEntry["spin"]>): SpinWords {
  const written: SpinWords = {};
  for (const key of ["axis", "turns", "rate", "wobble", "phase"] as const)
    if (spin[key] !== undefined) written[key] = words(spin[key] as Drawable<unknown>);
  return written;
}

function words(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(words).join(", ")}]`;
  if (!isSpread(value)) return String(value);
  if ("range" in value) return value.range.map(short).join("..");
  if ("normal" in value) return value.normal.map(short).join(" ± ");
  return "pick" in value
    ? `any of ${value.pick.map(words).join(", ")}`
    : value.each.map(words).join(", then ");
}

const short = (value: number): string => String(Number(value.toPrecision(6)));
