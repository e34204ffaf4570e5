/** Which takes are listed, and in what order. */

import { type Measured, type MeasureKey, measureOf } from "./measures.js";
import type { Verdict } from "./verdicts.js";

export type Kept = "all" | "open" | Verdict;

export interface Order {
  by: MeasureKey;
  highFirst: boolean;
  /** Those with this verdict. */
  keep: Kept;
  /** Bounds on the number they are put in order by, in its value's unit. */
  least?: number;
  most?: number;
}

export const PLAIN_ORDER: Order = { by: "number", highFirst: false, keep: "all" };

/** Takes without the number come last; equals by take number. */
export function inOrder(
  all: readonly Measured[],
  order: Order,
  verdict: (take: number) => Verdict | undefined,
): Measured[] {
  const { of } = measureOf(order.by);
  const kept = all.filter(
    (measured) => isKept(verdict(measured.number), order.keep) && isWithin(of(measured), order),
  );
  const sign = order.highFirst ? -1 : 1;
  return kept.sort((a, b) => {
    const [x, y] = [of(a), of(b)];
    if (x === null || y === null) return x === y ? a.number - b.number : x === null ? 1 : -1;
    return sign * (x - y) || a.number - b.number;
  });
}

const isKept = (verdict: Verdict | undefined, keep: Kept): boolean =>
  keep === "all" || (keep === "open" ? verdict === undefined : verdict === keep);

function isWithin(value: number | null, { least, most }: Order): boolean {
  if (least === undefined && most === undefined) return true;
  if (value === null) return false;
  return value >= (least ?? Number.NEGATIVE_INFINITY) && value <= (most ?? Number.POSITIVE_INFINITY);
}

/** 0 to 1: where a value lies among those of all takes; null where all have the same. */
export function placeAmong(value: number, values: readonly number[]): number | null {
  const least = Math.min(...values);
  const most = Math.max(...values);
  return most > least ? (value - least) / (most - least) : null;
}
