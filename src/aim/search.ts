import { distance, length, type Vec3 } from "../math/vec3.js";
import { curvesOf, pureSpins } from "./families.js";
import { type Bounds, cells, sampler } from "./grid.js";
import { polish } from "./polish.js";
import { momentumOf, type Problem, spinOf } from "./problem.js";
import { momenta } from "./roots.js";
import { turningOf } from "./turning.js";

/** Momenta nearer to each other than this share are one. */
const SAME = 1e-7;
/** A pure spin that misses by no more is an answer where no exact one is near, rad. */
const MOST_PURE_MISS = 1e-4;

export interface Candidate {
  /** Ordered principal frame, flight as unit of time. */
  momentum: Vec3;
  /** Of a pure spin that leads only nearly to the end pose, rad; else 0. */
  miss: number;
}

/**
 * All momenta that lead to the end pose within the bounds, before the last polish; for an exact family, those
 * of a scan through the wished axis (ordered principal frame).
 *
 * @param even points of the even grid on the curve that is searched, where not the usual number
 */
export function search(problem: Problem, bounds: Bounds, axis?: Vec3, even?: number): Candidate[] {
  const { body, end } = problem;
  const found: Candidate[] = [];
  for (const seed of pureSpins(
    problem,
    bounds.leastTurns,
    Math.min(bounds.mostTurns, bounds.mostTurning),
    axis,
  )) {
    const { growth } = turningOf(body, seed, end);
    const { spin, miss } = polish(problem.turn, spinOf(problem, seed), growth);
    if (miss <= Math.max(1e-9, 1e-14 * growth)) found.push({ momentum: momentumOf(problem, spin), miss: 0 });
    else if (miss <= MOST_PURE_MISS) found.push({ momentum: momentumOf(problem, spin), miss });
  }
  for (const curve of curvesOf(problem, axis)) {
    const sampleAt = sampler(body, end, curve);
    for (const momentum of momenta(cells(curve, sampleAt, bounds, even), sampleAt, bounds))
      found.push({ momentum, miss: 0 });
  }
  return distinct(found);
}

/** The first of each lot of momenta that are one to rounding. */
function distinct(candidates: Candidate[]): Candidate[] {
  const sorted = candidates
    .map((candidate, i) => ({ candidate, i, size: length(candidate.momentum) }))
    .sort((a, b) => a.size - b.size || a.i - b.i);
  const kept: typeof sorted = [];
  for (const entry of sorted) {
    let isNew = true;
    for (let i = kept.length - 1; isNew && i >= 0 && entry.size - kept[i].size <= SAME * entry.size; i--)
      isNew = distance(entry.candidate.momentum, kept[i].candidate.momentum) > SAME * entry.size;
    if (isNew) kept.push(entry);
  }
  return kept.map(({ candidate }) => candidate);
}
