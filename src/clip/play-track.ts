import { acos, sin } from "../math/elementary.js";
import { dotQuat, normalize, type Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import type { Channel, Track } from "./track.js";

/** Where a player puts the node. */
export interface PlayedPose {
  /** World frame, m. */
  translation: Vec3;
  /** Unit quaternion. */
  rotation: Quat;
}

/**
 * The pose of the animated node at time `t` in s, as a player of the file shows it: glTF 2.0 specification, Appendix C
 * (Interpolation Modes), linear for the translation, spherical linear for the rotation; before the first and after the
 * last key it stands still.
 */
export function playTrack(track: Track, t: number): PlayedPose {
  return { translation: playTranslation(track.translation, t), rotation: playRotation(track.rotation, t) };
}

function playTranslation(channel: Channel, t: number): Vec3 {
  const { values } = channel;
  const { key, next, share } = locate(channel.times, t);
  const component = (i: number) => values[3 * key + i] * (1 - share) + values[3 * next + i] * share;
  return [component(0), component(1), component(2)];
}

function playRotation(channel: Channel, t: number): Quat {
  const { key, next, share } = locate(channel.times, t);
  const a = rotationAt(channel.values, key);
  const b = rotationAt(channel.values, next);
  const d = dotQuat(a, b);
  const angle = acos(Math.min(1, Math.abs(d)));
  // Close to no step the two sines lose their digits and, as the appendix says, slerp turns into lerp (to angle³/30).
  const nearlyStill = angle < 1e-5;
  const s = sin(angle);
  const first = nearlyStill ? 1 - share : sin(angle * (1 - share)) / s;
  const second = (d < 0 ? -1 : 1) * (nearlyStill ? share : sin(angle * share) / s);
  const component = (i: number) => first * a[i] + second * b[i];
  return normalize([component(0), component(1), component(2), component(3)]);
}

/** A stored rotation; float32 leaves it up to 1e-7 off unit length. */
function rotationAt(values: Float32Array, key: number): Quat {
  const i = 4 * key;
  return normalize([values[i], values[i + 1], values[i + 2], values[i + 3]]);
}

/** The keys before and after `t`, and how much of the way between them has gone, 0 to 1. */
function locate(times: Float32Array, t: number): { key: number; next: number; share: number } {
  const last = times.length - 1;
  if (!(t > times[0])) return { key: 0, next: 0, share: 0 };
  if (t >= times[last]) return { key: last, next: last, share: 0 };
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle] <= t) low = middle;
    else high = middle;
  }
  return { key: low, next: high, share: (t - times[low]) / (times[high] - times[low]) };
}
