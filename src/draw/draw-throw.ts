import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import type { DrawableNumber, Facing, FacingPair, KeyPath, ThrowEntry } from "../throwfile/types.js";
import type { Features } from "./distance.js";
import type { DrawnArrivalFacing, DrawnFacing, DrawnPair, DrawnScatter, DrawnThrow } from "./drawn-throw.js";
import { Draws } from "./draws.js";

/** Whose draws are meant. */
export interface DrawContext {
  seed: string;
  throwName: string;
  /** From 1. */
  take: number;
  /** From 1. */
  candidate: number;
  /**
   * Whether a spin without a stated `wobble` wobbles (an axis near the middle one of a body with three unlike moments does): only then is
   * an undecided `phase` recorded and compared. Default: unless the axis is stated as `long` or `short`.
   */
  wobblesByDefault?: boolean;
}

/**
 * One candidate of one take of a throw, every spread drawn, and all that is left to chance: scatter, `any`, an undecided phase, the face to rest
 * on. Each draw has a stream of its own, so that no draw depends on what else the throw states.
 */
export function drawThrow(entry: ThrowEntry, context: DrawContext): DrawnThrow {
  return drawCandidate(entry, context).drawn;
}

/** The same, with what the candidate is compared by. */
export function drawCandidate(
  entry: ThrowEntry,
  context: DrawContext,
): { drawn: DrawnThrow; features: Features } {
  const { seed, throwName, take, candidate } = context;
  const draws = new Draws({ seed, throwName, take, candidate });
  const { gravity, release, arrive, arc, hold } = entry;
  const drawnGravity = gravity === "free" ? gravity : draws.number(["gravity"], gravity);
  const drawnRelease = {
    at: draws.vector(["release", "at"], release.at),
    point: draws.word(["release", "point"], release.point),
    facing: drawFacing(draws, ["release", "facing"], release.facing) as DrawnFacing | undefined,
    scatter: drawScatter(draws, ["release", "scatter"], release.scatter),
    velocity: draws.vector(["release", "velocity"], release.velocity),
    angularVelocity: draws.vector(["release", "angularVelocity"], release.angularVelocity),
  };
  const drawn: DrawnThrow = {
    name: entry.name,
    prop: entry.prop,
    gravity: drawnGravity,
    release: drawnRelease,
    arrive: {
      at: draws.vector(["arrive", "at"], arrive.at),
      point: arrive.point === undefined ? drawnRelease.point : draws.word(["arrive", "point"], arrive.point),
      after: draws.number(["arrive", "after"], arrive.after),
      facing: drawFacing(draws, ["arrive", "facing"], arrive.facing),
      scatter: drawScatter(draws, ["arrive", "scatter"], arrive.scatter),
      floor: draws.number(["arrive", "floor"], arrive.floor),
    },
    arc: {
      apex: draws.number(["arc", "apex"], arc.apex),
      through: draws.vector(["arc", "through"], arc.through),
      speed: draws.number(["arc", "speed"], arc.speed),
      elevation: draws.number(["arc", "elevation"], arc.elevation),
      heading: draws.number(["arc", "heading"], arc.heading),
      branch: draws.word(["arc", "branch"], arc.branch),
    },
    spin: entry.spin && drawSpin(draws, entry, entry.spin, context),
    limits: entry.limits,
    hold: {
      before: draws.number(["hold", "before"], hold.before),
      after: draws.number(["hold", "after"], hold.after),
    },
    draws: draws.record,
  };
  return { drawn, features: draws.features };
}

function drawSpin(
  draws: Draws,
  entry: ThrowEntry,
  spin: NonNullable<ThrowEntry["spin"]>,
  context: DrawContext,
): DrawnThrow["spin"] {
  const solved = entry.arrive.facing !== undefined;
  const axis =
    spin.axis === undefined
      ? undefined
      : draws.choice(["spin", "axis"], spin.axis, (item, path) => {
          if (item !== "any") return typeof item === "string" ? item : draws.numbers<Vec3>(path, item);
          return solved ? undefined : draws.direction(path);
        });
  const turns = draws.number(["spin", "turns"], spin.turns);
  const rate = draws.number(["spin", "rate"], spin.rate);
  const wobble = draws.number(["spin", "wobble"], spin.wobble);
  const wobbles =
    !solved &&
    (wobble === undefined
      ? (context.wobblesByDefault ?? !/^-?(long|short)$/.test(String(spin.axis)))
      : spin.wobble !== 0);
  const path = ["spin", "phase"];
  const phase = spin.phase === undefined ? draws.phase(path, wobbles) : draws.number(path, spin.phase);
  return { axis, turns, rate, wobble, phase };
}

function drawFacing(
  draws: Draws,
  at: KeyPath,
  facing: ThrowEntry["arrive"]["facing"],
): DrawnArrivalFacing | undefined {
  if (facing === undefined) return undefined;
  return draws.choice(at, facing, (item: Facing, path): DrawnArrivalFacing => {
    if (item === "any") return { orientation: draws.orientation(path) };
    if (item === "rest") return { rest: draws.share([...path, "rest"]) };
    if (item === "release") return item;
    if (isPairs(item))
      return item.map((pair, i) => drawPair(draws, [...path, i], pair)) as unknown as DrawnFacing;
    const rotation = draws.numbers<Quat>([...path, "rotation"], item.rotation);
    return item.point === undefined
      ? { rotation }
      : { rotation, point: draws.word([...path, "point"], item.point) };
  });
}

const isPairs = (
  facing: Exclude<Facing, string>,
): facing is readonly [FacingPair] | readonly [FacingPair, FacingPair] => Array.isArray(facing);

function drawPair(draws: Draws, at: KeyPath, pair: FacingPair): DrawnPair {
  const side = (i: 0 | 1) =>
    draws.choice([...at, i], pair[i], (item, path) =>
      typeof item === "string" ? item : draws.numbers<Vec3>(path, item),
    );
  return [side(0), side(1)] as DrawnPair;
}

function drawScatter(
  draws: Draws,
  path: KeyPath,
  value: DrawableNumber | undefined,
): DrawnScatter | undefined {
  if (value === undefined || value === 0) return undefined;
  return { angle: draws.number(path, value), axis: draws.direction([...path, "axis"]) };
}
