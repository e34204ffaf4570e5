import type { Mat3 } from "../math/mat3.js";
import type { Vec3 } from "../math/vec3.js";
import { type Passage, passage } from "./closed-form.js";
import type { Curve } from "./curve.js";
import type { ReducedBody } from "./reduced-body.js";

const TURN = 2 * Math.PI;

/** A passage with the place on the curve it starts from. */
export interface Sample extends Passage {
  angle: number;
  momentum: Vec3;
}

/** Two neighbours, between which everything moves little, and the whole numbers of turns that lead on smoothly from one to the other. */
export interface Cell {
  left: Sample;
  right: Sample;
  link: Link;
  /** Numbers of polhode periods, counted at the left, for which the turns may be within the bound. */
  windings: [least: number, most: number];
}

/** What to add at the right to go on smoothly from the left: periods to the winding, radians to the azimuth asked. */
export interface Link {
  winding: number;
  azimuth: number;
}

/** Points of the even grid over a whole period of the curve. */
const EVEN = 96;
/** Points drawn together towards a crossing of the separatrix, each half as far from it as the one before. */
const TOWARDS_CROSSING = 40;
/** Below this width, rad, cells are not divided: an angle has no more digits. */
const NARROWEST = 4e-15;
/** What may change within a cell, rad: an amplitude, or the azimuth asked; and the azimuth reached. */
const MOST_AMPLITUDE = 1;
const MOST_PHASE = 2;
/** A bound on the work for bodies that no other bound foresees. */
const MOST_SAMPLES = 20000;

/** What ways are looked for: 2ET/(2π|L|) from least to most, and at most so much of ∫|ω|dt/2π. */
export interface Bounds {
  leastTurns: number;
  mostTurns: number;
  mostTurning: number;
}

/** The start of a search along a curve: the passage that begins at an angle. */
export type SampleAt = (angle: number) => Sample | undefined;

export function sampler(body: ReducedBody, end: Mat3, curve: Curve): SampleAt {
  return (angle) => {
    const momentum = curve.at(angle);
    const found = passage(body, momentum, end);
    return found && { ...found, angle, momentum };
  };
}

/**
 * Cells that cover the whole curve, ascending, so fine that nothing turns by more than about a radian within one. A cell is left out where no
 * number of periods keeps the turns within the bounds, or where start and end lie on different branches.
 */
export function cells(curve: Curve, sampleAt: SampleAt, bounds: Bounds, even = EVEN): Cell[] {
  const found: Cell[] = [];
  let budget = MOST_SAMPLES;
  const divide = (a: number, b: number, left?: Sample, right?: Sample): void => {
    const width = b - a;
    if (width <= NARROWEST) return;
    if (left && right) {
      if (left.polhode.own === right.polhode.own && left.polhode.sign === right.polhode.sign) {
        const cell = cellBetween(left, right, bounds);
        if (cell.windings[0] > cell.windings[1]) return;
        if (!isRough(cell)) {
          found.push(cell);
          return;
        }
      }
    } else if (!left && !right) return;
    if (budget-- <= 0) return;
    const middle = a + width / 2;
    const between = sampleAt(middle);
    divide(a, middle, left, between);
    divide(middle, b, between, right);
  };
  const angles = startingAngles(curve, even);
  let last = sampleAt(angles[0]);
  for (let i = 1; i < angles.length; i++) {
    const next = sampleAt(angles[i]);
    divide(angles[i - 1], angles[i], last, next);
    last = next;
  }
  return found;
}

/** One step more than a whole period, so that what happens at the seam is seen from both its sides. */
function startingAngles(curve: Curve, even: number): number[] {
  const step = curve.period / even;
  const into = (angle: number): number => angle - curve.period * Math.floor(angle / curve.period);
  const angles = curve.marks.map(into);
  for (let i = 0; i <= even + 1; i++) angles.push(i * step);
  for (const crossing of curve.crossings)
    for (const side of [-1, 1])
      for (let i = 0, far = step; i < TOWARDS_CROSSING; i++, far /= 2)
        angles.push(into(crossing + side * far));
  const ascending = angles.sort((a, b) => a - b);
  return ascending.filter((angle, i) => i === 0 || angle > ascending[i - 1]);
}

function cellBetween(left: Sample, right: Sample, bounds: Bounds): Cell {
  const link = linkBetween(left, right);
  const [leastLeft, mostLeft] = windingsWithin(left, bounds);
  const [leastRight, mostRight] = windingsWithin(right, bounds);
  const least = Math.ceil(Math.min(leastLeft, leastRight - link.winding));
  const most = Math.floor(Math.max(mostLeft, mostRight - link.winding));
  return { left, right, link, windings: [least, most] };
}

/** The real range of periods for which the turns, energy·time/2π, are within the bound, and those about the polhode's own axis alone. */
function windingsWithin(sample: Sample, bounds: Bounds): [number, number] {
  const { energy, own, ownInverse, amplitude, rate } = sample.polhode;
  const longest = (TURN * bounds.mostTurns) / energy;
  const past = sample.theta1 - sample.theta0;
  // ∫|ω|dt ≥ |∫ω_a dt|, and ω_a is in proportion to the amplitude's rate
  const farthest = (TURN * bounds.mostTurning * rate) / (ownInverse * amplitude[own]);
  return [
    Math.max((-longest - sample.time) / sample.period, (-farthest - past) / TURN),
    Math.min((longest - sample.time) / sample.period, (farthest - past) / TURN),
  ];
}

/** How the right sample continues the left one, amplitudes and azimuth each moving by less than half a turn. */
export function linkBetween(left: Sample, right: Sample): Link {
  const start = wraps(left.theta0, right.theta0);
  const stop = wraps(left.theta1, right.theta1);
  return { winding: stop - start, azimuth: TURN * wraps(left.azimuth, right.azimuth) };
}

/** The turns to add to `to` to come nearest to `from`. */
const wraps = (from: number, to: number): number => Math.round((from - to) / TURN);

const moved = (from: number, to: number): number => Math.abs(to + TURN * wraps(from, to) - from);

function isRough({ left, right, link, windings }: Cell): boolean {
  if (
    moved(left.theta0, right.theta0) > MOST_AMPLITUDE ||
    moved(left.theta1, right.theta1) > MOST_AMPLITUDE ||
    moved(left.azimuth, right.azimuth) > MOST_AMPLITUDE
  )
    return true;
  // linear in the winding: greatest at an end
  return windings.some(
    (winding) =>
      Math.abs(lead(right, winding + link.winding) - link.azimuth - lead(left, winding)) > MOST_PHASE,
  );
}

/** By how much the motion turns past the end pose, rad: a whole number of turns where it ends in it. */
export const lead = (sample: Sample, winding: number): number =>
  sample.turned + winding * sample.turnedPerPeriod - sample.azimuth;
