/** One clip of several flights, and of the times before, between and after them in which the prop stands still. */

import type { Flight } from "../flight/flight.js";
import { RequestError } from "../math/request-error.js";
import { length, ZERO } from "../math/vec3.js";
import type { Body } from "./body.js";
import { type ClipStyle, clipTrack } from "./clip-track.js";
import { FULL_INT16, type Joint, joinChannel, type PartTimes } from "./join-channel.js";
import { greatestPlayedSpeed } from "./played-speed.js";
import { fromOrigin } from "./time-grid.js";
import { type Channel, type Track, trackBytes } from "./track.js";

/** A flight within a clip. */
export interface ClipPart {
  flight: Flight;
  /** s for which the clip stands still at the flight's first pose before it, and at its last after it. */
  before: number;
  after: number;
}

/** Half the distance between neighbouring float32 numbers, as a part of the number (at most). */
const HALF_FLOAT32 = 1 / 0x1_00_00_00;
/** Cuts with less and less of the tolerance, at most. */
const ATTEMPTS = 6;

/** When each part flies, one after the other. */
export function partTimes(
  parts: readonly Omit<ClipPart, "flight">[],
  durations: readonly number[],
): PartTimes[] {
  let now = 0;
  return parts.map(({ before, after }, i) => {
    const start = now + before;
    const end = start + durations[i];
    now = end + after;
    return { start, end };
  });
}

/**
 * The keys of each flight as `clipTrack` cuts them, moved to where it lies in the clip. Standing still costs one key a channel; flights that follow at
 * once share the key between them, so that each must begin in the pose in which the one before it ended.
 *
 * Moved times are rounded to float32 again. What is played at any moment is then what each channel alone plays at a moment off by no more
 * than the greatest rounding, so that each point is off by its greatest played speed times that: the error includes it, and the tolerance holds for both.
 *
 * @param isLoop the last key then is the first, which it must be but for rounding (q and −q are the same)
 * @throws RequestError as `clipTrack` does, and where the clip lasts so long that its times are too coarse
 */
export function joinedTrack(
  parts: readonly ClipPart[],
  body: Body,
  toleranceMetres: number,
  style: ClipStyle = {},
  isLoop = false,
): Track {
  const still = parts.every(({ before, after }) => before === 0 && after === 0);
  if (parts.length === 1 && still && !isLoop) return clipTrack(parts[0].flight, body, toleranceMetres, style);
  const far = fromOrigin(
    (style.layout ?? "one-node") === "one-node" ? body : { ...body, centerOfMass: ZERO },
  );
  const fastest = Math.max(...parts.map(({ flight }) => greatestSpeed(flight, body)));
  const times = partTimes(
    parts,
    parts.map(({ flight }) => flight.duration),
  );
  const total = times[times.length - 1].end + parts[parts.length - 1].after;
  let reserve = 4 * HALF_FLOAT32 * total * fastest;
  for (
    let attempt = 0;
    attempt < ATTEMPTS && (reserve < toleranceMetres / 2 || style.keys === "frames");
    attempt++
  ) {
    const within = style.keys === "frames" ? toleranceMetres : toleranceMetres - reserve;
    const joined = tracksOf(parts, body, within, style).flatMap(
      (tracks) => join(tracks, { times, total, far, fastest, isLoop }) ?? [],
    );
    const [best] = joined.sort((a, b) => trackBytes(a) - trackBytes(b));
    if (best && (style.keys === "frames" || best.error <= toleranceMetres)) return best;
    reserve = 2 * Math.max(reserve, best ? best.error - within : 0);
  }
  throw new RequestError(
    ["bake", "tolerance"],
    `a tolerance of ${toleranceMetres} m is finer than the times of a clip of ${total} s can hold`,
    `needs at least ${Number((2.1 * reserve).toPrecision(2))} m, or a shorter clip`,
  );
}

/** Ways of cutting all parts. Where each may choose its curves, they may not agree, and the clip has one for each channel. */
function tracksOf(parts: readonly ClipPart[], body: Body, within: number, style: ClipStyle): Track[][] {
  const styles: ClipStyle[] =
    style.keys === "smallest" && parts.length > 1
      ? [style, { ...style, keys: "linear" }, { ...style, keys: "cubic", pack: "float" }]
      : [style];
  return styles.map((each) => parts.map(({ flight }) => clipTrack(flight, body, within, each)));
}

interface Joining {
  times: readonly PartTimes[];
  total: number;
  /** m: of the furthest point from the origin that the rotation turns about. */
  far: number;
  /** m/s: of any point of the prop in the true motion. */
  fastest: number;
  isLoop: boolean;
}

/** Undefined where the tracks' channels are not of one kind, or their times do not ascend once rounded. */
function join(tracks: readonly Track[], { times, total, far, fastest, isLoop }: Joining): Track | undefined {
  const channel = (path: "translation" | "rotation"): Joint | undefined => {
    const channels = tracks.map((track) => track[path]);
    const isUniform = channels.every((other) => isAlike(other, channels[0]));
    return isUniform ? joinChannel(channels, path === "rotation" ? 4 : 3, times, total, isLoop) : undefined;
  };
  const translation = channel("translation");
  const rotation = channel("rotation");
  if (!translation || !rotation) return undefined;
  const unit = rotation.channel.values instanceof Int16Array ? FULL_INT16 : 1;
  // what rounding made of one pose: rotations that differ by d in their four components turn a point at R by 2·R·d, cubic ones four times as much (see played-speed.ts)
  const seam = translation.seam + (8 * far * rotation.seam) / unit;
  const errors = tracks.map((track, i) => {
    const shift = Math.max(translation.shifts[i], rotation.shifts[i]);
    // the true motion may be in the next part already, or still
    return track.error + shift * (greatestPlayedSpeed(track, far) + fastest);
  });
  return {
    duration: Math.fround(total),
    translation: translation.channel,
    rotation: rotation.channel,
    error: Math.max(...errors) + seam,
  };
}

const isAlike = (a: Channel, b: Channel): boolean =>
  a.interpolation === b.interpolation && a.values instanceof Int16Array === b.values instanceof Int16Array;

/** m/s: of any point of the prop; the speed of the centre of mass is a convex function of time, greatest at an end. */
const greatestSpeed = (flight: Flight, { reach, centerOfMass }: Body): number =>
  Math.max(length(flight.velocity(0)), length(flight.velocity(flight.duration))) +
  (reach + length(centerOfMass)) * flight.greatestRate;
