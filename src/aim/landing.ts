/** The launch of a throw that a floor ends, the prop in the pose asked for as it touches: time and spin are solved together. */

import { solveArc } from "../flight/arc.js";
import { endArc } from "../flight/arc-end.js";
import type { Launch } from "../flight/launch.js";
import { between, conjugate, multiply, type Quat, rotate } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { quadraticRoots } from "../math/roots.js";
import { addScaled, scale, subtract, type Vec3 } from "../math/vec3.js";
import { type AimedArrival, type ArrivalWish, solveArrival } from "./arrival.js";
import type { AimedBody } from "./launch.js";
import { otherWays } from "./other-ways.js";

/** What the floor is to the prop; poses turn the model from as modelled. */
export interface Landing {
  /** Height along +Y, m, of the centre of mass where the prop in this pose touches. */
  height(pose: Quat): number;
  /** By how many seconds a flight touches before its end; 0 where it does not. */
  earliness(launch: Launch): number;
}

/** A wish whose arc has an open end. */
export interface LandingWish extends ArrivalWish {
  landing: Landing;
}

/** Rounds in which time and pose are brought together, and how many of the first find the way anew. */
const ROUNDS = 30;
const FRESH = 3;
/** A time that changes by less, as a share of it or of a second, changes the way no more. */
const NEAR = 1e-3;
/** Changes of the time that end it, likewise; where rounding in a hand's speed leaves more: what will do. */
const SETTLED = 1e-14;
const GOOD = 1e-10;
const NOT_NEAREST =
  "on the way nearest the wish an edge would touch the floor before: the nearest that does not is taken";

/**
 * Solves the time at which the prop, in the pose asked for, touches with its lowest point, and the spin that gets it there. Where the way nearest the
 * wish would touch with something else before, the next nearest that does not is taken.
 *
 * @throws RequestError where there is no such flight
 */
export function solveLanding(wish: LandingWish, body: AimedBody): AimedArrival {
  const nearest = settled(wish, body);
  const early = wish.landing.earliness(nearest.launch);
  if (early === 0) return nearest;
  const posed = withRoll(wish, body, nearest);
  for (const { spin } of otherWays(wish, body, nearest)) {
    const other = settled(posed, body, { spin, duration: nearest.launch.duration });
    if (wish.landing.earliness(other.launch) === 0)
      return { ...other, warnings: [...nearest.warnings, ...other.warnings, NOT_NEAREST] };
  }
  throw new RequestError(
    ["arrive", "facing"],
    Number.isFinite(early)
      ? `an edge would touch the floor ${early.toPrecision(2)} s before the prop is in that pose`
      : "the prop is in that pose at the floor without having been wholly above it before",
    "needs a slower or plainer turn (spin.rate), a steeper way down, or another orientation",
  );
}

/** Either end: at a mark or a time, or where a floor makes it. */
export const solveFacing = (wish: ArrivalWish | LandingWish, body: AimedBody): AimedArrival =>
  "landing" in wish ? solveLanding(wish, body) : solveArrival(wish, body);

interface Known {
  spin: Vec3;
  /** s, of the flight that the spin is for */
  duration: number;
}

/** Time and pose brought together, on the way that is known, or on the nearest. */
function settled(wish: LandingWish, body: AimedBody, from?: Known): AimedArrival {
  let known = from;
  let duration = known?.duration ?? firstGuess(wish);
  let facing = wish;
  let before: { duration: number; change: number } | undefined;
  for (let round = 0; ; round++) {
    const closed = { ...facing, arc: { ...wish.arc, openEnd: undefined, after: duration } };
    const near = known && scale(known.spin, known.duration / duration);
    const found = solveArrival(closed, body, near);
    const height = wish.landing.height(multiply(found.turn.end, conjugate(body.axes)));
    const touch = descent(
      found.launch.centerOfMass[1],
      found.launch.velocity[1],
      found.launch.gravity[1],
      height,
    );
    if (touch === undefined) throw tooHigh(found.launch, height);
    const change = touch - duration;
    const unit = 1 + duration;
    if (Math.abs(change) <= SETTLED * unit || round === ROUNDS) {
      if (Math.abs(change) > GOOD * unit) throw unsettled();
      const request = { ...wish.arc, from: found.launch.centerOfMass };
      return { ...found, arc: endArc(request, found.arc, duration) };
    }
    if (known || Math.abs(change) <= NEAR * unit || round >= FRESH) {
      known = { spin: found.launch.spin, duration };
      facing = withRoll(wish, body, found);
    }
    const next = known && before ? secant(before, { duration, change }) : touch;
    before = { duration, change };
    duration = next;
  }
}

/** The wish with the roll that was found for its one direction. */
function withRoll(wish: LandingWish, body: AimedBody, { turn }: AimedArrival): LandingWish {
  const { facing } = wish;
  if (facing.kind === "pose") return wish;
  const reached = multiply(turn.end, conjugate(body.axes));
  const { direction, target } = facing;
  const pose = (course: Parameters<typeof target>[0]): Quat =>
    multiply(between(rotate(reached, direction), target(course)), reached);
  return { ...wish, facing: { kind: "pose", pose } };
}

/** Where the change of the time is 0 by the last two; a step that goes far is not believed. */
function secant(a: { duration: number; change: number }, b: { duration: number; change: number }): number {
  const plain = b.duration + b.change;
  const next = b.duration - (b.change * (b.duration - a.duration)) / (b.change - a.change);
  return Math.abs(next - plain) <= Math.abs(b.change) ? next : plain;
}

/** The time for the centre of mass, as if that were thrown; exact where pose and launch depend on nothing that is still to be found. */
function firstGuess(wish: LandingWish): number {
  const open = solveArc(wish.arc);
  const gravity = open.gravity[1];
  const course = { ahead: wish.ahead, travel: open.velocity };
  const start = wish.pose(course);
  const from = subtract(wish.arc.from, rotate(start, wish.releaseOffset));
  const { facing } = wish;
  const end = (duration: number): Quat => {
    const travel = addScaled(open.velocity, open.gravity, duration);
    const atEnd = { ahead: wish.ahead, travel };
    if (facing.kind === "pose") return facing.pose(atEnd, start);
    return multiply(between(rotate(start, facing.direction), facing.target(atEnd)), start);
  };
  const highest = Math.max(0, gravity < 0 ? open.velocity[1] / -gravity : 0);
  let pose = wish.usesTravelAtEnd ? start : end(0);
  let duration: number | undefined;
  for (let round = 0; round < (wish.usesTravelAtEnd ? 4 : 1); round++) {
    const height = wish.landing.height(pose);
    duration = descent(from[1], open.velocity[1], gravity, height);
    if (duration === undefined && highest === 0)
      throw tooHigh({ centerOfMass: from, velocity: open.velocity, gravity: open.gravity }, height);
    if (wish.usesTravelAtEnd) pose = end(duration ?? highest);
  }
  return duration ?? highest;
}

/** When a height is last passed on the way down, s > 0; undefined where it is not. */
function descent(from: number, rise: number, gravity: number, height: number): number | undefined {
  const last = quadraticRoots(0.5 * gravity, rise, from - height).at(-1);
  return last !== undefined && last > 0 && rise + gravity * last <= 0 ? last : undefined;
}

function tooHigh(
  { centerOfMass, velocity, gravity }: Pick<Launch, "centerOfMass" | "velocity" | "gravity">,
  height: number,
): RequestError {
  const rise = velocity[1] > 0 && gravity[1] < 0 ? (velocity[1] * velocity[1]) / (-2 * gravity[1]) : 0;
  const short = height - centerOfMass[1] - rise;
  return new RequestError(
    ["arrive", "floor"],
    short > 0
      ? `in the pose of arrive.facing the prop never stands so high: it lacks ${short.toPrecision(3)} m at the top of its arc`
      : "the prop never comes down to the floor",
    short > 0 ? "a lower floor, or a launch that rises higher" : "a gravity, or a launch that goes down",
  );
}

const unsettled = (): RequestError =>
  new RequestError(
    ["arrive", "facing"],
    "no time is found at which the prop touches the floor in that pose",
    "name the directions as [x, y, z] instead of flight, or a steeper way down",
  );
