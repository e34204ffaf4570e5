/** Which conditions a request has: too few, too many or meaningless numbers are found here, before anything is solved. */

import { RequestError } from "../math/request-error.js";
import type { ArcRequest } from "./arc.js";

const PATHS = {
  after: ["arrive", "after"],
  apex: ["arc", "apex"],
  through: ["arc", "through"],
  speed: ["arc", "speed"],
  elevation: ["arc", "elevation"],
  heading: ["arc", "heading"],
  velocity: ["release", "velocity"],
} as const;

export type Condition = keyof typeof PATHS;

/** The throw file's path of a condition. */
export const pathOf = (condition: Condition): readonly string[] => PATHS[condition];

const dotted = (conditions: readonly Condition[]): string =>
  conditions.map((c) => PATHS[c].join(".")).join(", ");

/** The conditions of these names that the request states, in this order. */
export const given = (request: ArcRequest, names: readonly Condition[]): Condition[] =>
  names.filter((name) => request[name] !== undefined);

/** @throws RequestError */
export function checkRequest(request: ArcRequest): void {
  checkNumbers(request);
  if (request.to !== undefined) checkMark(request);
  else checkLaunch(request);
}

function checkMark(request: ArcRequest): void {
  const launch = given(request, ["velocity", "heading"]);
  if (launch.length > 0)
    throw tooMany(launch, `arrive.at and ${dotted(launch)} are given`, `arrive.at or ${dotted(launch)}`);
  const one = given(request, ["after", "apex", "through", "speed", "elevation"]);
  const free = "free" in request.gravity;
  const wanted = free ? 2 : 1;
  const rule = free
    ? "two of arrive.after, arc.apex, arc.through, arc.speed, arc.elevation, one at least after or speed"
    : "one of arrive.after, arc.apex, arc.through, arc.speed, arc.elevation";
  if (one.length > wanted)
    throw tooMany(one, `${dotted(one)} are given, one too many to fix the flight`, `all but ${wanted}`);
  if (one.length < wanted)
    throw new RequestError(
      [],
      `${one.length ? `${dotted(one)} alone does` : "arrive.at alone does"} not fix the flight`,
      `give ${rule}`,
    );
  if (free && !one.includes("after") && !one.includes("speed"))
    throw new RequestError(
      ["gravity"],
      `${dotted(one)} say the same at every gravity`,
      "one of the two has to be arrive.after or arc.speed",
    );
}

function checkLaunch(request: ArcRequest): void {
  const free = "free" in request.gravity;
  if ((request.after === undefined) === !request.openEnd)
    throw new RequestError(
      request.openEnd ? ["arrive", "after"] : [],
      request.openEnd ? "arrive.after and arrive.floor both end the flight" : "nothing ends the flight",
      request.openEnd ? "drop one of them" : "give arrive.at, arrive.after or arrive.floor",
    );
  const parts = given(request, ["speed", "elevation", "apex", "through"]);
  if (request.velocity !== undefined) {
    const extra = free ? parts.filter((p) => p === "speed" || p === "elevation") : parts;
    if (request.heading !== undefined) extra.push("heading");
    if (extra.length > 0)
      throw tooMany(
        extra,
        `release.velocity and ${dotted(extra)} are given`,
        `release.velocity or ${dotted(extra)}`,
      );
    if (free) checkFree(parts, 0);
    return;
  }
  if (request.heading === undefined)
    throw new RequestError(
      [],
      "neither a mark nor a launch is given",
      "give arrive.at, release.velocity, or arc.heading and two of arc.speed, arc.elevation, arc.apex, arc.through",
    );
  if (free) checkFree(parts, 2);
  else if (parts.length > 2)
    throw tooMany(parts, `${dotted(parts)} are given, too many to fix the launch`, "all but two");
  if (parts.length < 2)
    throw new RequestError(
      ["arc"],
      `arc.heading${parts.map((p) => ` and arc.${p}`).join("")} alone does not fix the launch`,
      "give two of arc.speed, arc.elevation, arc.apex, arc.through",
    );
}

/** A free gravity takes one condition beyond those of the launch, and it has to be `apex` or `through`. */
function checkFree(parts: readonly Condition[], launch: number): void {
  if (parts.length > launch + 1)
    throw tooMany(
      parts,
      `${dotted(parts)} are given, too many even with gravity free`,
      `all but ${launch + 1}`,
    );
  if (parts.length < launch + 1)
    throw new RequestError(
      ["gravity"],
      "a free gravity needs one condition more than a given one",
      "give arc.apex or arc.through as well",
    );
}

function tooMany(conditions: readonly Condition[], fault: string, keep: string): RequestError {
  return new RequestError(PATHS[conditions[conditions.length - 1]], fault, `keep ${keep}, drop the rest`);
}

function checkNumbers(request: ArcRequest): void {
  const { after, apex, speed, elevation, heading } = request;
  if (after !== undefined && !(after > 0 && after < Number.POSITIVE_INFINITY))
    throw new RequestError(PATHS.after, `a flight time of ${after} s`, "needs to be more than 0 s");
  if (apex !== undefined && !(apex >= 0 && apex < Number.POSITIVE_INFINITY))
    throw new RequestError(
      PATHS.apex,
      `an apex of ${apex} m`,
      "is how far the centre of mass rises above its place at release: 0 m or more",
    );
  if (elevation !== undefined && !(Math.abs(elevation) <= 90))
    throw new RequestError(
      PATHS.elevation,
      `an elevation of ${elevation}°`,
      "is between -90° and 90° above level",
    );
  if (
    speed !== undefined &&
    !(speed >= 0 && speed < Number.POSITIVE_INFINITY && (speed > 0 || request.to === undefined))
  )
    throw new RequestError(PATHS.speed, `a speed of ${speed} m/s`, "needs to be more than 0 m/s");
  if (heading !== undefined && !Number.isFinite(heading))
    throw new RequestError(PATHS.heading, `a heading of ${heading}°`, "is a number of degrees");
}
