/** Arcs from a place to a mark. */

import { cosDegrees, sinDegrees } from "../math/degrees.js";
import { atan2 } from "../math/elementary.js";
import { RequestError } from "../math/request-error.js";
import { dot, length, scale, subtract, type Vec3 } from "../math/vec3.js";
import type { Arc, ArcRequest } from "./arc.js";
import { pathOf } from "./arc-conditions.js";
import { levelAndRise, makeArc, upOf } from "./arc-frame.js";
import { atLeast, shown } from "./arc-message.js";
import {
  leastSpeed,
  type Passage,
  passageByGravity,
  passageBySpeed,
  passageByTime,
  passagesAtSpeed,
  type Shape,
  shapeByApex,
  shapeByPoint,
  shapeBySlope,
  shapesAtSpeedAndTime,
} from "./arc-passage.js";

/** Rise of the mark, level distance to it, and which way that is. */
interface Way {
  rise: number;
  level: number;
  ahead: Vec3;
  up: Vec3;
}

/** One condition with a known gravity, or two with a free one; see `solveArc`. */
export function arcToMark(request: ArcRequest, to: Vec3): Arc {
  const up = upOf(request.gravity);
  const way = { ...levelAndRise(request.from, to, up), up };
  const passage =
    "free" in request.gravity
      ? passageWithFreeGravity(request, way)
      : passageUnder(length(request.gravity), request, way);
  if (!(passage.time > 0))
    throw new RequestError(
      ["arrive", "at"],
      "the mark is where the throw starts: it takes no time",
      "give a mark further off, or arrive.after",
    );
  return makeArc({
    ahead: way.ahead,
    up,
    levelSpeed: way.level / passage.time,
    climbSpeed: passage.climb / passage.time,
    gravity: "free" in request.gravity ? scale(up, -passage.gravity) : request.gravity,
    duration: passage.time,
  });
}

function passageUnder(gravity: number, request: ArcRequest, way: Way): Passage {
  const { after, speed } = request;
  if (after !== undefined) return { time: after, climb: way.rise + 0.5 * gravity * after * after, gravity };
  if (speed !== undefined) {
    const both = passagesAtSpeed(way.level, way.rise, speed, gravity);
    if (both.length === 0)
      throw new RequestError(
        pathOf("speed"),
        `a launch at ${speed} m/s does not reach the mark`,
        `needs at least ${atLeast(leastSpeed(way.level, way.rise, gravity))} m/s`,
      );
    return branchOf(both, request);
  }
  const { shape, path } = shapeOf(request, way);
  if (gravity === 0)
    throw new RequestError(
      path,
      `without gravity a throw is a straight line, of which ${path.join(".")} fixes nothing`,
      "give arrive.after or arc.speed instead, or a gravity above 0",
    );
  if (!(shape.sag > 0)) throw tooFlat(request, way, path, path);
  return passageByGravity(shape, gravity);
}

function passageWithFreeGravity(request: ArcRequest, way: Way): Passage {
  const { after, speed } = request;
  if (after !== undefined && speed !== undefined) {
    const shapes = shapesAtSpeedAndTime(way.level, way.rise, speed, after);
    const falling = shapes.filter((shape) => shape.sag > 0);
    if (falling.length > 0) return passageByTime(branchOf(falling, request), after);
    const least = (way.rise < 0 ? way.level : Math.sqrt(way.level * way.level + way.rise * way.rise)) / after;
    throw new RequestError(
      shapes.length > 0 ? ["gravity"] : pathOf("speed"),
      `at ${speed} m/s the mark is not reached in ${after} s under any gravity`,
      `needs more than ${shown(least)} m/s (arc.speed) or a longer time (arrive.after)`,
    );
  }
  const { shape, path } = shapeOf(request, way);
  if (!(shape.sag > 0)) throw tooFlat(request, way, ["gravity"], path);
  return after !== undefined ? passageByTime(shape, after) : passageBySpeed(shape, way.level, speed!);
}

/** What elevation, apex or the point on the way says, and the path of that condition. */
function shapeOf(request: ArcRequest, way: Way): { shape: Shape; path: readonly string[] } {
  const { apex, elevation, through } = request;
  if (apex !== undefined) return { shape: shapeToMarkByApex(apex, request, way), path: pathOf("apex") };
  if (elevation !== undefined) {
    const path = pathOf("elevation");
    if (way.level === 0)
      throw new RequestError(
        path,
        "a throw straight up or down has only one elevation, which does not fix it",
        "give another condition",
      );
    if (Math.abs(elevation) === 90)
      throw new RequestError(
        path,
        `a launch at ${elevation}° does not reach a mark ${shown(way.level)} m ahead`,
        lineOfSight(way),
      );
    const slope = sinDegrees(elevation) / cosDegrees(elevation);
    return { shape: shapeBySlope(way.level, way.rise, slope), path };
  }
  return {
    shape: shapeByPoint(way.rise, shareOf(through!, request, way), heightOf(through!, request, way)),
    path: pathOf("through"),
  };
}

function shapeToMarkByApex(apex: number, request: ArcRequest, way: Way): Shape {
  // A mark exactly as high as the apex differs from it by the rounding of the difference of its places.
  const rounding = 4 * Number.EPSILON * (length(request.from) + length(request.to!));
  if (apex < way.rise - rounding)
    throw new RequestError(
      pathOf("apex"),
      `an apex of ${apex} m is below the mark`,
      `needs at least ${atLeast(way.rise)} m, the mark's height above the release`,
    );
  const shape = shapeByApex(way.rise, Math.max(apex, way.rise), true);
  if (shape.sag > 0) return shape;
  throw new RequestError(
    pathOf("apex"),
    `an apex of ${apex} m leaves no time for the flight to a mark as high as the release`,
    "needs to be more than 0 m",
  );
}

/** How far along the level way the point is abreast, 0 to 1. */
function shareOf(through: Vec3, request: ArcRequest, way: Way): number {
  const path = pathOf("through");
  if (way.level === 0)
    throw new RequestError(
      path,
      "a throw straight up or down is never abreast of a point",
      "give another condition",
    );
  const s = dot(way.ahead, subtract(through, request.from)) / way.level;
  if (s > 0 && s < 1) return s;
  throw new RequestError(
    path,
    `the point is abreast ${shown(s * way.level)} m ahead of the release, not between it and the mark`,
    `needs a point more than 0 m and less than ${shown(way.level)} m ahead`,
  );
}

const heightOf = (through: Vec3, request: ArcRequest, way: Way): number =>
  dot(way.up, subtract(through, request.from));

/** An arc that would have to fall upwards: the launch does not lie above the line of sight. */
function tooFlat(
  request: ArcRequest,
  way: Way,
  path: readonly string[],
  cause: readonly string[],
): RequestError {
  const key = cause.join(".");
  const fault =
    path === cause ? "the arc would have to bend upwards" : `${key} would need a gravity of 0 or less`;
  if (request.elevation !== undefined)
    return new RequestError(path, `at ${request.elevation}° ${fault}`, lineOfSight(way));
  if (request.through !== undefined) {
    const s = shareOf(request.through, request, way);
    const straight = dot(way.up, request.from) + s * way.rise;
    return new RequestError(
      path,
      `at a height of ${shown(dot(way.up, request.through))} m ${fault}`,
      `needs a height above that of the straight line there (${key} higher than ${shown(straight)} m)`,
    );
  }
  return new RequestError(path, fault, `needs more than ${shown(Math.max(0, way.rise))} m (${key})`);
}

function lineOfSight(way: Way): string {
  const degrees = (atan2(way.rise, way.level) * 180) / Math.PI;
  return `needs to be steeper than ${shown(degrees)}° and below 90° (arc.elevation), the mark's own direction`;
}

const branchOf = <T>(lowFirst: readonly T[], request: ArcRequest): T =>
  lowFirst[request.branch === "high" ? lowFirst.length - 1 : 0];
