import type { Flight } from "../flight/flight.js";
import type { Body } from "./body.js";
import { track } from "./cut.js";
import { type NodePath, nodePath } from "./node-path.js";
import type { RotationKeys } from "./rotation-keys.js";
import { sampleOn } from "./sampled-flight.js";
import { bendSurcharge, type SampledMotion } from "./sampled-motion.js";
import { slerps } from "./slerps.js";
import type { RotationStore } from "./store-rotation.js";
import { endShift, fromOrigin, trueBend } from "./time-grid.js";
import type { Track } from "./track.js";
import type { TranslationKeys } from "./translation-keys.js";

/** m that the bend between the times compared may add to the stated error. */
const SURCHARGE = 1e-5;
/** Times compared a frame, at most. */
const MOST_LOOKS = 4096;
/** A last interval shorter than this part of a frame is none: a duration of whole frames may be off by rounding. */
const SHORTEST = 1e-3;

/**
 * A linear key on every frame, each the true pose, and one at the end: 24 frames make 24 intervals. The error is what it comes to, proved
 * as that of other tracks is. Throws a RangeError for a flight that lasts no time.
 */
export function framesTrack(
  flight: Flight,
  body: Body,
  frameRate: number,
  store: RotationStore,
  withTranslation: boolean,
): Track {
  const { duration, greatestRate } = flight;
  if (Math.fround(duration) === 0)
    throw new RangeError(`a flight of ${duration} s cannot be a clip: it must last some time`);
  const frames = Math.max(1, Math.ceil(duration * frameRate - SHORTEST));
  const far = fromOrigin(body);
  // Slerp between true poses turns no faster than the flight, but for the keys' rounding.
  const bend = trueBend(flight, body) + 2 * far * greatestRate * greatestRate;
  const frame = 1 / frameRate;
  const looks = Math.ceil(
    Math.min(
      MOST_LOOKS,
      Math.max(1, greatestRate * frame, Math.sqrt(bendSurcharge(bend, frame) / SURCHARGE)),
    ),
  );
  // The last frame may be longer by what counts as rounding.
  const interval = (frame * (1 + SHORTEST)) / looks + 1e-7;
  const motion = sampleOn(flight, body, {
    last: frames * looks,
    stride: 1,
    interval,
    surcharge: bendSurcharge(trueBend(flight, body), interval) + endShift(flight, body),
    time(index) {
      const whole = Math.floor(index / looks);
      const start = Math.fround(whole * frame);
      const end = whole + 1 === frames ? Math.fround(duration) : Math.fround((whole + 1) * frame);
      return start + ((end - start) * (index - whole * looks)) / looks;
    },
  });
  const indices = Array.from({ length: frames + 1 }, (_, key) => key * looks);
  const rotation = trueRotations(motion, indices, store);
  return track(
    motion,
    rotation,
    trueTranslations(nodePath(motion, rotation), motion, indices, withTranslation),
  );
}

function trueRotations(motion: SampledMotion, indices: number[], store: RotationStore): RotationKeys {
  const values = store.create(4 * indices.length);
  const played = new Float64Array(4 * indices.length);
  const pose = new Float64Array(7);
  const stored = new Float64Array(4);
  const unit = new Float64Array(4);
  const far = fromOrigin(motion.body);
  const surcharges: number[] = [];
  indices.forEach((index, key) => {
    motion.poseInto(index, pose);
    let dot = 0;
    for (let i = 0; i < 4; i++) dot += pose[3 + i] * unit[i];
    // Beyond half a turn a frame, players go the short way.
    if (dot < 0) for (let i = 3; i < 7; i++) pose[i] = -pose[i];
    store.store(pose, 3, stored, unit);
    values.set(stored, 4 * key);
    played.set(unit, 4 * key);
  });
  const keyTime = (key: number) => motion.time(indices[key]);
  const slerp = slerps(played, keyTime);
  for (let key = 0; key + 1 < indices.length; key++) {
    const speed = slerp.speed(key);
    surcharges.push(bendSurcharge(far * speed * speed, motion.interval) + 2 * store.lengthError * far);
  }
  return { indices, interpolation: "LINEAR", values, surcharges, played: slerp.played };
}

function trueTranslations(
  path: NodePath,
  motion: SampledMotion,
  indices: number[],
  withTranslation: boolean,
): TranslationKeys {
  const values = new Float32Array(withTranslation ? 3 * indices.length : 0);
  const here = new Float64Array(4);
  if (withTranslation)
    indices.forEach((index, key) => {
      path.wantedInto(index, here);
      values.set(here.subarray(0, 3), 3 * key);
    });
  let error = 0;
  let key = 0;
  for (let k = 0; k < path.count; k++) {
    const t = path.times[k];
    while (key + 2 < indices.length && motion.time(indices[key + 1]) <= t) key++;
    let square = 0;
    if (withTranslation) {
      const start = motion.time(indices[key]);
      const share = (t - start) / (motion.time(indices[key + 1]) - start);
      for (let i = 0; i < 3; i++) {
        const from = values[3 * key + i];
        const d = from + share * (values[3 * key + 3 + i] - from) - path.wanted[4 * k + i];
        square += d * d;
      }
    }
    error = Math.max(error, Math.sqrt(square) + path.wanted[4 * k + 3]);
  }
  return { indices: withTranslation ? indices : [], interpolation: "LINEAR", values, error };
}
