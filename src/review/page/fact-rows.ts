/** The numbers of a take as rows of words, and what differs between two. */

import { length } from "../../math/vec3.js";
import type { Measured } from "./measures.js";
import * as words from "./words.js";

export interface FactRow {
  label: string;
  /** "–" where there is none. */
  text: string;
  /** Why it is worth a look, in words. */
  about?: string;
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
    { label: "Time in the air", text: words.seconds(measured.time) },
    ...(duration - measured.time > 1e-6 ? [{ label: "Clip with holds", text: words.seconds(duration) }] : []),
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
    "between the axis that it turns round in space and that axis of its own which most of its turning is about";
  return [
    { label: "Turns", text: words.turns(measured.turns) },
    {
      label: "About long · middle · short",
      text: `${shares.join(" · ")}\u00a0%`,
      about: "how much of its turning is about each of its axes; over 100 % in all unless it spins clean",
    },
    ...known("Wobble at release", measured.wobbleAtRelease, words.degrees, angle),
    ...known("Wobble at arrival", measured.wobble, words.degrees, angle),
    { label: "Turning at release", text: words.rate(measured.releaseRate) },
    { label: "Turning at arrival", text: words.rate(measured.arrivalRate) },
  ];
}

function clipRows({ take: { record } }: Measured): FactRow[] {
  const { translation, rotation } = record.keys;
  return [
    { label: "Keys of place + rotation", text: `${translation} + ${rotation}` },
    { label: "Size", text: words.bytes(record.bytes) },
    {
      label: "Error, proved",
      text: words.metres(record.error),
      about: "no point of the prop is further from the true motion at any time",
    },
    { label: "Tolerance", text: words.metres(record.tolerance) },
    ...known("Candidate taken", record.candidate ?? null, String),
  ];
}

const known = (
  label: string,
  value: number | null,
  say: (value: number) => string,
  about?: string,
): FactRow[] => (value === null ? [] : [{ label, text: say(value), about }]);

export function drawnGroup({ take: { record } }: Measured): FactGroup[] {
  const rows = Object.entries(record.draws).map(([key, value]) => ({ label: key, text: drawnWords(value) }));
  return rows.length > 0 ? [{ title: "Drawn", rows }] : [];
}

function drawnWords(value: unknown): string {
  if (typeof value === "number") return words.digits(value, 4);
  if (Array.isArray(value)) return value.map(drawnWords).join(", ");
  return typeof value === "string" ? value : JSON.stringify(value);
}

export interface PairedRow {
  label: string;
  about?: string;
  texts: [string, string];
  differs: boolean;
}

/** Rows of both, in the order of the first; what only one has stands last. */
export function paired(a: readonly FactRow[], b: readonly FactRow[]): PairedRow[] {
  const labels = [...new Set([...a, ...b].map(({ label }) => label))];
  return labels.map((label) => {
    const rows = [a, b].map((list) => list.find((row) => row.label === label));
    const [first, second] = rows.map((row) => row?.text ?? NONE);
    return { label, about: (rows[0] ?? rows[1])?.about, texts: [first, second], differs: first !== second };
  });
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
