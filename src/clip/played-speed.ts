import type { Channel, Track } from "./track.js";

/**
 * m/s per s of time by which a track's keys are moved: never exceeded by the speed of any point as played, and by what tangents that were
 * fitted to the old interval do to the new one.
 *
 * Straight segments: chord over time. Slerp: the rotation angle, at most π times the chord of the quaternions (4·asin(c/2) with
 * asin x ≤ πx/2). Cubic Hermite segments: the derivatives of their four weights are at most 3/2, 3/2 and 1, 1; an interval
 * changed by 2δ adds 2δ·4/27 of each tangent (the greatest of the tangents' weights). A unit quaternion turns by twice what its components change by, divided
 * by their length.
 *
 * @param far distance of the furthest point from the origin that the rotation turns about, m
 */
export const greatestPlayedSpeed = ({ translation, rotation }: Track, far: number): number =>
  greatest(translation, 3, ({ chord, tangents, time }) =>
    translation.interpolation === "LINEAR" ? chord / time : 1.5 * (chord / time) + CHANGED * tangents,
  ) +
  far *
    greatest(rotation, 4, ({ chord, tangents, time }) =>
      rotation.interpolation === "LINEAR"
        ? (Math.PI * chord) / time
        : (2 * (1.5 * (chord / time) + CHANGED * tangents)) / leastLength(chord, tangents * time),
    );

const CHANGED = 1 + 8 / 27;

interface Segment {
  /** Distance of the two keys' values, and their tangents' lengths together. */
  chord: number;
  tangents: number;
  /** s */
  time: number;
}

function greatest(channel: Channel, size: number, speed: (segment: Segment) => number): number {
  const { times, values, interpolation } = channel;
  const isCubic = interpolation === "CUBICSPLINE";
  const unit = values instanceof Int16Array ? 1 / 32767 : 1;
  const at = (key: number, part: 0 | 1 | 2) => (isCubic ? 3 * key + part : key) * size;
  const norm = (component: (i: number) => number): number => {
    let square = 0;
    for (let i = 0; i < size; i++) square += component(i) * component(i);
    return Math.sqrt(square);
  };
  let most = 0;
  for (let key = 0; key + 1 < times.length; key++) {
    const chord = unit * norm((i) => values[at(key + 1, 1) + i] - values[at(key, 1) + i]);
    const tangents = isCubic
      ? norm((i) => values[at(key, 2) + i]) + norm((i) => values[at(key + 1, 0) + i])
      : 0;
    most = Math.max(most, speed({ chord, tangents, time: times[key + 1] - times[key] }));
  }
  return most;
}

/**
 * Of a cubic's four components between two unit quaternions: that of the chord's middle, √(1 − c²/4), and less than that of any mean of the two; the
 * tangents' weights are 4/27 at most. Steps under 180° leave a quarter.
 */
const leastLength = (chord: number, tangents: number): number =>
  Math.max(0.2, Math.sqrt(Math.max(0, 1 - (chord * chord) / 4)) - (4 / 27) * tangents);
