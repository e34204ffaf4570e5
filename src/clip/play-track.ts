import { acos, sin } from "../math/elementary.js";
import { dotQuat, normalize, type Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import { hermiteWeights } from "./hermite.js";
import type { Channel, Track } from "./track.js";

/** What a player shows of a track's two channels. */
export interface PlayedPose {
  /** World frame, m; zero of a track that has no translation. */
  translation: Vec3;
  /** Unit quaternion. */
  rotation: Quat;
}

/**
 * The values of both channels at time `t` in s, as a player of the file has them: glTF 2.0 specification, Appendix C
 * (Interpolation Modes); before the first and after the last key they stand still.
 */
export function playTrack(
  { translation, rotation }: Pick<Track, "translation" | "rotation">,
  t: number,
): PlayedPose {
  return {
    translation: translation.times.length > 0 ? playTranslation(translation, t) : [0, 0, 0],
    rotation: playRotation(rotation, t),
  };
}

/** Keys as any file may have them: STEP keeps a value until the next key. */
export interface PlayedChannel extends Omit<Channel, "interpolation"> {
  interpolation: Channel["interpolation"] | "STEP";
}

/** One channel alone, as above. */
export const playTranslation = (channel: PlayedChannel, t: number): Vec3 =>
  components(channel, 3, t) as unknown as Vec3;

export const playRotation = (channel: PlayedChannel, t: number): Quat =>
  channel.interpolation === "LINEAR"
    ? slerpRotation(channel, t)
    : normalize(components(channel, 4, t) as unknown as Quat);

/** Each component for itself. */
function components(channel: PlayedChannel, size: number, t: number): number[] {
  const { times, values, interpolation } = channel;
  const { key, next, share } = locate(times, t);
  if (interpolation === "STEP") return Array.from(values.subarray(size * key, size * (key + 1)));
  if (interpolation === "LINEAR")
    return Array.from(
      { length: size },
      (_, i) => values[size * key + i] * (1 - share) + values[size * next + i] * share,
    );
  const weights = new Float64Array(4);
  hermiteWeights(share, weights);
  const duration = times[next] - times[key];
  const at = (k: number, part: number, i: number) => values[size * (3 * k + part) + i];
  return Array.from(
    { length: size },
    (_, i) =>
      weights[0] * at(key, 1, i) +
      weights[1] * duration * at(key, 2, i) +
      weights[2] * at(next, 1, i) +
      weights[3] * duration * at(next, 0, i),
  );
}

function slerpRotation(channel: PlayedChannel, t: number): Quat {
  const { key, next, share } = locate(channel.times, t);
  const a = rotationAt(channel, key);
  const b = rotationAt(channel, next);
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

/** A stored rotation; numbers of a file leave it a little off unit length, int16 ones 32767 times as long. */
function rotationAt({ values }: PlayedChannel, key: number): Quat {
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
