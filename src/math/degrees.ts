/** Sine and cosine of angles in degrees: exact at whole right angles, and without loss near them. */

import { cos, sin } from "./elementary.js";

const RADIANS = Math.PI / 180;

export function sinDegrees(angle: number): number {
  const { quarter, rest } = reduce(angle);
  const x = rest * RADIANS;
  return quarter === 0 ? sin(x) : quarter === 1 ? cos(x) : quarter === 2 ? -sin(x) : -cos(x);
}

export function cosDegrees(angle: number): number {
  const { quarter, rest } = reduce(angle);
  const x = rest * RADIANS;
  return quarter === 0 ? cos(x) : quarter === 1 ? -sin(x) : quarter === 2 ? -cos(x) : sin(x);
}

/** The angle as whole quarter turns (0 to 3) and a rest of at most 45°; exact, since the remainder of a division is. */
function reduce(angle: number): { quarter: number; rest: number } {
  const whole = angle % 360;
  const turns = Math.round(whole / 90);
  return { quarter: ((turns % 4) + 4) % 4, rest: whole - 90 * turns };
}
