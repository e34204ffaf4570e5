/** Takes accepted or rejected, and the line of the throw file that keeps what is wanted. */

import type { TakeMotion } from "../../bake/take-motion.js";

export type Verdict = "accepted" | "rejected";

interface Decided {
  verdict: Verdict;
  /** The motion that was looked at. */
  motion: string;
}

/** By throw, then by take. */
export type Verdicts = Readonly<Record<string, Readonly<Record<number, Decided>>>>;

export const NO_VERDICTS: Verdicts = {};

const marks = new WeakMap<TakeMotion, string>();

/** What tells one motion from another. */
export function motionMark(motion: TakeMotion): string {
  const { parts, duration } = motion;
  const mark =
    marks.get(motion) ?? hash(JSON.stringify([duration, parts.map(({ start, launch }) => [start, launch])]));
  marks.set(motion, mark);
  return mark;
}

/** The same verdict given again takes it back. */
export function decide(verdicts: Verdicts, motion: TakeMotion, verdict: Verdict): Verdicts {
  const { throw: name, take } = motion;
  const { [take]: old, ...others } = own(verdicts, name);
  const mark = motionMark(motion);
  const isTakenBack = old?.verdict === verdict && old.motion === mark;
  return { ...verdicts, [name]: isTakenBack ? others : { ...others, [take]: { verdict, motion: mark } } };
}

export const clear = (verdicts: Verdicts, name: string): Verdicts => ({ ...verdicts, [name]: {} });

/** None where the motion is another one than was looked at. */
export function verdictOf(verdicts: Verdicts, motion: TakeMotion): Verdict | undefined {
  const decided = own(verdicts, motion.throw)[motion.take];
  return decided?.motion === motionMark(motion) ? decided.verdict : undefined;
}

/** The verdict on what the take was before its motion changed. */
export function oldVerdict(verdicts: Verdicts, motion: TakeMotion): Verdict | undefined {
  const decided = own(verdicts, motion.throw)[motion.take];
  return decided && decided.motion !== motionMark(motion) ? decided.verdict : undefined;
}

/** Takes that are wanted: the accepted ones, or while none is accepted all but the rejected ones. */
export function wanted(
  verdicts: Verdicts,
  motions: readonly TakeMotion[],
): { takes: number[]; accepted: number; rejected: number } {
  const having = (verdict: Verdict) =>
    motions.filter((motion) => verdictOf(verdicts, motion) === verdict).map((motion) => motion.take);
  const [accepted, rejected] = [having("accepted"), having("rejected")];
  const takes =
    accepted.length > 0
      ? accepted
      : motions.map((motion) => motion.take).filter((take) => !rejected.includes(take));
  return { takes: takes.sort((a, b) => a - b), accepted: accepted.length, rejected: rejected.length };
}

/** As it stands under a throw in the throw file. */
export const takesLine = (takes: readonly number[]): string => `takes: [${takes.join(", ")}]`;

/** Where the page keeps them while it is open; a page from a file may have no storage. */
export interface Shelf {
  read(): Verdicts;
  write(verdicts: Verdicts): void;
}

export function sessionShelf(title: string, storage: () => Storage = () => sessionStorage): Shelf {
  const key = `tossbake verdicts ${title}`;
  return {
    read() {
      try {
        return checked(JSON.parse(storage().getItem(key) ?? "{}"));
      } catch {
        return NO_VERDICTS;
      }
    },
    write(verdicts) {
      try {
        storage().setItem(key, JSON.stringify(verdicts));
      } catch {
        // Refused: they last as long as the page.
      }
    },
  };
}

/** Only what this page could have written. */
function checked(kept: unknown): Verdicts {
  const entries = Object.entries(Object(kept)).map(([name, takes]) => [
    name,
    Object.fromEntries(Object.entries(Object(takes)).filter(([, decided]) => isDecided(decided))),
  ]);
  return Object.fromEntries(entries);
}

const isDecided = (value: unknown): value is Decided => {
  const { verdict, motion } = Object(value);
  return (verdict === "accepted" || verdict === "rejected") && typeof motion === "string";
};

/** A throw may be called `constructor`. */
const own = (verdicts: Verdicts, name: string): Readonly<Record<number, Decided>> =>
  Object.hasOwn(verdicts, name) ? verdicts[name] : {};

/** FNV-1a with 32 bits over UTF-16 units: Fowler, Noll, Vo; RFC 9923. */
function hash(text: string): string {
  let value = 0x811c9dc5;
  for (let i = 0; i < text.length; i++) value = Math.imul(value ^ text.charCodeAt(i), 0x01000193);
  return (value >>> 0).toString(16);
}
