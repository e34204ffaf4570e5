/** What happens in a clip and when, and where its words stand along the time line. */

import type { TakeMotion } from "../../bake/take-motion.js";

export type CueKind = "release" | "apex" | "turn" | "arrival";

export interface Cue {
  kind: CueKind;
  /** s within the clip */
  time: number;
  /** In full, for the list and screen readers. */
  text: string;
  /** On the line. */
  short: string;
}

/** The prop stands still from one time to the other. */
export interface Hold {
  from: number;
  to: number;
}

/** Shorter stops are rounding. */
const LEAST_HOLD = 1e-6;

export function cuesOf({ parts }: TakeMotion): Cue[] {
  const cues = parts.flatMap((part, i): Cue[] => {
    const of = parts.length > 1 ? ` of ${part.throw}` : "";
    const end = part.start + part.launch.duration;
    const turns = part.turns.map(
      (time, k): Cue => ({
        kind: "turn",
        time,
        text: `turn ${k + 1} complete${of}`,
        short: k === 0 ? "turn 1" : `${k + 1}`,
      }),
    );
    const number = parts.length > 1 ? ` ${i + 1}` : "";
    return [
      { kind: "release", time: part.start, text: `release${of}`, short: `release${number}` },
      ...(isBetween(part.apex, part.start, end)
        ? [{ kind: "apex" as const, time: part.apex, text: `apex${of}`, short: "apex" }]
        : []),
      ...turns,
      { kind: "arrival", time: end, text: `arrival${of}`, short: `arrival${number}` },
    ];
  });
  return cues.sort((a, b) => a.time - b.time);
}

/** A throw downwards has its highest place at release: that is no cue of its own. */
const isBetween = (time: number | null, start: number, end: number): time is number =>
  time !== null && time > start && time < end;

export function holdsOf({ parts, duration }: TakeMotion): Hold[] {
  const ends = parts.map((part) => part.start + part.launch.duration);
  return [
    { from: 0, to: parts[0].start },
    ...parts.slice(1).map((part, i) => ({ from: ends[i], to: part.start })),
    { from: ends[ends.length - 1], to: duration },
  ].filter(({ from, to }) => to - from > LEAST_HOLD);
}

/** The cue that a step goes to; undefined at the last one. */
export function nextCue(cues: readonly Cue[], time: number, direction: 1 | -1): Cue | undefined {
  const beyond = cues.filter((cue) => direction * (cue.time - time) > 1e-4);
  return direction > 0 ? beyond[0] : beyond[beyond.length - 1];
}

/** A cue's word on the line: its row, and its left edge from the line's start. */
export interface Placed {
  cue: Cue;
  row: number;
  left: number;
}

const PRIORITY: readonly CueKind[] = ["arrival", "release", "apex", "turn"];

/**
 * Places words so that none covers another and none sticks out: in the uppermost of `rows` where there is room, the important ones first; what finds
 * none has its tick alone.
 *
 * @param width of the line, and `widthOf` of a word, in the same unit
 */
export function placeCues(
  cues: readonly Cue[],
  duration: number,
  width: number,
  widthOf: (text: string) => number,
  rows = 2,
): Placed[] {
  const taken: { row: number; from: number; to: number }[] = [];
  const placed: Placed[] = [];
  for (const kind of PRIORITY)
    for (const cue of cues.filter((other) => other.kind === kind)) {
      const wide = widthOf(cue.short);
      const middle = duration > 0 ? (cue.time / duration) * width : 0;
      const left = Math.max(0, Math.min(width - wide, middle - wide / 2));
      const row = Array.from({ length: rows }, (_, i) => i).find((i) =>
        taken.every((other) => other.row !== i || left >= other.to || left + wide <= other.from),
      );
      if (row === undefined) continue;
      taken.push({ row, from: left, to: left + wide });
      placed.push({ cue, row, left });
    }
  return placed.sort((a, b) => a.cue.time - b.cue.time);
}
