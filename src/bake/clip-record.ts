/** A take's line in takes.json and what its glTF animation carries along. */

import { type Track, trackBytes } from "../clip/track.js";
import { axisShares, turnsAboutMomentum } from "../flight/turns.js";
import { rotate } from "../math/quat.js";
import { add, distance, scale } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { ClipRecord } from "../record/clip-record.js";
import type { ThrowEntry, ThrowFile } from "../throwfile/types.js";
import { hostFrame } from "./host.js";
import { modelRotation, motionState, turnTimes } from "./motion.js";
import type { Nearest } from "./nearest.js";
import { type Take, toleranceOf } from "./take.js";
import { launchWish } from "./wish.js";

/** THROW_01, THROW_02, … with two digits or as many as the number has. */
export const clipName = (throwName: string, take: number): string =>
  `${throwName}_${String(take).padStart(2, "0")}`;

export function clipRecord(
  file: ThrowFile,
  entry: ThrowEntry,
  prop: Prop,
  take: Take,
  track: Track,
  nearest: Nearest | null,
  fileName: string,
): ClipRecord {
  const { flight, aimed } = take;
  const host = hostFrame(file.host).fromWorld;
  return {
    name: clipName(entry.name, take.number),
    throw: entry.name,
    take: take.number,
    prop: entry.prop,
    file: fileName,
    duration: flight.duration,
    turns: turnsAboutMomentum(flight),
    share: axisShares(flight),
    apex: { time: aimed.arc.apex.time, rise: host.length(aimed.arc.apex.rise) },
    release: motionState(flight, prop, 0, host),
    arrival: motionState(flight, prop, flight.duration, host),
    miss: { position: missedBy(file, take, prop), angle: null },
    tolerance: toleranceOf(file, prop),
    error: track.error,
    keys: { translation: track.translation.times.length, rotation: track.rotation.times.length },
    bytes: trackBytes(track),
    candidate: take.candidate,
    draws: take.drawn.draws,
    flight: { start: 0, time: flight.duration },
    nearest,
  };
}

/** What an engine needs to take over from the clip, or to hang sounds on it. */
export const clipExtras = (record: ClipRecord, take: Take) => ({
  throw: record.throw,
  take: record.take,
  draws: record.draws,
  release: record.release,
  arrival: record.arrival,
  cues: { apex: record.apex.time, turns: turnTimes(take.flight) },
});

/** m from the mark to where the arrival point really is at the end; null without a mark. */
function missedBy(file: ThrowFile, take: Take, prop: Prop): number | null {
  const { flight, drawn } = take;
  const { arc, arrivalOffset } = launchWish(drawn, prop, file.gravity, hostFrame(file.host).toWorld);
  if (!arc.to) return null;
  const end = flight.duration;
  const place = add(
    flight.centerOfMass(end),
    scale(rotate(modelRotation(flight, prop, end), arrivalOffset), 1),
  );
  return distance(place, arc.to);
}
