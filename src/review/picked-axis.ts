/** Which principal axis of a turning body a picture picks out, and what it does on the way. */

import type { Flight } from "../flight/flight.js";
import { acos } from "../math/elementary.js";
import { conjugate, multiply, rotate, rotateBack } from "../math/quat.js";
import { addScaled, dot, length, normalize, perpendicular, scale, type Vec3 } from "../math/vec3.js";
import { tieGroups } from "../prop/principal.js";
import type { Stretch } from "./course.js";
import type { SheetProp, SheetTake } from "./sheet-input.js";

export type AxisName = "long" | "middle" | "short" | "any";

export interface Picked {
  /** Unit vector in the model's frame. */
  axis: Vec3;
  name: AxisName;
  /** A second direction square to it, which shows how the body rolls about the axis. */
  across: Vec3;
  /** The body turns about this axis; else it turns over it, end over end or face over face. */
  isSpun: boolean;
}

export interface Turning extends Picked {
  /** Unit vector that the body turns about in space, the right-hand rule; none: it does not turn. */
  about?: Vec3;
  /** Greatest angle between the axis (where it is not spun, the plane square to it) and `about`, rad. */
  sway: number;
  /** The axis passes from one side of the plane square to `about` to the other. */
  turnsOver: boolean;
}

/** Moments within this are one for the naked eye: a whipping or a stamp makes no other motion of a ring or disc. */
const ROUND_TIE = 0.025;
const TIE = 0.01;
/** Turning below this many turns is none. */
const STILL = 0.005;
const SAMPLES = 240;

export function turningOf(prop: SheetProp, take: SheetTake, stretch: Stretch): Turning {
  const still = { sway: 0, turnsOver: false };
  const axisOf = (i: number): Vec3 => rotate(prop.axes, UNITS[i]);
  if (stretch.turns < STILL)
    return { axis: axisOf(0), name: "long", across: axisOf(1), isSpun: true, ...still };
  const seen = stretch.flight ? knownTurning(stretch.flight) : seenTurning(prop, take, stretch);
  const picked = pick(seen);
  // the axis that is spun points as the right hand has it
  const sign = picked.isSpun && dot(picked.axis, seen.start) < 0 ? -1 : 1;
  const axis = scale(rotate(prop.axes, picked.axis), sign);
  const across = rotate(prop.axes, picked.across);
  let sway = 0;
  let side = 0;
  let turnsOver = false;
  for (let i = 0; i <= SAMPLES; i++) {
    const t = stretch.from + ((stretch.to - stretch.from) * i) / SAMPLES;
    const cosine = dot(rotate(take.motion.rotation(t), axis), seen.about);
    const folded = acos(Math.min(1, Math.abs(cosine)));
    sway = Math.max(sway, picked.isSpun ? folded : Math.PI / 2 - folded);
    if (side !== 0 && cosine * side < 0 && Math.abs(cosine) > 0.1) turnsOver = true;
    if (side === 0 || Math.abs(cosine) > 0.1) side = cosine;
  }
  return { ...picked, axis, across, about: seen.about, sway, turnsOver: picked.isSpun && turnsOver };
}

const UNITS: readonly Vec3[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];
const NAMES: readonly AxisName[] = ["long", "middle", "short"];

interface Seen {
  /** Unit, world frame. */
  about: Vec3;
  /** The same at the start, principal frame. */
  start: Vec3;
  /** Ascending; none: unknown. */
  moments?: Vec3;
}

const knownTurning = (flight: Flight): Seen => {
  const about = normalize(flight.angularMomentum);
  return { about, start: rotateBack(flight.orientation(0), about), moments: flight.launch.moments };
};

/** Of a clip: the mean of the directions that it turns about, each weighed with its angle. */
function seenTurning({ axes }: SheetProp, { motion }: SheetTake, { from, to }: Stretch): Seen {
  let sum: Vec3 = [0, 0, 0];
  let first: Vec3 | undefined;
  const steps = 4 * SAMPLES;
  let before = motion.rotation(from);
  for (let i = 1; i <= steps; i++) {
    const now = motion.rotation(from + ((to - from) * i) / steps);
    const step = multiply(now, conjugate(before));
    const turn: Vec3 = step[3] < 0 ? [-step[0], -step[1], -step[2]] : [step[0], step[1], step[2]];
    if (length(turn) > 1e-9) first ??= normalize(turn);
    sum = addScaled(sum, turn, 1);
    before = now;
  }
  const about = length(sum) > 1e-9 ? normalize(sum) : (first ?? UNITS[1]);
  return { about, start: rotateBack(axes, rotateBack(motion.rotation(from), about)) };
}

/** In the principal frame. */
function pick({ start, moments }: Seen): Picked {
  const groups = moments ? roundGroups(moments) : [[0], [1], [2]];
  if (groups.length === 1) return { axis: start, name: "any", across: perpendicular(start), isSpun: true };
  const pair = groups.find((group) => group.length === 2);
  if (!pair) {
    const sizes = start.map(Math.abs);
    const axis = sizes.indexOf(Math.max(...sizes));
    return { axis: UNITS[axis], name: NAMES[axis], across: UNITS[axis === 0 ? 1 : 0], isSpun: true };
  }
  const single = pair[0] === 0 ? 2 : 0;
  const inPlane = normalize(addScaled(start, UNITS[single], -start[single]));
  if (Math.abs(start[single]) >= Math.SQRT1_2)
    return { axis: UNITS[single], name: NAMES[single], across: UNITS[pair[0]], isSpun: true };
  // a disc flips over its face, which therefore tells most; a rod rolls about its length, which the axis it is spun about shows
  return single === 2
    ? { axis: UNITS[2], name: "short", across: inPlane, isSpun: false }
    : { axis: inPlane, name: "middle", across: UNITS[0], isSpun: true };
}

function roundGroups(moments: Vec3): number[][] {
  const round = tieGroups(moments, ROUND_TIE);
  return round.length === 2 && round[0].length === 2 ? round : tieGroups(moments, TIE);
}
