/** The numbers of a take as rows of words, and what differs between two. */

import { length } from "../../math/vec3.js";
import type { Measured } from "./measures.js";
import * as words from "./words.js";

export interface FactRow {
  label: string;
  /** "–" where there is none. */
  text: string;
  about?: string;
  /** That the text says, where it is one number. */
  value?: number;
}

export interface FactGroup {
  title: string;
  rows: FactRow[];
}

const NONE = "–";

export function factGroups(measured: Measured): FactGroup[] {
  return [
    { title: "Motion", rows: motionRows(measured) },
    { title: "Turning", rows: turningRows(measured) },
    { title: "Clip", rows: clipRows(measured) },
  ];
}

function motionRows(measured: Measured): FactRow[] {
  const { duration } = measured.take.record;
  return [
    ...known("Time in the air", measured.time, words.seconds),
    ...known("Clip with holds", duration - measured.time > 1e-6 ? duration : null, words.seconds),
    ...known("Rise to apex", measured.rise, words.metres),
    ...known("Speed at release", measured.releaseSpeed, words.speed),
    ...known("Speed at arrival", measured.arrivalSpeed, words.speed),
    ...known("Misses mark by", measured.miss, words.metres),
    ...known("Misses pose by", measured.missAngle, words.angle),
  ];
}

function turningRows(measured: Measured): FactRow[] {
  const shares = measured.take.record.share.map((share) => words.decimals(share * 100, 0));
  const angle =
    "between the axis that it turns round in space and that axis of its own which it was thrown about";
  return [
    ...known("Turns", measured.turns, words.turns),
    {
      label: "About long · middle · short",
      text: `${shares.join(" · ")}\u00a0%`,
      about: "how much of its turning is about each of its axes; over 100 % in all unless it spins clean",
    },
    ...known("Wobble at release", measured.wobbleAtRelease, words.degrees, angle),
    ...known("Wobble at arrival", measured.wobble, words.degrees, angle),
    ...known("Turning at release", measured.releaseRate, words.rate),
    ...known("Turning at arrival", measured.arrivalRate, words.rate),
  ];
}

function clipRows({ take: { record } }: Measured): FactRow[] {
  const { translation, rotation } = record.keys;
  return [
    { label: "Keys of place + rotation", text: `${translation} + ${rotation}` },
    ...known("Size", record.bytes, words.bytes),
    ...known(
      "Error, proved",
      record.error,
      words.metres,
      "no point of the prop is further from the true motion at any time",
    ),
    ...known("Tolerance", record.tolerance, words.metres),
    ...known("Candidate taken", record.candidate ?? null, String),
  ];
}

const known = (
  label: string,
  value: number | null,
  say: (value: number) => string,
  about?: string,
): FactRow[] => (value === null ? [] : [{ label, text: say(value), about, value }]);

export function drawnGroup({ take: { record } }: Measured): FactGroup[] {
  const rows = Object.entries(record.draws).map(([key, value]) => ({
    label: key,
    text: drawnWords(value),
    ...(typeof value === "number" && { value }),
  }));
  return rows.length > 0 ? [{ title: "Drawn", rows }] : [];
}

function drawnWords(value: unknown): string {
  if (typeof value === "number") return words.digits(value, 4);
  if (Array.isArray(value))
    return value.map((each) => (typeof each === "number" ? words.digits(each) : drawnWords(each))).join(", ");
  return typeof value === "string" ? value : JSON.stringify(value);
}

export interface PairedRow {
  label: string;
  about?: string;
  texts: [string, string];
  likeness: Likeness;
}

/** `near`: by less than anybody would see. */
export type Likeness = "same" | "near" | "differs";

/** Of the greater one. */
const NEAR = 0.02;

/** Rows of both, in the order of the first; what only one has stands last. */
export function paired(a: readonly FactRow[], b: readonly FactRow[]): PairedRow[] {
  const labels = [...new Set([...a, ...b].map(({ label }) => label))];
  return labels.map((label) => {
    const [first, second] = [a, b].map((list) => list.find((row) => row.label === label));
    return {
      label,
      about: (first ?? second)?.about,
      texts: [first?.text ?? NONE, second?.text ?? NONE],
      likeness: likenessOf(first, second),
    };
  });
}

function likenessOf(a: FactRow | undefined, b: FactRow | undefined): Likeness {
  if (a?.text === b?.text) return "same";
  if (a?.value === undefined || b?.value === undefined) return "differs";
  return Math.abs(a.value - b.value) <= NEAR * Math.max(Math.abs(a.value), Math.abs(b.value))
    ? "near"
    : "differs";
}

/** How far apart two takes leave and arrive: m between their balance points, from the records' own places. */
export function apart(a: Measured, b: Measured): { release: number; arrival: number } {
  const place = (each: Measured, end: "first" | "last") => {
    const parts = each.take.motion.parts;
    const { launch } = parts[end === "first" ? 0 : parts.length - 1];
    const t = end === "first" ? 0 : launch.duration;
    return [0, 1, 2].map(
      (i) => launch.centerOfMass[i] + launch.velocity[i] * t + (launch.gravity[i] * t * t) / 2,
    );
  };
  const between = (end: "first" | "last") => {
    const [p, q] = [place(a, end), place(b, end)];
    return length([p[0] - q[0], p[1] - q[1], p[2] - q[2]]);
  };
  return { release: between("first"), arrival: between("last") };
}
