/** The launch of a throw whose pose at arrival is asked for: the spin is solved so that it comes true. */

import { type Arc, solveArc } from "../flight/arc.js";
import { fly } from "../flight/flight.js";
import { continueToOne } from "../math/continuation.js";
import { angleBetween, between, conjugate, multiply, type Quat, rotate, rotateBack } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { addScaled, cross, distance, length, scale, subtract, type Vec3, ZERO } from "../math/vec3.js";
import type { AimedBody, AimedLaunch, LaunchWish } from "./launch.js";
import { polish, type Turn } from "./polish.js";
import { MOST_MISS, type WayWish } from "./way.js";
import { nearestDirectionWay, nearestWay } from "./ways.js";
import type { ThrowCourse } from "./world-directions.js";

/** What is asked of the prop at the end; poses turn the model from as modelled. */
export type ArrivalFacing =
  | { kind: "pose"; pose: (course: ThrowCourse, release: Quat) => Quat }
  /** A unit vector in the model's frame that is to lie along a unit vector of the world; the roll about it is free. */
  | { kind: "direction"; direction: Vec3; target: (course: ThrowCourse) => Vec3 };

export interface ArrivalWish extends Omit<LaunchWish, "spin"> {
  facing: ArrivalFacing;
  /** Whether `facing` depends on the centre of mass's velocity at the end. */
  usesTravelAtEnd: boolean;
  /** What is wished of the turning on the way, axis in the principal frame. */
  turning: (pose: Quat, duration: number, course: ThrowCourse) => WayWish;
}

export interface AimedArrival extends AimedLaunch {
  /** From the pose at release to the one asked for at the end; of one direction, with the roll that the way found has. */
  turn: Turn;
  /** Angle by which the pose asked for is missed at the end, rad. */
  missAngle: number;
  warnings: string[];
}

/** Rounds in which a hand's stated velocity and the spin that it depends on are brought together. */
const ROUNDS = 20;
/** rad/s per rad/s */
const SETTLED = 1e-13;

/**
 * Solves place, poses and time together, then the way from pose to pose that is nearest the wish. A pose that names `flight` depends on the
 * arc, and with a point off the centre of mass the arc on the pose: the solution is the one continued from the centred point. Of one direction
 * alone the roll is chosen for the centred point and kept. An end that a floor makes is found by `solveLanding`.
 *
 * @param near of a whole pose: a spin that nearly does it, where one is known; principal frame, rad/s, for the centred arc's duration
 * @throws RequestError where there is no such flight
 */
export function solveArrival(wish: ArrivalWish, body: AimedBody, near?: Vec3): AimedArrival {
  const centred = solveArc(wish.arc);
  const { facing } = wish;
  if (facing.kind === "pose") return solvePose(wish, body, centred, facing.pose, near);
  const first = posesAt(wish, centred, (course) => between(facing.direction, facing.target(course)));
  const start = multiply(first.start, body.axes);
  const { way, warnings } = nearestDirectionWay(
    {
      moments: body.moments,
      start,
      duration: centred.duration,
      direction: rotateBack(body.axes, facing.direction),
      target: facing.target(first.endCourse),
    },
    wish.turning(first.start, centred.duration, first.course),
  );
  const reached = endPose(body, start, way.spin, centred.duration);
  const rolled = (course: ThrowCourse): Quat =>
    multiply(between(rotate(reached, facing.direction), facing.target(course)), reached);
  const solved = solvePose(wish, body, centred, rolled, way.spin);
  return { ...solved, warnings: [...new Set([...warnings, ...solved.warnings])] };
}

/**
 * The flight of the centre of mass of such a throw, from its place at release, in a fraction of the time that its spin takes; undefined where it depends on the spin or on a roll that is still
 * to be found.
 *
 * @throws RequestError where there is none
 */
export function arrivalArc(wish: ArrivalWish, body: AimedBody): { from: Vec3; arc: Arc } | undefined {
  const { facing } = wish;
  const isRolled = facing.kind === "direction" && wish.arc.to !== undefined && length(wish.arrivalOffset) > 0;
  if (dependsOnSpin(wish) || isRolled || wish.arc.openEnd) return undefined;
  const end: EndPose =
    facing.kind === "pose" ? facing.pose : (course) => between(facing.direction, facing.target(course));
  const arc = coupledArc(wish, body, solveArc(wish.arc), end, ZERO);
  return { from: subtract(wish.arc.from, rotate(posesAt(wish, arc, end).start, wish.releaseOffset)), arc };
}

/** Only a stated velocity of a point off the centre makes the arc depend on the spin. */
const dependsOnSpin = (wish: ArrivalWish): boolean =>
  wish.arc.velocity !== undefined && length(wish.releaseOffset) > 0;

type EndPose = (course: ThrowCourse, release: Quat) => Quat;

/** @param near a spin that nearly does it, where one is known; principal frame, rad/s, for the centred arc's duration */
function solvePose(
  wish: ArrivalWish,
  body: AimedBody,
  centred: Arc,
  end: EndPose,
  near?: Vec3,
): AimedArrival {
  let spin: Vec3 = near ?? ZERO;
  const isHeld = dependsOnSpin(wish);
  for (let round = 0; ; round++) {
    const arc = coupledArc(wish, body, centred, end, spin);
    const { start, finish, course } = posesAt(wish, arc, end);
    const turn = {
      moments: body.moments,
      start: multiply(start, body.axes),
      end: multiply(finish, body.axes),
      duration: arc.duration,
    };
    const known = near && polish(turn, scale(near, centred.duration / arc.duration), 1);
    const found =
      known && known.miss <= MOST_MISS
        ? { way: known, warnings: [] }
        : nearestWay(turn, wish.turning(start, arc.duration, course));
    const settled = distance(found.way.spin, spin) <= SETTLED * (1 + length(spin));
    spin = found.way.spin;
    if (isHeld && !settled && round < ROUNDS) continue;
    const launch = {
      centerOfMass: subtract(wish.arc.from, rotate(start, wish.releaseOffset)),
      velocity: arc.velocity,
      gravity: arc.gravity,
      orientation: turn.start,
      spin,
      moments: body.moments,
      duration: arc.duration,
    };
    const missAngle = angleBetween(endPose(body, turn.start, spin, arc.duration), finish);
    return { arc, launch, turn, missAngle, warnings: found.warnings };
  }
}

/** The arc on which points off the centre meet their marks, for a spin that matters only to a point's stated velocity. */
function coupledArc(wish: ArrivalWish, body: AimedBody, centred: Arc, end: EndPose, spin: Vec3): Arc {
  const at = (arc: Arc, lambda: number): Arc => {
    const { start, finish } = posesAt(wish, arc, end);
    const atRelease = rotate(start, scale(wish.releaseOffset, lambda));
    const { from, to, velocity } = wish.arc;
    return solveArc({
      ...wish.arc,
      from: subtract(from, atRelease),
      to: to && subtract(to, rotate(finish, scale(wish.arrivalOffset, lambda))),
      velocity: velocity && subtract(velocity, cross(rotate(multiply(start, body.axes), spin), atRelease)),
    });
  };
  const isCoupled = wish.usesTravel || wish.usesTravelAtEnd;
  if (!isCoupled) return at(centred, 1);
  // the velocities at both ends are what the poses depend on
  const unknowns = (arc: Arc) => [...arc.velocity, ...velocityAtEnd(arc)];
  const asArc = (x: readonly number[]): Arc => ({
    ...centred,
    velocity: [x[0], x[1], x[2]],
    gravity: [x[3] - x[0], x[4] - x[1], x[5] - x[2]],
    duration: 1,
  });
  const solution = continueToOne((x, lambda) => unknowns(at(asArc(x), lambda)), unknowns(centred));
  if (!solution)
    throw new RequestError(
      ["arrive", "point"],
      "no flight with these conditions can be followed from the centre of mass to the points named",
      "use points nearer the centre of mass, or name the directions as [x, y, z] instead of flight",
    );
  return at(asArc(solution), 1);
}

function posesAt(wish: ArrivalWish, arc: Arc, end: EndPose) {
  const course = { ahead: wish.ahead, travel: arc.velocity };
  const endCourse = { ahead: wish.ahead, travel: velocityAtEnd(arc) };
  const start = wish.pose(course);
  return { course, endCourse, start, finish: end(endCourse, start) };
}

const velocityAtEnd = (arc: Arc): Vec3 => addScaled(arc.velocity, arc.gravity, arc.duration);

/** The model's pose at the end of a flight with this spin. */
function endPose(body: AimedBody, start: Quat, spin: Vec3, duration: number): Quat {
  const launch = {
    centerOfMass: ZERO,
    velocity: ZERO,
    gravity: ZERO,
    orientation: start,
    spin,
    moments: body.moments,
  };
  return multiply(fly({ ...launch, duration }).orientation(duration), conjugate(body.axes));
}
