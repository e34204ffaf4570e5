/** A throw's or chain's takes in a line, gathered take by take. */

import type { ClipFigures } from "./plain-take.js";

/** Least and greatest. */
export type Span = [number, number];

export interface ThrowSummary {
  name: string;
  prop: string;
  isChain: boolean;
  takes: number;
  /** Of the first take. */
  file: string;
  /** s */
  duration: Span;
  turns: Span;
  keys: Span;
  bytes: Span;
  /** Greatest, m. */
  error: number;
  /** Those further from their mark or pose than they should be. */
  missed: ClipFigures[];
}

/** A take that is further from its mark than this, in m or rad, has missed it. */
export const MISS_METRES = 1e-4;
export const MISS_RADIANS = (0.01 * Math.PI) / 180;

const nothing = (): Span => [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];

export const emptySummary = (name: string, prop: string, isChain: boolean): ThrowSummary => ({
  name,
  prop,
  isChain,
  takes: 0,
  file: "",
  duration: nothing(),
  turns: nothing(),
  keys: nothing(),
  bytes: nothing(),
  error: 0,
  missed: [],
});

export function addFigures(summary: ThrowSummary, clip: ClipFigures): void {
  if (summary.takes++ === 0) summary.file = clip.file;
  stretch(summary.duration, clip.duration);
  stretch(summary.turns, clip.turns);
  stretch(summary.keys, clip.keys.translation + clip.keys.rotation);
  stretch(summary.bytes, clip.bytes);
  summary.error = Math.max(summary.error, clip.error);
  if ((clip.miss.position ?? 0) > MISS_METRES || (clip.miss.angle ?? 0) > MISS_RADIANS)
    summary.missed.push(clip);
}

function stretch(span: Span, value: number): void {
  span[0] = Math.min(span[0], value);
  span[1] = Math.max(span[1], value);
}
