/** `arrive.floor` with `arrive.facing`: what the floor is to the prop. */

import type { Landing } from "../aim/landing.js";
import type { FlyingBody } from "../flight/clearance.js";
import { fly } from "../flight/flight.js";
import type { Launch } from "../flight/launch.js";
import { firstTouch } from "../flight/touch.js";
import { rotateBack } from "../math/quat.js";
import { dot, type Vec3 } from "../math/vec3.js";

const UP: Vec3 = [0, 1, 0];

/** A touch this much before the end, s, or this deep, m, is the end's own. */
const SOONER = 1e-9;
const DEEP = 2e-12;
/** s: how far beyond its end a flight is followed for the touch that is its end. */
const BEYOND = 1e-6;

/**
 * @param body the prop, without its flight
 * @param height of the floor along +Y, m
 */
export function landingOn(body: Omit<FlyingBody, "flight">, height: number): Landing {
  return {
    height(pose) {
      const along = rotateBack(pose, UP);
      return height - dot(along, body.support.lowest(along));
    },
    earliness(launch: Launch) {
      const flight = fly({ ...launch, duration: launch.duration + BEYOND });
      const touch = firstTouch({ ...body, flight }, { normal: UP, offset: height - DEEP });
      // on it or under it from the start, and never wholly above
      if (touch === undefined) return Number.POSITIVE_INFINITY;
      const early = launch.duration - touch;
      return early > SOONER ? early : 0;
    },
  };
}
