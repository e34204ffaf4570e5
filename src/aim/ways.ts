import type { Quat } from "../math/quat.js";
import { normalize, type Vec3 } from "../math/vec3.js";
import { familyOf } from "./families.js";
import { polish, type Turn } from "./polish.js";
import { momentumOf, type Problem, problemOf, spinOf } from "./problem.js";
import { type OrderedWish, predictedRounding, type Ranked, rank, turnsOf } from "./ranking.js";
import { type Candidate, search } from "./search.js";
import { type Turning, turningOf } from "./turning.js";

/** One way a free body can turn from pose to pose in a given time. */
export interface Way {
  /** Angular velocity at release, principal frame, rad/s. */
  spin: Vec3;
  /** About the angular momentum: 2ET/(2π|L|). */
  turns: number;
  /** ∫|ω|dt/2π; never less than `turns`. */
  turning: number;
  /** ∫|ω_a|dt/∫|ω|dt about each principal axis, 0 to 1; zeros where the body does not turn. */
  share: Vec3;
  /** ∫ω_a dt/∫|ω|dt, −1 to 1. */
  signedShare: Vec3;
  /** Angle between the end pose and the end of the flight with this spin, rad. */
  miss: number;
  /** By how much rounding may move the end in a player that computes the flight anew, rad, at most about. */
  predictedRounding: number;
  /** The exact family the poses belong to, or lie within 1e-4 rad of. */
  family?: string;
}

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

export interface WayWish {
  /** Turns, negative for the other way about `axis`. */
  turns?: number;
  /** Principal frame, any length. */
  axis?: Vec3;
}

export interface NearestWay {
  way: Way;
  warnings: string[];
}

/** Half the width of the first search, turns; doubled until nothing outside can be nearer. */
const FIRST_REACH = 0.75;
const MOST_REACH = 24;
/** A way whose flight misses by more than this, rad, and than rounding explains gives way to the next. */
const MOST_MISS = 1e-9;
const MOST_TRIED = 8;

/**
 * Every way from pose to pose within the bounds of turns, in ascending order of turns; for a family of exact solutions (same pose, half turn about
 * a principal axis, symmetric body about its own axis), its members with momenta in the principal planes.
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
 * of the turning about it, signed, so that backspin never answers topspin.
 */
export function nearestWay(request: Turn, wish: WayWish): NearestWay {
  const problem = problemOf(request);
  const ordered = orderedWish(problem, wish);
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
  return { way, warnings: warningsOf(problem, candidates, way, ordered, wanted <= reach) };
}

/** In the ordered frame, the axis of unit length and turned round for negative turns. */
export function orderedWish({ body }: Pick<Problem, "body">, wish: WayWish): OrderedWish {
  const sign = wish.turns !== undefined && wish.turns < 0 ? -1 : 1;
  const axis = wish.axis && normalize(body.toOrdered(wish.axis));
  return {
    turns: wish.turns === undefined ? undefined : Math.abs(wish.turns),
    axis: axis && [sign * axis[0], sign * axis[1], sign * axis[2]],
  };
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
  const [x, y, z] = body.fromOrdered(polished.share);
  return {
    spin,
    turns: polished.turns,
    turning: polished.turning,
    share: [Math.abs(x), Math.abs(y), Math.abs(z)],
    signedShare: body.fromOrdered(polished.signedShare),
    miss,
    predictedRounding: predictedRounding(polished),
    ...(family && { family }),
  };
}

function warningsOf(
  problem: Problem,
  candidates: readonly Candidate[],
  way: Way,
  wish: OrderedWish,
  fromNothing: boolean,
): string[] {
  const warnings: string[] = [];
  if (way.family)
    warnings.push(
      `the end pose is a case of its own (${way.family}): the ways to it come in continua, of which one is taken`,
    );
  if (fromNothing && wish.turns !== undefined) {
    const least = candidates.reduce(
      (turns, { momentum }) => Math.min(turns, turnsOf(problem, momentum)),
      Infinity,
    );
    if (wish.turns < least - 1e-9)
      warnings.push(
        `the poses need ${least.toFixed(3)} turns at least, more than the ${wish.turns} asked for`,
      );
  }
  if (way.miss > Math.max(MOST_MISS, way.predictedRounding))
    warnings.push(`no exact way is near: the end pose is missed by ${way.miss.toExponential(1)} rad`);
  if (way.predictedRounding > MOST_MISS)
    warnings.push(
      `so many turns about the middle axis let rounding grow to ${way.predictedRounding.toExponential(1)} rad at the end`,
    );
  return warnings;
}
