import { dot, normalize, type Vec3 } from "../math/vec3.js";
import type { Problem } from "./problem.js";
import type { Candidate } from "./search.js";
import { type Turning, turningOf } from "./turning.js";

const TURN = 2 * Math.PI;

/** What the wish costs: a whole share of the turning about another axis weighs as much as two turns too many or too few. */
const SHARE = 2;
/** A pure spin that misses gives way to an exact way within a quarter of a turn. */
const INEXACT = 0.25;
/** Ways that rounding could take this far from the pose, rad, come last: a tenth of what a take may miss. */
const MOST_ROUNDING = 1e-5;
const LAST = 1000;

/** A double's rounding in each component of the launch and of every turn of the flight. */
const ROUNDING = 1.8e-15;

/** The wish, in the ordered principal frame. */
export interface OrderedWish {
  /** 0 or more: 2ET/(2π|L|). */
  turns?: number;
  /** Unit vector the body is to turn about, by the right-hand rule. */
  axis?: Vec3;
}

export interface Ranked {
  candidate: Candidate;
  turning: Turning;
  cost: number;
}

/** Angle by which rounding may move the end of the flight, rad: it grows with the turns about the middle axis. */
export const predictedRounding = (turning: Turning): number =>
  ROUNDING * turning.growth * (1 + turning.turns);

/**
 * How far a way is from the wish, in turns, by both measures of them: the one about the momentum alone would let a slim body spin about itself at
 * will. Without a wish for turns, how much it turns. Of a wish for the other way round its axis is the opposite one, its turns positive.
 */
export function nearness(
  turning: Pick<Turning, "turns" | "turning" | "signedShare">,
  wish: OrderedWish,
): number {
  const wanted = wish.turns ?? 0;
  const amount = Math.max(Math.abs(turning.turns - wanted), Math.abs(turning.turning - wanted));
  return amount + (wish.axis ? SHARE * (1 - dot(turning.signedShare, wish.axis)) : 0);
}

/** The same, but that ways which rounding could spoil come last. */
export const costOf = (turning: Turning, wish: OrderedWish): number =>
  nearness(turning, wish) + (predictedRounding(turning) > MOST_ROUNDING ? LAST : 0);

/** The candidates that may be nearest the wish, best first: those whose turns alone leave them behind are not looked at. */
export function rank(problem: Problem, candidates: readonly Candidate[], wish: OrderedWish): Ranked[] {
  const { body, end } = problem;
  const byTurns = candidates
    .map((candidate, i) => ({
      candidate,
      i,
      off: Math.abs(turnsOf(problem, candidate.momentum) - (wish.turns ?? 0)),
    }))
    .sort((a, b) => a.off - b.off || a.i - b.i);
  const ranked: Ranked[] = [];
  let least = Number.POSITIVE_INFINITY;
  for (const { candidate, off } of byTurns) {
    if (off > least) break;
    const turning = turningOf(body, candidate.momentum, end);
    const cost = costOf(turning, wish) + (candidate.miss > 0 ? INEXACT : 0);
    least = Math.min(least, cost);
    ranked.push({ candidate, turning, cost });
  }
  return ranked.sort((a, b) => a.cost - b.cost);
}

/** 2ET/(2π|L|) of a momentum. */
export function turnsOf({ body }: Problem, momentum: Vec3): number {
  const m = normalize(momentum);
  const [x, y, z] = body.inverse;
  return (x * m[0] * momentum[0] + y * m[1] * momentum[1] + z * m[2] * momentum[2]) / TURN;
}
