/**
 * Arcs whose launch is given: its velocity, or its heading and two of speed, elevation, apex and through; with a free gravity one of apex and
 * through more. The end is a time, or open.
 */

import { cosDegrees, sinDegrees } from "../math/degrees.js";
import { RequestError } from "../math/request-error.js";
import { addScaled, dot, length, scale, subtract, type Vec3 } from "../math/vec3.js";
import type { Arc, ArcRequest } from "./arc.js";
import { pathOf } from "./arc-conditions.js";
import { headingDirection, levelAndRise, makeArc, upOf } from "./arc-frame.js";
import { freeLaunch } from "./arc-launch-free.js";
import {
  climbForApex,
  launchOf,
  type PlaneLaunch,
  type PlaneRequest,
  passagesByApex,
  slopeOf,
} from "./arc-launch-plane.js";
import { atLeast, atMost, shown } from "./arc-message.js";
import { leastSpeed, type Passage, passageByGravity, passagesAtSpeed, shapeBySlope } from "./arc-passage.js";

/** See `solveArc`. */
export function launchArc(request: ArcRequest): Arc {
  const up = upOf(request.gravity);
  const duration = request.after ?? Number.POSITIVE_INFINITY;
  const ahead = request.velocity
    ? levelAndRise([0, 0, 0], request.velocity, up).ahead
    : headingDirection(request.heading!, up);
  const plane: PlaneRequest = {
    apex: request.apex,
    speed: request.speed,
    elevation: request.elevation,
    branch: request.branch,
    velocity: velocityInPlane(request, ahead, up),
    through: pointInPlane(request, ahead, up),
    duration,
  };
  const free = "free" in request.gravity ? freeLaunch(plane) : undefined;
  const gravity = "free" in request.gravity ? scale(up, -free!.gravity) : request.gravity;
  const launch = free?.launch ?? launchUnder(length(gravity), plane);
  const arc = makeArc({ ahead, up, ...launch, gravity, duration });
  return request.velocity ? { ...arc, velocity: request.velocity } : arc;
}

function launchUnder(gravity: number, plane: PlaneRequest): PlaneLaunch {
  const { velocity, through, apex, speed, elevation, duration } = plane;
  if (velocity) return velocity;
  if (through && apex !== undefined) return launchOf(passagesByApex(through, apex, gravity, duration), plane);
  if (through && speed !== undefined) {
    const both = passagesAtSpeed(through.level, through.rise, speed, gravity);
    if (both.length > 0) return launchOf(both, plane);
    throw new RequestError(
      pathOf("speed"),
      `a launch at ${speed} m/s does not reach the point it is to pass through`,
      `needs at least ${atLeast(leastSpeed(through.level, through.rise, gravity))} m/s`,
    );
  }
  if (through) return launchOf([passageAtElevation(gravity, through, elevation!)], plane);
  const climbSpeed = climbForApex(apex!, gravity, duration);
  if (speed === undefined) return launchAtElevation(climbSpeed, elevation!, apex!);
  if (speed < climbSpeed * (1 - 1e-15))
    throw new RequestError(
      pathOf("speed"),
      `a launch at ${speed} m/s does not rise ${apex} m`,
      `needs at least ${atLeast(climbSpeed)} m/s`,
    );
  return { levelSpeed: Math.sqrt(Math.max(0, speed - climbSpeed) * (speed + climbSpeed)), climbSpeed };
}

function passageAtElevation(
  gravity: number,
  through: NonNullable<PlaneRequest["through"]>,
  elevation: number,
): Passage {
  const shape = shapeBySlope(through.level, through.rise, slopeOf(elevation));
  if (gravity === 0)
    throw new RequestError(
      pathOf("through"),
      "without gravity every speed passes there, or none",
      "give arc.speed instead",
    );
  if (shape.sag > 0) return passageByGravity(shape, gravity);
  throw new RequestError(
    pathOf("through"),
    `a launch at ${elevation}° passes below a height of ${shown(through.height)} m there at any speed`,
    `needs a height below ${atMost(through.height + shape.sag)} m`,
  );
}

function launchAtElevation(climbSpeed: number, elevation: number, apex: number): PlaneLaunch {
  if (!(elevation > 0))
    throw new RequestError(
      pathOf("elevation"),
      `a launch at ${elevation}° does not rise ${apex} m, or does at any speed`,
      "needs more than 0°, or arc.speed instead of arc.apex",
    );
  if (apex === 0)
    throw new RequestError(
      pathOf("apex"),
      `a launch at ${elevation}° rises more than 0 m`,
      "needs to be more than 0 m",
    );
  return { levelSpeed: climbSpeed * (cosDegrees(elevation) / sinDegrees(elevation)), climbSpeed };
}

function velocityInPlane(request: ArcRequest, ahead: Vec3, up: Vec3): PlaneLaunch | undefined {
  const { velocity, speed, elevation } = request;
  if (velocity) return { levelSpeed: dot(velocity, ahead), climbSpeed: dot(velocity, up) };
  if (speed === undefined || elevation === undefined) return undefined;
  return { levelSpeed: speed * cosDegrees(elevation), climbSpeed: speed * sinDegrees(elevation) };
}

function pointInPlane(request: ArcRequest, ahead: Vec3, up: Vec3): PlaneRequest["through"] {
  if (request.through === undefined) return undefined;
  const d = subtract(request.through, request.from);
  const rise = dot(d, up);
  const level = dot(addScaled(d, up, -rise), ahead);
  if (level > 0) return { level, rise, height: dot(request.through, up) };
  const vertical = length(ahead) === 0;
  throw new RequestError(
    pathOf("through"),
    vertical
      ? "a throw straight up or down is never abreast of a point"
      : `the point lies ${shown(-level)} m behind the release`,
    vertical
      ? "drop it, or give a velocity that is not vertical"
      : "needs a point ahead, along the heading of the launch",
  );
}
