/** The numbers of a take that takes are put in order and told apart by. */

import type { Course, Nearest } from "../../bake/nearest.js";
import type { TakeMotion } from "../../bake/take-motion.js";
import { type Flight, fly } from "../../flight/flight.js";
import { length } from "../../math/vec3.js";
import type { PageProp, PageTake, PageThrow } from "../page-data.js";
import { mostAlike } from "./likeness.js";
import { wobbleAngle } from "./wobble-angle.js";
import * as words from "./words.js";

export interface Measured {
  take: PageTake;
  number: number;
  /** Of the flights, s; of a chain the whole clip. */
  time: number;
  turns: number;
  /** Greatest of the shares: 1 is a clean spin. */
  share: number;
  /** Degrees off the axis that it was thrown about, at release and arrival. */
  wobbleAtRelease: number | null;
  wobble: number | null;
  /** m/s; null where nothing but the turning is known. */
  releaseSpeed: number | null;
  arrivalSpeed: number | null;
  /** rad/s */
  releaseRate: number;
  arrivalRate: number;
  /** Of the centre of mass above its release, m. */
  rise: number | null;
  /** m and rad from what was asked; null where nothing was. */
  miss: number | null;
  missAngle: number | null;
  /** Of all the other takes. */
  nearest: Nearest | null;
}

export type MeasureKey =
  | "number"
  | "time"
  | "turns"
  | "share"
  | "wobble"
  | "releaseSpeed"
  | "arrivalSpeed"
  | "rise"
  | "miss"
  | "nearest"
  | "bytes";

export interface Measure {
  key: MeasureKey;
  /** In the list of what takes can be put in order by. */
  label: string;
  of(measured: Measured): number | null;
  say(value: number): string;
  /** From the number that is asked for in the fields to the value. */
  unit: string;
  factor: number;
  /** What is looked for is mostly at this end. */
  highFirst: boolean;
}

export const MEASURES: readonly Measure[] = [
  {
    key: "number",
    label: "take number",
    of: (m) => m.number,
    say: String,
    unit: "",
    factor: 1,
    highFirst: false,
  },
  {
    key: "time",
    label: "time",
    of: (m) => m.time,
    say: words.seconds,
    unit: "s",
    factor: 1,
    highFirst: false,
  },
  {
    key: "turns",
    label: "turns",
    of: (m) => m.turns,
    say: words.turns,
    unit: "",
    factor: 1,
    highFirst: true,
  },
  {
    key: "wobble",
    label: "wobble at arrival",
    of: (m) => m.wobble,
    say: words.degrees,
    unit: "°",
    factor: 1,
    highFirst: true,
  },
  {
    key: "share",
    label: "share about main axis",
    of: (m) => m.share,
    say: words.percent,
    unit: "%",
    factor: 0.01,
    highFirst: false,
  },
  {
    key: "miss",
    label: "miss",
    of: (m) => m.miss,
    say: words.metres,
    unit: "mm",
    factor: 0.001,
    highFirst: true,
  },
  {
    key: "nearest",
    label: "distance to most alike",
    of: (m) => m.nearest?.distance ?? null,
    say: words.metres,
    unit: "mm",
    factor: 0.001,
    highFirst: false,
  },
  {
    key: "releaseSpeed",
    label: "speed at release",
    of: (m) => m.releaseSpeed,
    say: words.speed,
    unit: "m/s",
    factor: 1,
    highFirst: true,
  },
  {
    key: "arrivalSpeed",
    label: "speed at arrival",
    of: (m) => m.arrivalSpeed,
    say: words.speed,
    unit: "m/s",
    factor: 1,
    highFirst: true,
  },
  {
    key: "rise",
    label: "rise to apex",
    of: (m) => m.rise,
    say: words.metres,
    unit: "mm",
    factor: 0.001,
    highFirst: true,
  },
  {
    key: "bytes",
    label: "size of clip",
    of: (m) => m.take.record.bytes,
    say: words.bytes,
    unit: "bytes",
    factor: 1,
    highFirst: true,
  },
];

export const measureOf = (key: MeasureKey): Measure =>
  MEASURES.find((measure) => measure.key === key) as Measure;

const known = new WeakMap<readonly PageTake[], Measured[]>();

/** Of all takes of a throw, worked out once. */
export function measure({ takes, isChain }: PageThrow, prop: PageProp): Measured[] {
  const found = known.get(takes);
  if (found) return found;
  const courses = takes.map(({ motion }) => ({ number: motion.take, course: courseOf(motion, isChain) }));
  const alike = mostAlike(courses, prop.reach);
  const all = takes.map((take, i) => measureTake(take, prop, alike[i], isChain));
  known.set(takes, all);
  return all;
}

function measureTake(take: PageTake, prop: PageProp, nearest: Nearest | null, isChain: boolean): Measured {
  const { motion, record } = take;
  const flights = motion.parts.map(({ launch }) => fly(launch));
  const first = flights[0];
  const last = flights[flights.length - 1];
  const turnsAlone = motion.parts.every((part) => part.turnsAlone);
  const moving = <T>(value: T): T | null => (turnsAlone ? null : value);
  return {
    take,
    number: motion.take,
    time: isChain ? motion.duration : last.duration,
    turns: record.turns,
    share: Math.max(...record.share),
    wobbleAtRelease: wobbleAngle(first, prop.moments, 0),
    wobble: wobbleAngle(last, prop.moments, last.duration),
    releaseSpeed: moving(length(first.velocity(0))),
    arrivalSpeed: moving(length(last.velocity(last.duration))),
    releaseRate: length(first.angularVelocity(0)),
    arrivalRate: length(last.angularVelocity(last.duration)),
    rise: moving(riseOf(motion, flights)),
    miss: record.miss.position,
    missAngle: record.miss.angle,
    nearest,
  };
}

function riseOf({ parts }: TakeMotion, flights: readonly Flight[]): number {
  const tops = parts.flatMap(({ apex, start }, i) =>
    apex === null
      ? []
      : [flights[i].centerOfMass(Math.max(0, Math.min(flights[i].duration, apex - start)))[1]],
  );
  const from = flights[0].centerOfMass(0)[1];
  return Math.max(0, ...tops.map((top) => top - from));
}

/** As the record compares takes: of a throw its flight, of a chain all with the holds. */
const courseOf = ({ parts, duration }: TakeMotion, isChain: boolean): Course =>
  isChain
    ? { parts, duration }
    : { parts: [{ start: 0, launch: parts[0].launch }], duration: parts[0].launch.duration };
