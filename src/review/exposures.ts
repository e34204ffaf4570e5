/** The moments at which a flight is shown, and which of them its arc has room for. */

import type { Quat } from "../math/quat.js";
import { distance, type Vec3 } from "../math/vec3.js";
import type { Stretch } from "./course.js";
import type { SheetTake } from "./sheet-input.js";

export interface Exposure {
  /** From 1, over the whole sheet. */
  number: number;
  /** s within the clip. */
  t: number;
  /** Since the clip's start. */
  turns: number;
  centerOfMass: Vec3;
  /** Turns the model from as modelled. */
  rotation: Quat;
}

/** Steps that part evenly in many ways. */
const STEPS = [8, 12, 16, 20, 24, 30, 36, 42, 48] as const;
/** Enough to see which way round it goes. */
const STEPS_A_TURN = 8;

/** Equal time steps from release to arrival, both shown. */
export function exposuresOf({ motion }: SheetTake, stretch: Stretch, firstNumber = 1): Exposure[] {
  const wanted = STEPS_A_TURN * stretch.turns;
  const steps =
    stretch.to > stretch.from ? (STEPS.find((count) => count >= wanted - 0.5) ?? STEPS[STEPS.length - 1]) : 0;
  return Array.from({ length: steps + 1 }, (_, i) => {
    const t = stretch.from + ((stretch.to - stretch.from) * i) / Math.max(1, steps);
    return {
      number: firstNumber + i,
      t,
      turns: stretch.turnsAt(t),
      centerOfMass: motion.centerOfMass(t),
      rotation: motion.rotation(t),
    };
  });
}

/** Fewest steps that are still an arc. */
const LEAST_STEPS = 3;

/**
 * Every how many exposures are drawn on the arc, so that no two that are drawn are nearer than `room` (m, in the picture, as `places` are): the first
 * and the last always are. `crowded`: even the fewest are nearer.
 */
export function thinning(places: readonly Vec3[], room: number): { every: number; crowded: boolean } {
  const steps = places.length - 1;
  let fewest = 1;
  for (let every = 1; steps / every >= LEAST_STEPS; every++) {
    if (steps % every !== 0) continue;
    fewest = every;
    if (leastGap(places, every) >= room) return { every, crowded: false };
  }
  return { every: fewest, crowded: steps > 0 };
}

function leastGap(places: readonly Vec3[], every: number): number {
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i < places.length; i += every)
    for (let j = i + every; j < places.length; j += every)
      least = Math.min(least, distance([places[i][0], places[i][1], 0], [places[j][0], places[j][1], 0]));
  return least;
}
