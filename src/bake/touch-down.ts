/** `arrive.floor`: the flight that a first touch ends. */

import type { AimedLaunch, LaunchWish } from "../aim/launch.js";
import { endArc } from "../flight/arc-end.js";
import { atMost } from "../flight/arc-message.js";
import { type FlyingBody, lookAt } from "../flight/clearance.js";
import { fly } from "../flight/flight.js";
import type { Launch } from "../flight/launch.js";
import { firstTouch } from "../flight/touch.js";
import { RequestError } from "../math/request-error.js";
import { quadraticRoots } from "../math/roots.js";
import { length, type Vec3 } from "../math/vec3.js";
import type { Conversion } from "./host.js";

const UP: Vec3 = [0, 1, 0];
const FLOOR = ["arrive", "floor"];

/** Turns that a prop which neither falls nor rises gets to touch with. */
const LEVEL_TURNS = 100;

/**
 * Ends an open launch where any part of the prop first touches the floor.
 *
 * @param body the prop, without its flight
 * @param floor its height in the throw file's numbers
 * @param host from these to the world's
 * @throws RequestError where it never does
 */
export function touchDown(
  open: AimedLaunch,
  wish: LaunchWish,
  body: Omit<FlyingBody, "flight">,
  floor: number,
  host: Conversion,
): AimedLaunch {
  const side = { normal: UP, offset: host.length(floor) };
  const horizon = latestTouch(open.launch, side.offset, body.reach);
  const flying = { ...body, flight: fly({ ...open.launch, duration: horizon ?? 0 }) };
  const duration = horizon === undefined ? undefined : firstTouch(flying, side);
  if (duration === undefined) throw neverTouches(open.launch, floor, lookAt(flying, side, 0).gap, host);
  const request = { ...wish.arc, from: open.launch.centerOfMass };
  return { arc: endArc(request, open.arc, duration), launch: { ...open.launch, duration } };
}

/** m above the floor at the end of a flight, and less than nothing below it. */
export const gapAtArrival = (body: FlyingBody, height: number): number =>
  lookAt(body, { normal: UP, offset: height }, body.flight.duration).gap;

/** A time, s, by which the prop has touched if it ever does: when its centre of mass is a reach below the floor, or out of reach above it. */
function latestTouch({ centerOfMass, velocity, gravity, spin }: Launch, height: number, reach: number) {
  const pull = gravity[1];
  const rise = velocity[1];
  const over = centerOfMass[1] - height;
  if (pull === 0 && rise === 0) {
    if (Math.abs(over) > reach || length(spin) === 0) return undefined;
    return (LEVEL_TURNS * 2 * Math.PI) / length(spin);
  }
  const below = pull === 0 && rise > 0 ? over - reach : over + reach;
  const last = quadraticRoots(0.5 * pull, rise, below).at(-1);
  // a nanosecond more than rounding can take away
  return last !== undefined && last > 0 ? last + 1e-9 : undefined;
}

function neverTouches(
  { gravity, velocity }: Launch,
  floor: number,
  gap: number,
  host: Conversion,
): RequestError {
  const fault = `no part of the prop comes down to a floor at ${floor}`;
  if (gap > 0 && gravity[1] === 0)
    return new RequestError(
      FLOOR,
      `${fault} without gravity`,
      velocity[1] < 0
        ? "give arrive.after"
        : "give a gravity, a launch that goes down, or arrive.after instead",
    );
  const lowest = (host.length(floor) + gap) / host.length(1);
  return new RequestError(
    FLOOR,
    `${fault}: it is released at or below it and never rises wholly above`,
    `needs a floor below ${atMost(lowest)}, where the prop's lowest part is at release, or a launch that rises higher`,
  );
}
