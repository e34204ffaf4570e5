/** Arguments for elementary functions: random, always the same in a test file of its own, and hard ones. */

import seedrandom from "seedrandom";
import { dissect, ulpError } from "./reference.js";

export const random = seedrandom("elementary");
export const between = (lo: number, hi: number): number => lo + (hi - lo) * random();
export const list = (count: number, make: (i: number) => number): number[] =>
  Array.from({ length: count }, (_, i) => make(i));
export const pairs = (count: number, make: () => [number, number]): [number, number][] =>
  Array.from({ length: count }, make);
/** Any magnitude from 2^lo to 2^hi, either sign. */
export const spread = (lo: number, hi: number): number =>
  (random() < 0.5 ? -1 : 1) * between(1, 2) * 2 ** Math.floor(between(lo, hi));
/** x moved by a few last places. */
export function nudge(x: number, places: number): number {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, x);
  view.setBigInt64(0, view.getBigInt64(0) + BigInt(places));
  return view.getFloat64(0);
}
/** Each centre and the ten doubles on either side. */
export const around = (...centres: number[]): number[] =>
  centres.flatMap((c) => list(21, (i) => nudge(c, i - 10)));
/** Fraction bits that leave over 60 digits of a result about as large as x. */
export const bitsFor = (x: number): number => 200 + Math.max(0, -2 * (dissect(x).e + 52));

/** The greatest error in ulp over all arguments, and the argument that has it. */
export function worst<T extends number | [number, number]>(
  args: T[],
  value: (x: T) => number,
  reference: (x: T) => [bigint, number],
): { ulp: number; at: T } {
  let found = { ulp: -1, at: args[0] };
  for (const x of args) {
    const result = value(x);
    const ulp = Number.isFinite(result) ? ulpError(result, ...reference(x)) : Number.POSITIVE_INFINITY;
    if (ulp > found.ulp) found = { ulp, at: x };
  }
  return found;
}
