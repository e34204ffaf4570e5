import { MOST_TURNING } from "../flight/flight.js";
import { RequestError } from "../math/request-error.js";
import { normalize, type Vec3 } from "../math/vec3.js";
import { type OrderedWish, predictedRounding } from "./ranking.js";
import type { ReducedBody } from "./reduced-body.js";
import type { Turning } from "./turning.js";

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

/** What is wished of the turning from pose to pose; empty: as little as can be. */
export interface WayWish {
  /** Turns, negative for the other way about `axis`. */
  turns?: number;
  /** Principal frame, any length. */
  axis?: Vec3;
}

/** The way found, and what whoever wished should know of it. */
export interface NearestWay {
  way: Way;
  warnings: string[];
}

/** A miss, or what rounding may add to it, that is not worth a word, rad. */
export const MOST_MISS = 1e-9;

/** A way this near the wish, in turns, leaves nothing better to be looked for. */
const AS_WISHED = 0.1;

/**
 * In the ordered frame, the axis of unit length and turned round for negative turns.
 *
 * @throws RequestError for more turns than a flight may have: they would only be found out after the search
 */
export function orderedWish(body: ReducedBody, wish: WayWish): OrderedWish {
  const most = MOST_TURNING / (2 * Math.PI);
  if (wish.turns !== undefined && !(Math.abs(wish.turns) <= most))
    throw new RequestError(
      ["spin"],
      `${Math.abs(wish.turns)} turns are too many for a clip`,
      `at most ${Math.floor(most)} in all`,
    );
  const sign = wish.turns !== undefined && wish.turns < 0 ? -1 : 1;
  const axis = wish.axis && normalize(body.toOrdered(wish.axis));
  return {
    turns: wish.turns === undefined ? undefined : Math.abs(wish.turns),
    axis: axis && [sign * axis[0], sign * axis[1], sign * axis[2]],
  };
}

/** The way in the principal frame, from its turning in the ordered one. */
export function describeWay(
  body: ReducedBody,
  spin: Vec3,
  turning: Turning,
  miss: number,
  family?: string,
): Way {
  const [x, y, z] = body.fromOrdered(turning.share);
  return {
    spin,
    turns: turning.turns,
    turning: turning.turning,
    share: [Math.abs(x), Math.abs(y), Math.abs(z)],
    signedShare: body.fromOrdered(turning.signedShare),
    miss,
    predictedRounding: predictedRounding(turning),
    ...(family && { family }),
  };
}

/**
 * What whoever wished should know of the answer.
 *
 * @param leastTurns the least turns of all ways, where known
 * @param offWish how far it is from the wish, in turns
 */
export function warningsFor(way: Way, wish: OrderedWish, leastTurns?: number, offWish = 0): string[] {
  const warnings: string[] = [];
  if (way.family && way.family !== "sphere" && offWish > AS_WISHED)
    warnings.push(
      `the end pose is a case of its own (${way.family}): its ways may come in continua, of which a few are looked at, and one nearer the wish may be missed`,
    );
  if (leastTurns !== undefined && wish.turns !== undefined && wish.turns < leastTurns - 1e-9)
    warnings.push(
      `this needs ${leastTurns.toFixed(3)} turns at least, more than the ${Number(wish.turns.toFixed(3))} asked for`,
    );
  if (way.miss > Math.max(MOST_MISS, way.predictedRounding))
    warnings.push(`no exact way is near: the end pose is missed by ${way.miss.toExponential(1)} rad`);
  if (way.predictedRounding > MOST_MISS)
    warnings.push(
      `so many turns about the middle axis let rounding grow to ${way.predictedRounding.toExponential(1)} rad at the end`,
    );
  return warnings;
}
