import { angleBetween, dotQuat, negate, type Quat, rotate } from "../math/quat.js";
import { add } from "../math/vec3.js";
import type { Body } from "./body.js";
import { playTrack } from "./play-track.js";
import { bendSurcharge, type SampledMotion } from "./sampled-motion.js";
import { fromOrigin } from "./time-grid.js";
import type { Track } from "./track.js";

/** Part of the tolerance that goes to what bends between the times compared, about. */
const SURCHARGE_SHARE = 0.02;
/** Times compared, at most. */
const MOST_SAMPLES = 1 << 20;

/**
 * The motion that linear keys already describe, to be cut again: on the times of all keys and parts between them, as fine
 * as the tolerance asks. `track`: LINEAR, of one key or more; its times may start anywhere. The body's axes do not count.
 */
export function sampleKeys(track: Track, body: Body, toleranceMetres: number): SampledMotion {
  const keyTimes = [...new Set([...track.translation.times, ...track.rotation.times])].sort((a, b) => a - b);
  const far = fromOrigin(body);
  const turns = keyTimes
    .slice(1)
    .map((t, i) => angleBetween(playTrack(track, t).rotation, playTrack(track, keyTimes[i]).rotation));
  const most = turns.reduce((a, b) => Math.max(a, b), 0);
  // Slerp bends a point's path by its speed² times the distance, and what is played instead bends about as much.
  const wanted = Math.sqrt((2 * bendSurcharge(far * most * most, 1)) / (SURCHARGE_SHARE * toleranceMetres));
  const parts = Math.ceil(Math.min(Math.max(2, wanted), MOST_SAMPLES / keyTimes.length));
  const times = [keyTimes[0]];
  let interval = 0;
  let surcharge = 0;
  turns.forEach((turn, k) => {
    const from = keyTimes[k];
    const span = keyTimes[k + 1] - from;
    let longest = 0;
    for (let part = 1; part <= parts; part++) {
      const t = part === parts ? keyTimes[k + 1] : Math.fround(from + (span * part) / parts);
      // Where keys are so close that float32 has no time between, there is none.
      if (!(t > times[times.length - 1])) continue;
      longest = Math.max(longest, t - times[times.length - 1]);
      times.push(t);
    }
    interval = Math.max(interval, longest);
    surcharge = Math.max(surcharge, bendSurcharge((far * turn * turn) / (span * span), longest));
  });

  const positions = new Float64Array(3 * times.length);
  const rotations = new Float64Array(4 * times.length);
  let before: Quat | undefined;
  times.forEach((t, k) => {
    const pose = playTrack(track, t);
    const rotation = before && dotQuat(before, pose.rotation) < 0 ? negate(pose.rotation) : pose.rotation;
    positions.set(add(pose.translation, rotate(rotation, body.centerOfMass)), 3 * k);
    rotations.set(rotation, 4 * k);
    before = rotation;
  });
  return {
    body,
    flying: false,
    last: times.length - 1,
    stride: 1,
    time: (index) => times[index],
    samples: times.length,
    sampleIndex: (sample) => sample,
    positions,
    rotations,
    poseInto(index, out) {
      out.set(positions.subarray(3 * index, 3 * index + 3));
      out.set(rotations.subarray(4 * index, 4 * index + 4), 3);
    },
    interval,
    surcharge,
  };
}
