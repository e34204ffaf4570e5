/** Differences as words: "14 mm further", "20 ms later". What is too small to be worth a word is passed over. */

import { cross, dot, length, normalize, type Vec3 } from "../math/vec3.js";

/** Least differences that are told: m, s, m/s, turns, degrees, turns a second. */
const WORTH = { metres: 1e-4, seconds: 1e-4, speed: 0.01, turns: 1e-3, degrees: 0.1, rate: 0.01 };

/** A part of a displacement smaller than this share of the whole is passed over. */
const SHARE = 0.05;

const UP: Vec3 = [0, 1, 0];

/** Two digits, or as many as stand before the point. */
export const amount = (value: number): string =>
  Math.abs(value) >= 100 ? String(Math.round(value)) : String(Number(value.toPrecision(2)));

export const metres = (value: number): string =>
  Math.abs(value) < 1 ? `${amount(value * 1000)} mm` : `${Number(value.toPrecision(3))} m`;

/** Answers nothing, or "AMOUNT WORD" with the word for more or for less. */
const told = (
  difference: number,
  worth: number,
  text: (size: number) => string,
  more: string,
  less: string,
) =>
  Math.abs(difference) < worth
    ? []
    : [`${text(Math.abs(difference))} ${difference > 0 ? more : less}`.trim()];

export const longer = (difference: number, more: string, less: string): string[] =>
  told(difference, WORTH.metres, metres, more, less);

export const later = (difference: number): string[] =>
  told(
    difference,
    WORTH.seconds,
    (s) => (s < 1 ? `${amount(s * 1000)} ms` : `${amount(s)} s`),
    "later",
    "earlier",
  );

export const faster = (difference: number): string[] =>
  told(difference, WORTH.speed, (v) => `${amount(v)} m/s`, "faster", "slower");

export const moreTurns = (difference: number): string[] =>
  told(difference, WORTH.turns, amount, "more", "less");

/** @param difference rad/s */
export const spinsFaster = (difference: number): string[] =>
  told(difference / (2 * Math.PI), WORTH.rate, (r) => `${amount(r)} turns/s`, "faster", "slower");

/** @param angle rad */
export const degrees = (angle: number, more: string, less = more): string[] =>
  told((angle * 180) / Math.PI, WORTH.degrees, (d) => `${amount(d)}°`, more, less);

/**
 * Along the throw, across it and up.
 *
 * @param displacement m, +Y up
 * @param ahead level unit vector along the throw; absent for one straight up or down
 */
export function displaced(displacement: Vec3, ahead: Vec3 | undefined): string[] {
  const least = SHARE * length(displacement);
  const level: Vec3 = [displacement[0], 0, displacement[2]];
  const parts: [number, string, string][] = ahead
    ? [
        [dot(displacement, ahead), "further", "shorter"],
        [dot(displacement, cross(UP, ahead)), "to the left", "to the right"],
      ]
    : [[length(level), "to the side", "to the side"]];
  parts.push([displacement[1], "higher", "lower"]);
  return parts
    .filter(([part]) => Math.abs(part) >= least)
    .flatMap(([part, more, less]) => longer(part, more, less));
}

/** The level unit vector along the first of the vectors that is not upright. */
export function levelDirection(...along: readonly Vec3[]): Vec3 | undefined {
  const found = along.find((v) => length([v[0], 0, v[2]]) > 1e-9 * length(v));
  return found && normalize([found[0], 0, found[2]]);
}

/** "a, b and c" */
export const joined = (parts: readonly string[]): string =>
  parts.length < 2 ? parts.join("") : `${parts.slice(0, -1).join(", ")} and ${parts.at(-1)}`;

/** For what differs, but in nothing worth a word. */
export function lastDigits(keys: readonly string[]): string {
  const named = keys.slice(0, 3).join(", ");
  return `differs slightly in ${named}${keys.length > 3 ? ` and ${keys.length - 3} values more` : ""}`;
}
