/** `limits`: bounds that a take holds over its whole continuous flight. */

import type { Arc } from "../flight/arc.js";
import type { FlyingBody } from "../flight/clearance.js";
import { type Box, keepsOutOf, keepsTo } from "../flight/clearance-limits.js";
import { greatestRate } from "../flight/greatest-rate.js";
import { shareAbout } from "../flight/share-about.js";
import { turnsAboutMomentum } from "../flight/turns.js";
import { fromAxisAngle } from "../math/quat.js";
import { add, addScaled, length, scale, subtract, type Vec3 } from "../math/vec3.js";
import type { Limits } from "../throwfile/types.js";
import type { Conversion } from "./host.js";

const UP: Vec3 = [0, 1, 0];

/** What rounding may add to a number that just meets its bound, as a share of it or of 1. */
const ROUNDING = 1e-11;

/** By how much more than rounding a place may be beyond its bound, m. */
const HEIGHT = 1e-9;

/** A take that is left out: none of its candidates holds the throw's limits. */
export class UnheldLimits extends Error {
  override name = "UnheldLimits";

  constructor(
    readonly take: number,
    /** Candidates tried, and how many of them had no flight. */
    readonly tried: number,
    readonly flightless: number,
    /** By the limit's key, such as `limits.clear.0`: how many candidates broke it. */
    readonly broken: ReadonlyMap<string, number>,
  ) {
    const counts = [...broken].map(([key, count]) => `${key} in ${count}`);
    const none = flightless > 0 ? `; ${flightless} had no flight` : "";
    super(
      `${tried === 1 ? "its one candidate does not hold" : `none of ${tried} candidates holds`} the limits (broken: ${counts.join(", ")}${none})`,
    );
  }
}

/**
 * Keys of the limits that a flight breaks, in the order of the grammar: places by more than 5e-10 m, numbers by more than rounding. None that it holds.
 *
 * @param axis unit vector in the principal frame that `share` is about
 * @param host from the throw file's numbers to the world's
 */
export function brokenLimits(limits: Limits, body: FlyingBody, axis: () => Vec3, host: Conversion): string[] {
  const { flight } = body;
  const broken: string[] = [];
  const check = (key: string, holds: boolean): void => {
    if (!holds) broken.push(`limits.${key}`);
  };
  const { minHeight, maxHeight, clear, speed, rate, turns, share } = limits;
  if (minHeight !== undefined)
    check("minHeight", keepsTo(body, { normal: UP, offset: host.length(minHeight) }));
  if (maxHeight !== undefined)
    check("maxHeight", keepsTo(body, { normal: [0, -1, 0], offset: -host.length(maxHeight) }));
  clear.forEach((box, i) => {
    check(`clear.${i}`, keepsOutOf(body, worldBox(box, host)));
  });
  if (speed !== undefined) check("speed", atMost(greatestSpeed(body), host.length(speed)));
  if (rate !== undefined) check("rate", atMost(greatestRate(flight) / (2 * Math.PI), rate));
  if (turns !== undefined) {
    const made = turnsAboutMomentum(flight);
    check("turns", atMost(turns[0], made) && atMost(made, turns[1]));
  }
  if (share !== undefined) check("share", atMost(share, shareAbout(flight, axis()) ?? 1));
  return broken;
}

/**
 * Keys of the limits that no turning can save a flight of the centre of mass from breaking: it lies within the prop's hull, so that the prop passes
 * a height where it does.
 *
 * @param from place of the centre of mass at release
 */
export function brokenByArc(limits: Limits, from: Vec3, arc: Arc, host: Conversion): string[] {
  const { minHeight, maxHeight, speed } = limits;
  const end = from[1] + arc.duration * (arc.velocity[1] + (arc.duration * arc.gravity[1]) / 2);
  const lowest = Math.min(from[1], end);
  const highest = Math.max(from[1] + arc.apex.rise, end);
  const fastest = Math.max(length(arc.velocity), length(addScaled(arc.velocity, arc.gravity, arc.duration)));
  return [
    ...(minHeight !== undefined && lowest < host.length(minHeight) - HEIGHT ? ["limits.minHeight"] : []),
    ...(maxHeight !== undefined && highest > host.length(maxHeight) + HEIGHT ? ["limits.maxHeight"] : []),
    ...(speed !== undefined && !atMost(fastest, host.length(speed)) ? ["limits.speed"] : []),
  ];
}

const atMost = (value: number, bound: number): boolean => value <= bound + ROUNDING * Math.max(1, bound);

/** Of the centre of mass, m/s: in uniform gravity the square of the speed is a parabola of the time that opens upwards. */
const greatestSpeed = ({ flight }: FlyingBody): number =>
  Math.max(length(flight.velocity(0)), length(flight.velocity(flight.duration)));

/** Turned about glTF's +Y through its own middle. */
/** World frame. */
export function worldBox({ box, turn }: Limits["clear"][number], host: Conversion): Box {
  const [a, b] = box.map((corner) => host.vector(corner));
  const across = scale(subtract(b, a), 0.5);
  return {
    center: scale(add(a, b), 0.5),
    half: [Math.abs(across[0]), Math.abs(across[1]), Math.abs(across[2])],
    rotation: fromAxisAngle(UP, (turn * Math.PI) / 180),
  };
}
