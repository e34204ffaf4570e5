import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import { familyOf } from "./families.js";
import { polish, type Turn } from "./polish.js";
import { momentumOf, type Problem, problemOf, spinOf } from "./problem.js";
import { nearness, type Ranked, rank, turnsOf } from "./ranking.js";
import { type Candidate, search } from "./search.js";
import { type Turning, turningOf } from "./turning.js";
import {
  describeWay,
  MOST_MISS,
  type NearestWay,
  orderedWish,
  type Way,
  type WayWish,
  warningsFor,
} from "./way.js";

export { type DirectionRequest, nearestDirectionWay } from "./direction.js";
export type { NearestWay, Way, WayWish } from "./way.js";

/** Two poses, the time between them, and how much a body may turn from one to the other. */
export interface WaysRequest {
  /** Principal moments in any order and unit. */
  moments: Vec3;
  /** Principal frame → world at release and at the end. */
  start: Quat;
  end: Quat;
  /** s */
  duration: number;
  /** Bounds of `turns`; least 0 where it is not stated. */
  leastTurns?: number;
  mostTurns: number;
  /** Bound of `turning`; a slim body has thousands of ways that spin fast about its length. */
  mostTurning?: number;
}

/** Half the width of the first search, turns; doubled until nothing outside can be nearer. */
const FIRST_REACH = 0.75;
const MOST_REACH = 24;
/** How many ways are polished, best first, until one meets the pose. */
const MOST_TRIED = 8;

/**
 * Every way from pose to pose within the bounds of turns, in ascending order of turns; for a family of exact solutions (same pose, half turn about
 * a principal axis, symmetric body about its own axis), its members with momenta in the principal planes. Momenta that lead to the end pose lie on
 * a cone in the body (conservation of momentum and energy, Landau & Lifshitz, Mechanics, §37); along it they are searched and polished.
 */
export function allWays(request: WaysRequest): Way[] {
  const problem = problemOf(request);
  const least = request.leastTurns ?? 0;
  const mostTurning = request.mostTurning ?? Number.POSITIVE_INFINITY;
  const family = familyOf(problem);
  return search(problem, { leastTurns: least, mostTurns: request.mostTurns, mostTurning })
    .map((candidate) =>
      wayOf(problem, candidate, turningOf(problem.body, candidate.momentum, problem.end), family),
    )
    .filter(({ turns, turning }) => turns >= least && turns <= request.mostTurns && turning <= mostTurning)
    .sort((a, b) => a.turns - b.turns);
}

/**
 * The way nearest the wish; without one, the one that turns least. A wish for turns is met as nearly as the poses allow, one for an axis by the share
 * of the turning about it, signed, so that backspin never answers topspin. The spin found is in the principal frame, rad/s.
 *
 * @throws RangeError where no free motion leads there within the turns searched
 */
export function nearestWay(request: Turn, wish: WayWish): NearestWay {
  const problem = problemOf(request);
  const ordered = orderedWish(problem.body, wish);
  const family = familyOf(problem);
  const wanted = ordered.turns ?? 0;
  const within = (reach: number): Candidate[] =>
    search(
      problem,
      { leastTurns: Math.max(0, wanted - reach), mostTurns: wanted + reach, mostTurning: wanted + reach },
      ordered.axis,
    );
  let reach = FIRST_REACH * (wish.axis || wish.turns === undefined ? 2 : 1);
  let candidates = within(reach);
  let ranked = rank(problem, candidates, ordered);
  while (!(ranked[0]?.cost <= reach) && reach < MOST_REACH) {
    reach *= 2;
    candidates = within(reach);
    ranked = rank(problem, candidates, ordered);
  }
  const way = firstGood(problem, ranked, family);
  const least = wanted <= reach ? leastOf(problem, candidates) : undefined;
  const offWish = nearness({ ...way, signedShare: problem.body.toOrdered(way.signedShare) }, ordered);
  return { way, warnings: warningsFor(way, ordered, least, offWish) };
}

function firstGood(problem: Problem, ranked: Ranked[], family: string | undefined): Way {
  let best: Way | undefined;
  for (const { candidate, turning } of ranked.slice(0, MOST_TRIED)) {
    const way = wayOf(problem, candidate, turning, family);
    if (!best || way.miss < best.miss) best = way;
    if (way.miss <= Math.max(MOST_MISS, way.predictedRounding, 2 * candidate.miss)) return way;
  }
  if (!best)
    throw new RangeError("no free motion of this body leads from pose to pose within the turns searched");
  return best;
}

function wayOf(problem: Problem, candidate: Candidate, turning: Turning, family: string | undefined): Way {
  const { turn, body, end } = problem;
  const { spin, miss } = polish(turn, spinOf(problem, candidate.momentum), turning.growth);
  const polished = turningOf(body, momentumOf(problem, spin), end);
  return describeWay(body, spin, polished, miss, family);
}

/** The least turns of all ways, where the search began at none. */
function leastOf(problem: Problem, candidates: readonly Candidate[]): number {
  return candidates.reduce(
    (turns, { momentum }) => Math.min(turns, turnsOf(problem, momentum)),
    Number.POSITIVE_INFINITY,
  );
}
