/** A take as sheets tell it: one stretch for each flight, with all that is known of it. */

import type { FlownPart, Motion } from "../bake/take-motion.js";
import { type Flight, fly } from "../flight/flight.js";
import { turnsAboutMomentum } from "../flight/turns.js";
import { angleBetween } from "../math/quat.js";
import { distance, type Vec3 } from "../math/vec3.js";
import type { SheetFlight, SheetTake } from "./sheet-input.js";

/** Times in s within the clip, turns counted from the clip's start. */
export interface Stretch {
  /** Of the throw; a clip of others has none. */
  name?: string;
  from: number;
  to: number;
  part?: FlownPart;
  flight?: Flight;
  /** The centre of mass moves. */
  travels: boolean;
  turnsAt(t: number): number;
  /** Of this stretch alone. */
  turns: number;
}

/** At least one. */
export function stretchesOf(sheetTake: SheetTake): Stretch[] {
  const { take } = sheetTake;
  if (!take) return seenStretches(sheetTake);
  let before = 0;
  return take.parts.map((part) => {
    const flight = fly(part.launch);
    const own = turnsAboutMomentum(flight);
    const start = before;
    before += own;
    const { duration } = flight;
    const share = (t: number) => (duration === 0 ? 0 : Math.max(0, Math.min(1, (t - part.start) / duration)));
    return {
      name: part.throw,
      from: part.start,
      to: part.start + duration,
      part,
      flight,
      travels: !part.turnsAlone,
      // a free body turns about its angular momentum evenly
      turnsAt: (t) => start + own * share(t),
      turns: own,
    };
  });
}

/** Nothing is known but the motion, and perhaps when it flies. */
function seenStretches({ motion, turns, flights }: SheetTake): Stretch[] {
  let before = 0;
  return (flights ?? [{ from: 0, to: motion.duration }]).map((flight, _, all) => {
    const stretch = seenStretch(motion, flight, before, all.length === 1 ? turns : undefined);
    before += stretch.turns;
    return stretch;
  });
}

/** Steps over which the turning of a clip is added up: fine enough for many turns. */
const STEPS = 2048;

/** Turns are the angle turned through, scaled to the count where one is given. */
function seenStretch(
  motion: Motion,
  { name, from, to }: SheetFlight,
  before: number,
  turns?: number,
): Stretch {
  const duration = to - from;
  const sums = new Float64Array(STEPS + 1);
  let last = motion.rotation(from);
  let size = 0;
  const first = motion.centerOfMass(from);
  for (let i = 1; i <= STEPS; i++) {
    const t = from + (duration * i) / STEPS;
    const now = motion.rotation(t);
    sums[i] = sums[i - 1] + angleBetween(last, now) / (2 * Math.PI);
    last = now;
    size = Math.max(size, distance(first, motion.centerOfMass(t)));
  }
  const whole = turns ?? sums[STEPS];
  const factor = sums[STEPS] === 0 ? 0 : whole / sums[STEPS];
  const turnsAt = (t: number): number => {
    if (duration === 0) return before;
    const place = Math.max(0, Math.min(STEPS, ((t - from) / duration) * STEPS));
    const i = Math.min(STEPS - 1, Math.floor(place));
    return before + factor * (sums[i] + (place - i) * (sums[i + 1] - sums[i]));
  };
  return { name, from, to, travels: size > 1e-6, turnsAt, turns: whole };
}

/** Places of the centre of mass at even steps, ends included. */
export const pathOf = (motion: Motion, { from, to }: Pick<Stretch, "from" | "to">, steps: number): Vec3[] =>
  Array.from({ length: steps + 1 }, (_, i) => motion.centerOfMass(from + ((to - from) * i) / steps));
