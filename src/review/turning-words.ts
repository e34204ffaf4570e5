/** What a turning is called: spin, flip, wobble, tumble, roll. */

import { cross, dot, normalize, type Vec3 } from "../math/vec3.js";
import { degrees, turnsText } from "./figures.js";
import type { AxisName, Turning } from "./picked-axis.js";

/** Cosine of the angle within which an axis of turning is upright, or square to the course, or along it. */
const NEAR = 0.8;
/** Sway below which a spin is clean, from which a wobble is a strong one, and above which the axis does not hold, rad. */
const CLEAN = (1.5 * Math.PI) / 180;
const STRONG = (30 * Math.PI) / 180;
const LOST = (60 * Math.PI) / 180;
/** Below so many turns a turning is told in degrees. */
const PART_OF_A_TURN = 0.5;

/** "spins flat, 1 turn about its short axis, with a wobble of 5°" */
export function turningPhrase(turning: Turning, turns: number, ahead: Vec3, travel?: Vec3): string {
  if (!turning.about) return "does not turn";
  const amount = turns < PART_OF_A_TURN ? degrees(2 * Math.PI * turns) : turnsText(turns);
  const axis = turning.isSpun ? ` about its ${axisName(turning.name)}` : "";
  return `${manner(turning, turning.about, ahead, travel)}, ${amount}${axis}${unsteadiness(turning)}`;
}

export const axisName = (name: AxisName): string => (name === "any" ? "axis" : `${name} axis`);

/** What the three axes are to somebody who has not met them. */
export const axisMeaning: Record<AxisName, string> = {
  long: "the one it is easiest to turn about",
  middle: "the one no throw stays steady about",
  short: "the one it is hardest to turn about",
  any: "it has no axis of its own",
};

function manner({ name, isSpun, turnsOver }: Turning, about: Vec3, ahead: Vec3, travel?: Vec3): string {
  const left = dot(about, cross([0, 1, 0], ahead));
  const way = left > 0 ? "forwards" : "backwards";
  const isAcross = Math.abs(left) > NEAR;
  const along = Math.max(Math.abs(dot(about, ahead)), travel ? Math.abs(dot(about, normalize(travel))) : 0);
  if (!isSpun) return isAcross ? `flips over and over ${way}` : "flips over and over";
  const verb = turnsOver ? "tumbles" : "spins";
  if (isAcross && name !== "long") return `${turnsOver ? "tumbles" : "turns"} end over end ${way}`;
  if (isAcross) return `rolls ${way}`;
  if (Math.abs(about[1]) > NEAR) {
    const clock = about[1] > 0 ? "anticlockwise" : "clockwise";
    return `${verb} ${name === "short" ? "flat" : "upright"}, ${clock} seen from above`;
  }
  if (turnsOver || along < NEAR) return turnsOver ? "tumbles sideways" : "spins aslant";
  return "spins like a drill";
}

function unsteadiness({ isSpun, name, sway, turnsOver }: Turning): string {
  if (turnsOver) return ", which turns over on the way";
  if (sway < CLEAN) return ", steadily";
  if (!isSpun) return `, leaning sideways by up to ${degrees(sway)}`;
  if (sway > LOST) return `, while that axis strays by as much as ${degrees(sway)}`;
  const strong = sway > STRONG ? "strong " : "";
  return name === "any" ? "" : `, with a ${strong}wobble of up to ${degrees(sway)}`;
}
