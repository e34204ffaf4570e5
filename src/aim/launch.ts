/** The launch that a throw with a stated spin asks for, wherever its points lie on the prop. */

import { type Arc, type ArcRequest, solveArc } from "../flight/arc.js";
import { fly } from "../flight/flight.js";
import type { Launch } from "../flight/launch.js";
import { continueToOne } from "../math/continuation.js";
import { conjugate, multiply, type Quat, rotate } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { cross, scale, subtract, type Vec3, ZERO } from "../math/vec3.js";
import type { ThrowCourse } from "./world-directions.js";

/** A body as the launch needs it. */
export interface AimedBody {
  /** Principal moments, kg m². */
  moments: Vec3;
  /** Turns x, y, z onto the principal axes in the model's frame. */
  axes: Quat;
}

/** A throw without spreads, in the world of glTF; orientations turn the model from as modelled. */
export interface LaunchWish {
  /** Conditions on the flight of the centre of mass; places and velocity here are those of the release and arrival points. */
  arc: ArcRequest;
  /** Release and arrival point from the centre of mass, model's frame, m. */
  releaseOffset: Vec3;
  arrivalOffset: Vec3;
  /** Orientation at release. */
  pose: (course: ThrowCourse) => Quat;
  /** Level direction of the throw is measured along this (any length). */
  ahead?: Vec3;
  /** Angular velocity at release in the principal frame, rad/s. */
  spin: (pose: Quat, duration: number, course: ThrowCourse) => Vec3;
  /** Whether pose or spin depend on the centre of mass's velocity at release. */
  usesTravel: boolean;
}

export interface AimedLaunch {
  launch: Launch;
  arc: Arc;
}

/**
 * Solves place, pose and time together. With a point off the centre of mass the flight of the centre of mass depends on the poses at both
 * ends, and these on the flight's time (turns) and direction (`flight`): the solution is the one continued from the centred point.
 *
 * @throws RequestError where there is no such flight
 */
export function solveLaunch(wish: LaunchWish, body: AimedBody): AimedLaunch {
  const centred = evaluate(wish, body, { travel: undefined, duration: undefined }, 0);
  const holdsPoint = isOff(wish.releaseOffset) || (wish.arc.to !== undefined && isOff(wish.arrivalOffset));
  if (!holdsPoint && !wish.usesTravel) return centred;
  // with the time stated, or left open, nothing goes round in a circle
  const isOpen = wish.arc.openEnd === true;
  const stated = isOpen ? Number.POSITIVE_INFINITY : wish.arc.after;
  if (stated !== undefined && !wish.usesTravel)
    return evaluate(wish, body, { travel: centred.arc.velocity, duration: stated }, 1);
  const unknowns = (arc: Arc) => [
    ...(isOpen ? [] : [arc.duration]),
    ...(wish.usesTravel ? arc.velocity : []),
  ];
  const course = (x: readonly number[], arc: Arc) => ({
    duration: isOpen ? Number.POSITIVE_INFINITY : x[0],
    travel: wish.usesTravel ? (x.slice(-3) as unknown as Vec3) : arc.velocity,
  });
  const solution = holdsPoint
    ? continueToOne(
        (x, lambda) => unknowns(evaluate(wish, body, course(x, centred.arc), lambda).arc),
        unknowns(centred.arc),
      )
    : unknowns(centred.arc);
  if (!solution)
    throw new RequestError(
      ["release", "point"],
      "no flight with these conditions can be followed from the centre of mass to the points named",
      "use points nearer the centre of mass, a slower spin, or fix the flight with arrive.after",
    );
  return evaluate(wish, body, course(solution, centred.arc), 1);
}

/** The launch for a guess of course and duration, the offsets shortened to `lambda` of their length. */
function evaluate(
  wish: LaunchWish,
  body: AimedBody,
  guess: { travel?: Vec3; duration?: number },
  lambda: number,
): AimedLaunch {
  const duration = guess.duration ?? solveArc(wish.arc).duration;
  const travel = guess.travel ?? solveArc(wish.arc).velocity;
  const course = { ahead: wish.ahead, travel };
  const pose = wish.pose(course);
  const orientation = multiply(pose, body.axes);
  const spin = wish.spin(pose, duration, course);
  const atRelease = rotate(pose, scale(wish.releaseOffset, lambda));
  const from = subtract(wish.arc.from, atRelease);
  const velocity =
    wish.arc.velocity && subtract(wish.arc.velocity, cross(rotate(orientation, spin), atRelease));
  const at = { centerOfMass: from, orientation, spin, moments: body.moments };
  let to = wish.arc.to;
  if (to && lambda > 0 && isOff(wish.arrivalOffset)) {
    const end = fly({ ...at, velocity: ZERO, gravity: ZERO, duration }).orientation(duration);
    const modelEnd = multiply(end, conjugate(body.axes));
    to = subtract(to, rotate(modelEnd, scale(wish.arrivalOffset, lambda)));
  }
  const arc = solveArc({ ...wish.arc, from, to, velocity });
  return { arc, launch: { ...at, velocity: arc.velocity, gravity: arc.gravity, duration: arc.duration } };
}

const isOff = (offset: Vec3) => offset[0] !== 0 || offset[1] !== 0 || offset[2] !== 0;
