/** A baked take as plain data, in glTF's world: what pictures are drawn from; it crosses threads and fits into a page. */

import type { Box } from "../flight/clearance-limits.js";
import { type Flight, fly } from "../flight/flight.js";
import type { Launch } from "../flight/launch.js";
import { conjugate, multiply, type Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import type { ThrowFile } from "../throwfile/types.js";
import type { BakedTake, BakedThrow } from "./bake.js";
import type { BakedChain, BakedChainTake } from "./bake-chain.js";
import { hostFrame } from "./host.js";
import { worldBox } from "./limits.js";
import { cuesOf } from "./motion.js";
import type { Take } from "./take.js";

/** A point of the prop and the place that it was asked to have; m. */
export interface Mark {
  /** As the throw file calls it. */
  point: string;
  /** The point from the centre of mass, model's frame. */
  offset: Vec3;
  /** World frame; none: nothing was asked. */
  asked?: Vec3;
}

/** A flight within a clip; times in s within the clip. */
export interface FlownPart {
  throw: string;
  start: number;
  launch: Launch;
  /** Nothing is known but how it turns: the centre of mass rests. */
  turnsAlone: boolean;
  apex: number | null;
  /** Ends of the whole turns about the angular momentum. */
  turns: number[];
  release: Mark;
  arrival: Mark;
  /** Height of the floor that ends it, m. */
  floor?: number;
  /** Heights that no part of the prop may leave, m. */
  minHeight?: number;
  maxHeight?: number;
  /** Boxes that no part of the prop may enter. */
  boxes: Box[];
}

/** A baked take as plain data, from which its motion, marks, boxes and cues can be drawn; glTF's world, m, s, rad. */
export interface TakeMotion {
  /** Of the clip. */
  name: string;
  /** The throw, or the chain. */
  throw: string;
  take: number;
  prop: string;
  /** Of the clip, holds included, s. */
  duration: number;
  /** One; of a chain several, one after the other. */
  parts: FlownPart[];
}

/** A throw's baked take as plain data, whatever the host: glTF's world, m, s, rad. */
export function takeMotion(
  file: ThrowFile,
  { entry }: Pick<BakedThrow, "entry">,
  baked: Omit<BakedTake, "nearest">,
): TakeMotion {
  const { take, name } = baked;
  const { before, after } = take.drawn.hold;
  return {
    name,
    throw: entry.name,
    take: take.number,
    prop: entry.prop,
    duration: before + take.flight.duration + after,
    parts: [flownPart(file, entry.name, take, before)],
  };
}

/** A chain's baked take as plain data, its throws one after the other as parts. */
export function chainMotion(
  file: ThrowFile,
  chain: Pick<BakedChain, "entry" | "prop">,
  baked: Omit<BakedChainTake, "nearest">,
): TakeMotion {
  return {
    name: baked.name,
    throw: chain.entry.name,
    take: baked.number,
    prop: chain.prop,
    duration: baked.duration,
    parts: baked.parts.map((part) => flownPart(file, part.throw, part.take, part.start)),
  };
}

function flownPart(file: ThrowFile, name: string, take: Take, start: number): FlownPart {
  const { drawn, wish, flight, turnsAlone = false } = take;
  const { release, arrive, limits } = drawn;
  const host = hostFrame(file.host).toWorld;
  const height = (value: number | undefined) => (value === undefined ? undefined : host.length(value));
  return {
    throw: name,
    start,
    launch: flight.launch,
    turnsAlone,
    ...cuesOf(take, start),
    release: { point: release.point, offset: wish.releaseOffset, asked: release.at && wish.arc.from },
    arrival: { point: arrive.point, offset: wish.arrivalOffset, asked: wish.arc.to },
    floor: height(arrive.floor),
    minHeight: height(limits?.minHeight),
    maxHeight: height(limits?.maxHeight),
    boxes: limits?.clear.map((box) => worldBox(box, host)) ?? [],
  };
}

/** A rigid body's course over a clip, t from 0 to `duration` in s. */
export interface Motion {
  duration: number;
  /** World frame, m. */
  centerOfMass(t: number): Vec3;
  /** Turns the model from as modelled, unit length. */
  rotation(t: number): Quat;
}

/** The true motion of a take, standing still before, between and after its flights; `axes` are the prop's `principal.axes`. */
export function motionOf({ parts, duration }: Pick<TakeMotion, "parts" | "duration">, axes: Quat): Motion {
  const flown = parts.map(({ start, launch }) => ({ start, flight: fly(launch) }));
  const toModel = conjugate(axes);
  const at = <T>(t: number, ask: (flight: Flight, time: number) => T): T => {
    const { start, flight } =
      flown.find((part) => t <= part.start + part.flight.duration) ?? flown[flown.length - 1];
    return ask(flight, Math.max(0, Math.min(flight.duration, t - start)));
  };
  return {
    duration,
    centerOfMass: (t) => at(t, (flight, time) => flight.centerOfMass(time)),
    rotation: (t) => at(t, (flight, time) => multiply(flight.orientation(time), toModel)),
  };
}
