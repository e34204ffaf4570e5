/** What the page is told of a folder that was baked into: all that its record knows. */

import { turnTimes } from "../bake/motion.js";
import type { FlownPart, Mark, TakeMotion } from "../bake/take-motion.js";
import { fly } from "../flight/flight.js";
import type { Launch } from "../flight/launch.js";
import { multiply, rotateBack } from "../math/quat.js";
import { dot, scale, subtract, ZERO } from "../math/vec3.js";
import type { ClipRecord, PartRecord, PropRecord, TakesRecord } from "../record/clip-record.js";
import { emptyPage, type PageData, type PageProp, type PageThrow } from "./page-data.js";

/** @param record with glTF's numbers */
export function pageOfRecord(title: string, { props, clips }: TakesRecord): PageData {
  const names = [...new Set(clips.map((clip) => clip.throw))];
  return {
    ...emptyPage(title),
    props: Object.fromEntries(Object.entries(props).map(([name, prop]) => [name, pageProp(name, prop)])),
    throws: names.map((name) =>
      pageThrow(
        name,
        clips.filter((clip) => clip.throw === name),
        props,
      ),
    ),
  };
}

const pageProp = (name: string, prop: PropRecord): PageProp => ({
  name,
  mass: prop.mass,
  centerOfMass: prop.centerOfMass,
  axes: prop.principal.axes,
  moments: prop.principal.moments,
  reach: prop.reach,
  points: {},
  warnings: prop.warnings,
});

const pageThrow = (name: string, clips: readonly ClipRecord[], props: TakesRecord["props"]): PageThrow => ({
  name,
  isChain: clips[0].parts !== undefined,
  prop: clips[0].prop,
  takes: clips.map((record) => ({
    motion: motionOfRecord(record, props[record.prop]),
    record,
    file: record.file,
    clip: record.name,
  })),
  unheld: [],
});

/** The flight again that the release states; what was asked for is not in a record. */
export function motionOfRecord(clip: ClipRecord, prop: PropRecord): TakeMotion {
  const { release, arrival, flight = { start: 0, time: clip.duration } } = clip;
  const whole = { throw: clip.throw, ...flight, turns: clip.turns, release, arrival };
  return {
    name: clip.name,
    throw: clip.throw,
    take: clip.take,
    prop: clip.prop,
    duration: clip.duration,
    parts: (clip.parts ?? [whole]).map((part) => flownPart(part, prop)),
  };
}

const UNASKED: Mark = { point: "centerOfMass", offset: ZERO };

function flownPart(part: PartRecord, { principal }: PropRecord): FlownPart {
  const { release, arrival, start, time } = part;
  const orientation = multiply(release.rotation, principal.axes);
  const { velocity, gravity } = fall(part);
  const launch: Launch = {
    centerOfMass: release.centerOfMass,
    orientation,
    velocity,
    gravity,
    spin: rotateBack(orientation, release.angularVelocity),
    moments: principal.moments,
    duration: time,
  };
  const turnsAlone = release.velocity === null || arrival.velocity === null;
  return {
    throw: part.throw,
    start,
    launch,
    turnsAlone,
    apex: turnsAlone ? null : start + apexOf(launch),
    turns: turnTimes(fly(launch)).map((turn) => start + turn),
    release: UNASKED,
    arrival: UNASKED,
    boxes: [],
  };
}

function fall({ release, arrival, time }: PartRecord): Pick<Launch, "velocity" | "gravity"> {
  if (!release.velocity || !arrival.velocity || time === 0) return { velocity: ZERO, gravity: ZERO };
  return {
    velocity: release.velocity,
    gravity: scale(subtract(arrival.velocity, release.velocity), 1 / time),
  };
}

/** s after release at which the centre of mass is highest. */
function apexOf({ velocity, gravity, duration }: Launch): number {
  const pull = dot(gravity, gravity);
  return pull === 0 ? 0 : Math.max(0, Math.min(duration, -dot(velocity, gravity) / pull));
}
