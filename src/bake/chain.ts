/** `chains`: throws one after the other in one clip, each from where, and as, the one before arrived. */

import { partTimes } from "../clip/join.js";
import type { Track } from "../clip/track.js";
import { angleBetween, rotate } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { add, distance } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { ChainEntry, ThrowFile } from "../throwfile/types.js";
import { hostFrame } from "./host.js";
import { type MotionState, modelRotation, motionState } from "./motion.js";
import { arrivalOf } from "./start.js";
import { cutParts, retake, type Take } from "./take.js";

/** A throw within a chain's take. */
export interface ChainPart {
  /** Its name. */
  throw: string;
  take: Take;
  /** When it flies, s within the clip. */
  start: number;
  end: number;
  /** In the host's coordinates. */
  release: MotionState;
  arrival: MotionState;
}

/** A take of a chain, not yet cut. */
export interface ChainTake {
  number: number;
  parts: ChainPart[];
  /** Of the whole clip, s. */
  duration: number;
}

/** A chain's take that is left out, and why. */
export class UnheldChain extends Error {
  override name = "UnheldChain";
}

/** m and rad by which the end of a loop may be off its start. */
const CLOSED = 1e-9;

/**
 * The throws' own takes of one number, of which all but the first are thrown again, with what they had drawn, from where the one before arrived.
 *
 * @throws RequestError, path from the top of the file, for a throw that has no flight from there and for a loop that does not close; UnheldChain for
 *   limits that fail in the chain
 */
export function solveChain(
  file: ThrowFile,
  { name, throws, loop }: ChainEntry,
  prop: Prop,
  takes: readonly Take[],
): ChainTake {
  const [{ number }] = takes;
  const thrown = [takes[0]];
  for (let i = 1; i < takes.length; i++) {
    const { take, broken } = within(
      ["throws", throws[i]],
      `in the chain ${name}, take ${number}, thrown from where ${throws[i - 1]} arrives: `,
      () => retake(file, prop, takes[i], arrivalOf(thrown[i - 1].flight, prop)),
    );
    if (broken.length > 0)
      throw new UnheldChain(
        `thrown from where ${throws[i - 1]} arrives, ${throws[i]} does not hold ${broken.join(", ")}`,
      );
    thrown.push(take);
  }
  if (loop) checkLoop(file, name, prop, thrown);
  const host = hostFrame(file.host).fromWorld;
  const times = partTimes(
    thrown.map(({ drawn }) => drawn.hold),
    thrown.map(({ flight }) => flight.duration),
  );
  const parts = thrown.map((take, i) => ({
    throw: throws[i],
    take,
    ...times[i],
    release: motionState(take, prop, 0, host),
    arrival: motionState(take, prop, take.flight.duration, host),
  }));
  const last = parts[parts.length - 1];
  return { number, parts, duration: last.end + last.take.drawn.hold.after };
}

/** @throws RequestError as `cutTake` does */
export const cutChain = (file: ThrowFile, { loop }: ChainEntry, prop: Prop, { parts }: ChainTake): Track =>
  cutParts(
    file,
    prop,
    parts.map(({ take }) => take),
    loop,
  );

function checkLoop(file: ThrowFile, name: string, prop: Prop, thrown: readonly Take[]): void {
  const last = thrown[thrown.length - 1];
  const [first] = thrown;
  const start = {
    centerOfMass: first.flight.centerOfMass(0),
    rotation: modelRotation(first.flight, prop, 0),
  };
  const end = arrivalOf(last.flight, prop);
  const host = hostFrame(file.host).fromWorld;
  const off = distance(start.centerOfMass, end.centerOfMass);
  const turned = angleBetween(start.rotation, end.rotation);
  if (off <= CLOSED && turned <= CLOSED) return;
  const place = host.vector(add(start.centerOfMass, rotate(start.rotation, last.wish.arrivalOffset)));
  const faults = [
    ...(off > CLOSED ? [`${shown(host.length(off))}${file.host ? "" : " m"}`] : []),
    ...(turned > CLOSED ? [`${shown((turned * 180) / Math.PI)}°`] : []),
  ];
  const remedies = [
    ...(off > CLOSED ? [`arrive.at [${place.map(exactly).join(", ")}]`] : []),
    ...(turned > CLOSED
      ? [`arrive.facing { rotation: [${host.rotation(start.rotation).map(exactly).join(", ")}] }`]
      : []),
  ];
  throw new RequestError(
    ["chains", name, "loop"],
    `take ${first.number} ends ${faults.join(" and ")} from where it starts (found true)`,
    `${last.drawn.name} would need ${remedies.join(" and ")}, or loop: false`,
  );
}

const shown = (value: number): string => String(Number(value.toPrecision(3)));
const exactly = (value: number): string => String(Number(value.toFixed(12)) + 0);

/** Puts what was being thrown in front of an error. */
function within<T>(path: readonly (string | number)[], where: string, answer: () => T): T {
  try {
    return answer();
  } catch (error) {
    if (error instanceof RequestError)
      throw new RequestError([...path, ...error.path], `${where}${error.fault}`, error.remedy);
    throw error;
  }
}
