/** Drift as lines for people; a long list is told throw by throw. */

import type { Drift } from "./compare.js";

const MOST_LINES = 20;

export function driftLines(drifts: readonly Drift[]): string[] {
  const lines = drifts.length <= MOST_LINES ? drifts.map(({ text }) => text) : summary(drifts);
  if (lines.length <= MOST_LINES) return lines;
  return [...lines.slice(0, MOST_LINES), `and ${lines.length - MOST_LINES} more (--json lists all)`];
}

/** One line for all takes of a throw, with the take that moved furthest. */
function summary(drifts: readonly Drift[]): string[] {
  const told = new Set<string>();
  return drifts.flatMap((drift) => {
    if (drift.kind !== "take" || !drift.throw) return [drift.text];
    if (told.has(drift.throw)) return [];
    told.add(drift.throw);
    const takes = drifts.filter((other) => other.kind === "take" && other.throw === drift.throw);
    if (takes.length === 1) return [drift.text];
    const most = takes.reduce((a, b) => ((b.displacement ?? 0) > (a.displacement ?? 0) ? b : a));
    return [`${drift.throw}: ${takes.length} takes drifted, most of all ${most.text}`];
  });
}
