/** The ways a prop can get from its release pose to its arrival pose, and the spin to write for each. */

import type { AimedArrival, ArrivalWish } from "../aim/arrival.js";
import { familyOf } from "../aim/families.js";
import { solveFacing } from "../aim/landing.js";
import { problemOf } from "../aim/problem.js";
import type { Way, WayWish } from "../aim/way.js";
import { allWays } from "../aim/ways.js";
import { wishFor } from "../aim/wish-for.js";
import { fly } from "../flight/flight.js";
import type { Launch } from "../flight/launch.js";
import { axisShares, turnsAboutMomentum } from "../flight/turns.js";
import { conjugate, multiply, rotate } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { cross, distance, length, negate, scale, subtract, type Vec3 } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import { throwFileError } from "../throwfile/errors.js";
import type { ThrowEntry, ThrowFile } from "../throwfile/types.js";
import type { BakeOptions } from "./bake.js";
import { type Conversion, hostFrame } from "./host.js";
import { UnheldLimits } from "./limits.js";
import { modelRotation } from "./motion.js";
import { selectTakes, throwNamed } from "./plan.js";
import { type LoadedProp, loadProps, type ModelSource } from "./props.js";
import { solveTake, type Take } from "./take.js";
import { plainAxes, rounding, type WrittenSpin, written } from "./written-spin.js";

/** One way from the release pose to the arrival pose. */
export interface ListedWay {
  turns: number;
  /** ∫|ω_a|dt/∫|ω|dt about long, middle, short. */
  share: Vec3;
  /** Of the centre of mass at release, as `arc.speed`; in the host's unit. */
  speed: number;
  /** Turns per second at release. */
  rate: number;
  /** At release, world frame of the host, rad/s. */
  angularVelocity: Vec3;
  /** Angle from what is asked for, rad. */
  miss: number;
  /** Whether it is the one that the throw file gets. */
  taken: boolean;
  /** What gets this way; empty where no `spin` is needed, null where nearer ways answer whatever could be written. */
  spin: WrittenSpin | null;
}

/** The ways of one take, and which of them it takes. */
export interface TakeWays {
  take: number;
  candidate: number;
  /** s */
  duration: number;
  /** Whether these are all ways from `leastTurns` to `mostTurns`, or some of those that bring one direction where it is asked for. */
  isEvery: boolean;
  /** Of exact solutions, to which the poses belong: the ways may come in continua, and those listed are some of them. */
  family?: string;
  leastTurns: number;
  mostTurns: number;
  ways: ListedWay[];
  warnings: string[];
  /** The take breaks the throw's limits, as all its candidates do. */
  unheld?: UnheldLimits;
}

/** How many turns more and fewer than those wished are looked through. */
const AROUND = 2;
/** By how much more or less the rivals of a way may turn. */
const RIVALS = 1;
/** Spins nearer to each other than this share are one. */
const SAME = 1e-6;
/** Ways of one direction slide into each other: nearer to each other than this share, one stands for both. */
const ALIKE = 0.02;

/**
 * The ways of a throw's takes, each list in the order of turns.
 *
 * @throws ThrowFileError for a throw that cannot be or has no `arrive.facing`, RequestError where there is no such throw or take
 */
export async function throwWays(
  file: ThrowFile,
  source: ModelSource,
  name: string,
  { takes, onTake }: Pick<BakeOptions, "takes" | "onTake"> = {},
): Promise<TakeWays[]> {
  const [{ entry, numbers }] = selectTakes([throwNamed(file, name)], takes);
  const locate = (error: unknown) =>
    error instanceof RequestError ? throwFileError(file, error.under("throws", name)) : error;
  if (entry.arrive.facing === undefined)
    throw locate(
      new RequestError(
        ["arrive"],
        "no pose to get to, so that the spin stated is the one way (found no arrive.facing)",
        "add arrive.facing",
      ),
    );
  const { prop } = (await loadProps(file, new Set([entry.prop]), source)).get(entry.prop) as LoadedProp;
  try {
    return numbers.map((number, i) => {
      const ways = takeWays(file, entry, prop, number);
      onTake?.(i + 1, numbers.length);
      return ways;
    });
  } catch (error) {
    throw locate(error);
  }
}

function takeWays(file: ThrowFile, entry: ThrowEntry, prop: Prop, number: number): TakeWays {
  const { take, unheld } = solved(file, entry, prop, number);
  const aim = aimOf(take, prop, hostFrame(file.host).fromWorld);
  const isPose = aim.wish.facing.kind === "pose";
  const named = isPose ? familyOf(problemOf(aim.aimed.turn)) : undefined;
  // a sphere's are countable: turns about one axis
  const family = named === "sphere" ? undefined : named;
  const wished = Math.abs(aim.asked.turns ?? turnsAboutMomentum(take.flight));
  const leastTurns = Math.max(0, Math.floor(wished) - AROUND);
  const mostTurns = Math.ceil(wished) + AROUND;
  const ways = isPose ? everyWay(aim, leastTurns, mostTurns) : someWays(aim, wished);
  return {
    take: number,
    candidate: take.candidate,
    duration: take.flight.duration,
    isEvery: isPose && family === undefined,
    ...(family && { family }),
    leastTurns,
    mostTurns,
    ways: ways.sort((a, b) => a.turns - b.turns),
    warnings: aim.aimed.warnings,
    ...(unheld && { unheld }),
  };
}

/** The take; where none holds the limits, the one that would be were there none. */
function solved(
  file: ThrowFile,
  entry: ThrowEntry,
  prop: Prop,
  number: number,
): { take: Take; unheld?: UnheldLimits } {
  try {
    return { take: solveTake(file, entry, prop, number) };
  } catch (error) {
    if (!(error instanceof UnheldLimits)) throw error;
    return { take: solveTake(file, { ...entry, limits: undefined }, prop, number), unheld: error };
  }
}

/** A take, taken apart into what its ways are worked out from. */
interface Aim {
  take: Take;
  wish: ArrivalWish;
  aimed: AimedArrival;
  asked: WayWish;
  prop: Prop;
  host: Conversion;
}

function aimOf(take: Take, prop: Prop, host: Conversion): Aim {
  const [wish, aimed] = [take.wish as ArrivalWish, take.aimed as AimedArrival];
  const course = { ahead: wish.ahead, travel: aimed.arc.velocity };
  const asked = wish.turning(modelRotation(take.flight, prop, 0), take.flight.duration, course);
  return { take, wish, aimed, asked, prop, host };
}

/** All ways of a pose, up to a number of turns by both measures. */
function everyWay(aim: Aim, leastTurns: number, mostTurns: number): ListedWay[] {
  const { turn, launch } = aim.aimed;
  const most = mostTurns + RIVALS;
  const rivals = allWays({
    ...turn,
    leastTurns: Math.max(0, leastTurns - RIVALS),
    mostTurns: most,
    mostTurning: most,
  });
  const others = rivals.filter(
    ({ spin, turns, turning }) =>
      turns >= leastTurns && turning <= mostTurns && !isSame(spin, launch.spin, SAME),
  );
  return [takenWay(aim), ...others.map((way) => otherWay(aim, way, rivals))];
}

function otherWay(aim: Aim, way: Way, rivals: readonly Way[]): ListedWay {
  const wish = wishFor(way, rivals, plainAxes(aim.prop), rounding(aim.prop));
  const aimed = wish && aimedAt(aim, wish);
  // what was found by ranking is believed when the solver comes to it
  if (aimed && isSame(aimed.launch.spin, way.spin, SAME))
    return listed(aim, aimed.launch, aimed.missAngle, spinFor(aim, aimed.launch, wish));
  return listed(aim, launchWith(aim, way.spin), way.miss, null);
}

/** What a wish gets; undefined where none of its ways can land on the floor in the pose asked for. */
function aimedAt({ wish, prop }: Aim, turning: WayWish): AimedArrival | undefined {
  try {
    return solveFacing({ ...wish, turning: () => turning }, prop.principal);
  } catch (error) {
    if ("landing" in wish && error instanceof RequestError) return undefined;
    throw error;
  }
}

const spinFor = ({ prop, wish }: Aim, { duration }: Launch, turning: WayWish): WrittenSpin =>
  written(prop, turning, "landing" in wish ? duration : undefined);

/** The launch with another spin: the arc stays, but for a hand off the centre of mass whose own velocity is stated. */
function launchWith({ wish, aimed, prop }: Aim, spin: Vec3): Launch {
  const { launch } = aimed;
  const hand = wish.arc.velocity;
  const arm = rotate(multiply(launch.orientation, conjugate(prop.principal.axes)), wish.releaseOffset);
  const velocity = hand ? subtract(hand, cross(rotate(launch.orientation, spin), arm)) : launch.velocity;
  return { ...launch, spin, velocity };
}

/** One direction leaves whole curves of ways: what wishes round the one in the throw file get. */
function someWays(aim: Aim, wished: number): ListedWay[] {
  const { asked, prop } = aim;
  const sign = (asked.turns ?? 0) < 0 ? -1 : 1;
  const axis = asked.axis && scale(asked.axis, sign);
  const { turns: round, axis: rounded } = rounding(prop);
  const plain = plainAxes(prop);
  const around = [wished - 0.5, wished, wished + 0.5, wished + 1].filter((turns) => turns >= 0).map(round);
  const wishes = axis
    ? [axis, negate(axis)].flatMap((a) => around.map((turns): WayWish => ({ turns, axis: rounded(a) })))
    : [...around.map((turns) => ({ turns })), ...plain.map((a) => ({ turns: round(wished), axis: a }))];
  const found: { spin: Vec3; way: ListedWay }[] = [{ spin: aim.aimed.launch.spin, way: takenWay(aim) }];
  for (const wish of wishes) {
    const aimed = aimedAt(aim, wish);
    if (!aimed) continue;
    const { launch, missAngle } = aimed;
    if (found.some(({ spin }) => isSame(spin, launch.spin, ALIKE))) continue;
    found.push({ spin: launch.spin, way: listed(aim, launch, missAngle, spinFor(aim, launch, wish)) });
  }
  return found.map(({ way }) => way);
}

/** The take itself, with the spin that stands in the throw file, as drawn. */
function takenWay(aim: Aim): ListedWay {
  const { axis, turns, rate } = aim.take.drawn.spin ?? {};
  const spin = {
    ...(axis && { axis }),
    ...(turns !== undefined && { turns }),
    ...(rate !== undefined && { rate }),
  };
  return { ...listed(aim, aim.aimed.launch, aim.aimed.missAngle, spin), taken: true };
}

function listed({ host }: Aim, launch: Launch, miss: number, spin: WrittenSpin | null): ListedWay {
  const flight = fly(launch);
  return {
    turns: turnsAboutMomentum(flight),
    share: axisShares(flight),
    speed: length(host.vector(launch.velocity)),
    rate: length(launch.spin) / (2 * Math.PI),
    angularVelocity: host.angular(flight.angularVelocity(0)),
    miss,
    taken: false,
    spin,
  };
}

const isSame = (a: Vec3, b: Vec3, share: number): boolean =>
  distance(a, b) <= share * Math.max(length(a), length(b));
