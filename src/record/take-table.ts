/** A take as a table: how it moves, in equal steps of time. */

import { type Conversion, hostFrame } from "../bake/host.js";
import type { FlownPart, TakeMotion } from "../bake/take-motion.js";
import { type Flight, fly } from "../flight/flight.js";
import { conjugate, multiply, type Quat } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { rounded } from "../math/rounded.js";
import { type Vec3, ZERO } from "../math/vec3.js";
import type { Host } from "../throwfile/types.js";

/** How a take is put into a table. */
export interface TakeTableOptions {
  /** Rows a second. */
  rate: number;
  /** The prop's `principal.axes`. */
  axes: Quat;
  /** In whose coordinates the numbers are; default glTF's. */
  host?: Host;
}

/** More rows than these a take are none that anything reads. */
const MOST_ROWS = 1_000_000;

/** Rows this near to where a flight begins or ends count as there, s. */
const SLACK = 1e-9;

/**
 * CSV as RFC 4180 has it, but with line feeds alone: a header that names columns and units, then a row every 1/rate seconds from 0 on and one at the
 * clip's end exactly. Numbers and coordinates are as in takes.json, to the same twelve digits. Where a flight begins or ends within the clip, a row has
 * the motion that begins there; the last row has the motion that ends there. Standing still has no velocity; one that is not known is left empty.
 *
 * @throws RequestError for a rate that is none, or of too many rows
 */
export function takeTable(take: TakeMotion, { rate, axes, host }: TakeTableOptions): string {
  const times = rowTimes(take, rate);
  const stateAt = statesOf(take.parts, axes, hostFrame(host).fromWorld);
  const rows = times.map((t, i) => [t, ...stateAt(t, i === times.length - 1)]);
  const text = (cell: number | null) => (cell === null ? "" : String(rounded(cell)));
  return [header(host), ...rows.map((row) => row.map(text).join(","))].map((line) => `${line}\n`).join("");
}

function rowTimes({ name, duration }: TakeMotion, rate: number): number[] {
  if (!(rate > 0 && rate * duration < MOST_ROWS))
    throw new RequestError(
      ["rate"],
      `is ${rate} a second, and ${name} lasts ${rounded(duration)} s`,
      `above 0, and so that a take has less than ${MOST_ROWS} rows`,
    );
  const steps = Math.ceil((duration - SLACK) * rate);
  return [...Array.from({ length: steps }, (_, i) => i / rate), duration];
}

function header(host: Host | undefined): string {
  const length = host && host.unit !== 1 ? "units" : "m";
  const vector = (name: string, unit: string) => ["x", "y", "z"].map((axis) => `${name}_${axis}_${unit}`);
  return [
    "time_s",
    ...vector("centerOfMass", length),
    ...["x", "y", "z", "w"].map((axis) => `rotation_${axis}`),
    ...vector("velocity", `${length}_per_s`),
    ...vector("angularVelocity", "rad_per_s"),
  ].join(",");
}

type Cells = (number | null)[];

const UNKNOWN: Cells = [null, null, null];

function statesOf(
  parts: readonly FlownPart[],
  axes: Quat,
  host: Conversion,
): (t: number, isLast: boolean) => Cells {
  const toModel = conjugate(axes);
  const flown = parts.map((part) => ({ ...part, flight: fly(part.launch) }));
  const pose = (flight: Flight, t: number): Cells => [
    ...host.vector(flight.centerOfMass(t)),
    ...host.rotation(multiply(flight.orientation(t), toModel)),
  ];
  const moving = ({ flight, turnsAlone }: (typeof flown)[number], t: number): Cells => [
    ...pose(flight, t),
    ...(turnsAlone ? UNKNOWN : host.vector(flight.velocity(t))),
    ...host.angular(flight.angularVelocity(t)),
  ];
  const still = ({ flight, turnsAlone }: (typeof flown)[number], t: number): Cells => [
    ...pose(flight, t),
    ...(turnsAlone ? UNKNOWN : (ZERO as Vec3)),
    ...ZERO,
  ];
  return (t, isLast) => {
    // slack on the side that the row tells of
    const slack = isLast ? -SLACK : SLACK;
    const index = flown.findLastIndex(({ start }) => start <= t + slack);
    if (index < 0) return still(flown[0], 0);
    const part = flown[index];
    const { start, flight } = part;
    return t + slack < start + flight.duration
      ? moving(part, Math.max(0, t - start))
      : still(part, flight.duration);
  };
}
