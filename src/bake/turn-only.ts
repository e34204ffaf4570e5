/** `layout: turn-only` where nothing says where the prop flies: it turns in place. */

import { type ArrivalWish, solveArrival } from "../aim/arrival.js";
import { type LaunchWish, solveLaunch } from "../aim/launch.js";
import type { DrawnThrow } from "../draw/drawn-throw.js";
import { fly } from "../flight/flight.js";
import { ZERO } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { ThrowFile } from "../throwfile/types.js";

/** Whether a throw states its time alone. */
export function turnsAlone({ bake }: ThrowFile, { release, arrive, arc }: DrawnThrow): boolean {
  const { branch: _, ...conditions } = arc;
  const places = [arrive.at, arrive.floor, release.velocity, ...Object.values(conditions)];
  return bake.layout === "turn-only" && places.every((place) => place === undefined);
}

/** The wish's turning about a centre of mass that rests. */
export function flyInPlace(wish: LaunchWish | ArrivalWish, { principal }: Prop) {
  const { from, after } = wish.arc;
  const still = { from, after, gravity: ZERO, heading: 0, elevation: 0, speed: 0 };
  if ("facing" in wish) {
    const inPlace = { ...wish, arc: still };
    const aimed = solveArrival(inPlace, principal);
    return { wish: inPlace, aimed, flight: fly(aimed.launch) };
  }
  const inPlace = { ...wish, arc: still };
  const aimed = solveLaunch(inPlace, principal);
  return { wish: inPlace, aimed, flight: fly(aimed.launch) };
}
