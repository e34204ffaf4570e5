/** For each take that one of all the others that moves most like it. */

import { type Course, type Nearest, nearestFinder, poseSamples } from "../../bake/nearest.js";

/**
 * The record compares with earlier takes alone; run forwards and backwards, the same measure says it for all.
 *
 * @param reach of the prop, m
 */
export function mostAlike(
  takes: readonly { number: number; course: Course }[],
  reach: number,
): (Nearest | null)[] {
  const forwards = nearestFinder(reach);
  const backwards = nearestFinder(reach);
  const all = takes.map(({ number, course }) => ({ number, course, samples: poseSamples(course) }));
  const before = all.map((take) => forwards(take.number, take.course, take.samples));
  const after = [...all]
    .reverse()
    .map((take) => backwards(take.number, take.course, take.samples))
    .reverse();
  return before.map((earlier, i) => nearer(earlier, after[i]));
}

function nearer(a: Nearest | null, b: Nearest | null): Nearest | null {
  if (!a || !b) return a ?? b;
  return b.distance < a.distance ? b : a;
}
