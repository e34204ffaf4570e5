/** A drawn throw in the words of the solver: host numbers become glTF's, names become directions, angles become poses. */

import type { ArrivalFacing, ArrivalWish } from "../aim/arrival.js";
import { type DirectionPair, facingRotation } from "../aim/facing.js";
import type { LaunchWish } from "../aim/launch.js";
import { defaultWobble, spinAtRelease } from "../aim/spin.js";
import { type ThrowCourse, UP, WORLD_DIRECTIONS, worldDirection } from "../aim/world-directions.js";
import type {
  DrawnArrivalFacing,
  DrawnFacing,
  DrawnPair,
  DrawnScatter,
  DrawnThrow,
} from "../draw/drawn-throw.js";
import { cosDegrees, sinDegrees } from "../math/degrees.js";
import {
  conjugate,
  fromAxisAngle,
  IDENTITY,
  multiply,
  normalize,
  type Quat,
  rotate,
  rotateBack,
} from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { negate, normalize as normalizeVector, subtract, type Vec3, ZERO } from "../math/vec3.js";
import { propDirection } from "../prop/directions.js";
import type { Prop } from "../prop/prop.js";
import { type RestingFace, restingFaces } from "../prop/rest.js";
import type { Shape } from "../prop/shape-kind.js";
import type { ThrowEntry } from "../throwfile/types.js";
import type { Conversion } from "./host.js";

/**
 * A throw whose spin is stated.
 *
 * @param gravity m/s², where the throw states none of its own
 * @param host from the throw file's numbers to glTF's
 */
export function launchWish(drawn: DrawnThrow, prop: Prop, gravity: number, host: Conversion): LaunchWish {
  return { ...conditions(drawn, prop, gravity, host), spin: spinOf(drawn, prop, host) };
}

/** A throw with an `arrive.facing`, whose spin is solved; parameters as above, and the shape that the prop was weighed from, where it was one. */
export function arrivalWish(
  drawn: DrawnThrow,
  facing: DrawnArrivalFacing,
  prop: Prop,
  gravity: number,
  host: Conversion,
  shape?: Shape,
): ArrivalWish {
  return {
    ...conditions(drawn, prop, gravity, host),
    facing: arrivalFacing(facing, drawn.arrive.scatter, prop, host, shape),
    usesTravelAtEnd: namesFlight(facing),
    turning: turningOf(drawn, prop),
  };
}

/** What the two have in common. */
function conditions(
  drawn: DrawnThrow,
  prop: Prop,
  gravity: number,
  host: Conversion,
): Omit<LaunchWish, "spin"> {
  const { release, arrive, arc } = drawn;
  const releasePoint = pointOf(prop, release.point);
  const from = release.at ? host.vector(release.at) : releasePoint;
  const to = arrive.at && host.vector(arrive.at);
  const velocity = release.velocity && host.vector(release.velocity);
  const strength = drawn.gravity === undefined ? gravity : drawn.gravity;
  return {
    arc: {
      from,
      to,
      velocity,
      gravity:
        strength === "free"
          ? { free: UP }
          : [0, drawn.gravity === undefined ? -strength : -host.length(strength), 0],
      after: arrive.after,
      openEnd: arrive.floor !== undefined,
      apex: arc.apex === undefined ? undefined : host.length(arc.apex),
      through: arc.through && host.vector(arc.through),
      speed: arc.speed === undefined ? undefined : host.length(arc.speed),
      elevation: arc.elevation,
      heading: arc.heading,
      branch: arc.branch,
    },
    releaseOffset: subtract(releasePoint, prop.centerOfMass),
    arrivalOffset: subtract(pointOf(prop, arrive.point ?? release.point), prop.centerOfMass),
    pose: scattered(release.scatter, facingOf(release.facing, prop, host, "release")),
    usesTravel: namesFlight(release.facing) || drawn.spin?.axis === "flight",
    ahead: to ? subtract(to, from) : arc.heading === undefined ? velocity : headingDirection(arc.heading),
  };
}

const headingDirection = (heading: number): Vec3 => [sinDegrees(heading), 0, cosDegrees(heading)];

const pointOf = (prop: Prop, name: string): Vec3 =>
  name === "centerOfMass" ? prop.centerOfMass : prop.points[name].position;

const namesFlight = (facing: DrawnArrivalFacing | undefined): boolean =>
  Array.isArray(facing) && facing.some(([, world]) => world === "flight");

const scattering = (scatter: DrawnScatter | undefined): Quat =>
  scatter ? fromAxisAngle(scatter.axis, (scatter.angle * Math.PI) / 180) : IDENTITY;

type Pose = (course: ThrowCourse) => Quat;

function scattered(scatter: DrawnScatter | undefined, pose: Pose): Pose {
  const turn = scattering(scatter);
  return (course) => multiply(turn, pose(course));
}

function arrivalFacing(
  facing: DrawnArrivalFacing,
  scatter: DrawnScatter | undefined,
  prop: Prop,
  host: Conversion,
  shape?: Shape,
): ArrivalFacing {
  const turn = scattering(scatter);
  if (facing === "release") return { kind: "pose", pose: (_, release) => multiply(turn, release) };
  if ("rest" in facing) {
    const direction = restingSide(prop, shape, facing.rest);
    return { kind: "direction", direction, target: () => DOWN };
  }
  const pairs = Array.isArray(facing) ? (facing as readonly DrawnPair[]) : [];
  if (pairs.length !== 1)
    return { kind: "pose", pose: scattered(scatter, facingOf(facing, prop, host, "arrive")) };
  const pair = (course: ThrowCourse) => directionPair(pairs[0], prop, host, course, ["arrive", "facing", 0]);
  return {
    kind: "direction",
    direction: within(["arrive", "facing", 0], () => propDirection(prop, pairs[0][0])),
    target: (course) => rotate(turn, pair(course).world),
  };
}

const DOWN = negate(UP);

/** A prop's hull is looked at once. */
const resting = new WeakMap<Prop, readonly RestingFace[]>();

/** The side that a draw from 0 to 1 falls on, each as likely as the prop comes to rest on it. */
function restingSide(prop: Prop, shape: Shape | undefined, draw: number): Vec3 {
  const faces = resting.get(prop) ?? restingFaces(prop, shape);
  resting.set(prop, faces);
  let below = 0;
  const side = faces.find(({ share }) => {
    below += share;
    return draw < below;
  });
  return (side ?? faces[faces.length - 1]).normal;
}

function facingOf(
  facing: DrawnFacing | undefined,
  prop: Prop,
  host: Conversion,
  end: "release" | "arrive",
): Pose {
  if (facing === undefined) return () => IDENTITY;
  if ("orientation" in facing) return () => facing.orientation;
  if ("rotation" in facing) {
    const wanted = host.rotation(normalize(facing.rotation));
    const rotation = facing.point ? multiply(wanted, conjugate(prop.points[facing.point].rotation)) : wanted;
    return () => rotation;
  }
  return (course) => {
    const pairs = facing.map((pair, i) => directionPair(pair, prop, host, course, [end, "facing", i]));
    return facingRotation(pairs[0], pairs[1]);
  };
}

const directionPair = (
  [own, world]: DrawnPair,
  prop: Prop,
  host: Conversion,
  course: ThrowCourse,
  path: readonly (string | number)[],
): DirectionPair =>
  within(path, () => ({
    prop: propDirection(prop, own),
    world: worldDirection(typeof world === "string" ? world : host.vector(world), course),
  }));

function spinOf(drawn: DrawnThrow, prop: Prop, host: Conversion): LaunchWish["spin"] {
  const { angularVelocity } = drawn.release;
  const { axes, moments } = prop.principal;
  if (angularVelocity) {
    const world = host.angular(angularVelocity);
    return (pose) => rotateBack(multiply(pose, axes), world);
  }
  const { spin } = drawn;
  // without an arrival pose to be met, a checked throw file states the axis, and turns or rate
  if (!spin) return () => ZERO;
  return (pose, duration, course) => {
    const axis = turningAxis(drawn, prop, pose, course);
    return spinAtRelease(
      {
        axis,
        turnsPerSecond: spin.rate ?? (spin.turns as number) / duration,
        wobble: spin.wobble ?? defaultWobble(axis, moments),
        phase: spin.phase,
      },
      moments,
    );
  };
}

/** What a throw with an `arrive.facing` wishes of its turning. */
function turningOf(drawn: DrawnThrow, prop: Prop): ArrivalWish["turning"] {
  const { spin } = drawn;
  return (pose, duration, course) => ({
    turns: spin?.rate === undefined ? spin?.turns : spin.rate * duration,
    axis: spin?.axis === undefined ? undefined : turningAxis(drawn, prop, pose, course),
  });
}

/**
 * The unit vector in the principal frame that `spin.axis` names; asks for a throw that states one.
 *
 * @param pose at release
 */
export function turningAxis(drawn: DrawnThrow, prop: Prop, pose: Quat, course: ThrowCourse): Vec3 {
  const stated = drawn.spin?.axis as string | Vec3;
  const axis = within(["spin", "axis"], () => spinAxis(stated, prop, pose, course));
  return normalizeVector(rotateBack(prop.principal.axes, axis));
}

/**
 * Whether a spin of this throw that states no wobble may have one: so it is for an axis near the middle one of a body with three unlike
 * moments, and for an axis that only the draws or the pose decide.
 */
export function mayWobble(entry: ThrowEntry, prop: Prop): boolean {
  const { axes, moments } = prop.principal;
  const axis = entry.spin?.axis;
  if (defaultWobble([0, 1, 0], moments) === 0) return false;
  const isPlain = Array.isArray(axis)
    ? axis.every((component) => typeof component === "number")
    : typeof axis === "string";
  if (!isPlain || axis === "any" || isWorldWord(axis as string | Vec3)) return true;
  return defaultWobble(rotateBack(axes, propDirection(prop, axis as string | Vec3)), moments) > 0;
}

/** In the model's frame. */
function spinAxis(axis: string | Vec3, prop: Prop, pose: Quat, course: ThrowCourse): Vec3 {
  return isWorldWord(axis) ? rotateBack(pose, worldDirection(axis, course)) : propDirection(prop, axis);
}

const isWorldWord = (axis: string | Vec3): axis is string =>
  typeof axis === "string" && (WORLD_DIRECTIONS as readonly string[]).includes(axis);

/** Puts the key that was being answered in front of an error's path. */
function within<T>(path: readonly (string | number)[], answer: () => T): T {
  try {
    return answer();
  } catch (error) {
    if (error instanceof RequestError) throw error.under(...path);
    throw error;
  }
}
