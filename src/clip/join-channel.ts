import type { Channel, Values } from "./track.js";

/** What the greatest int16 stands for 1 with (glTF 2.0, 3.6.2.2). */
export const FULL_INT16 = 32767;

/** When a part flies, s within the clip. */
export interface PartTimes {
  start: number;
  end: number;
}

/** A channel of several. */
export interface Joint {
  channel: Channel;
  /** s, for each part: how far the rounding of times moved its keys, at most. */
  shifts: number[];
  /** Greatest distance of two values that were made one, as stored. */
  seam: number;
}

/** As stored; tangents of a cubic spline only. */
interface Key {
  time: number;
  value: number[];
  into: number[];
  out: number[];
}

/**
 * The keys of channels of one kind, each moved to where its part lies in the clip. Undefined where times would not ascend once they are rounded.
 *
 * @param size numbers a value
 */
export function joinChannel(
  channels: readonly Channel[],
  size: number,
  times: readonly PartTimes[],
  total: number,
  isLoop: boolean,
): Joint | undefined {
  if (channels.every((channel) => channel.times.length === 0))
    return { channel: channels[0], shifts: channels.map(() => 0), seam: 0 };
  const still = Array<number>(size).fill(0);
  const keys: Key[] = [];
  const shifts: number[] = [];
  let seam = 0;
  const stand = (time: number, value: number[]) => keys.push({ time, value, into: still, out: still });
  channels.forEach((channel, part) => {
    const { start, end } = times[part];
    const old = keysOf(channel, size);
    const moved = old.map((key, k) => ({
      ...key,
      time: Math.fround(k + 1 === old.length ? end : start + key.time),
    }));
    shifts.push(Math.max(...moved.map((key, k) => Math.abs(key.time - (start + old[k].time)))));
    const before = keys.at(-1);
    if (before && size === 4 && dot(before.value, moved[0].value) < 0) moved.forEach(turnRound);
    const [first] = moved;
    if (before) {
      seam = Math.max(seam, distance(before.value, first.value));
      first.value = before.value;
      if (before.time === first.time) {
        first.into = before.into;
        keys.pop();
      } else {
        before.out = still;
        first.into = still;
      }
    } else if (first.time > 0) {
      stand(0, first.value);
      first.into = still;
    }
    keys.push(...moved);
  });
  const last = keys[keys.length - 1];
  if (isLoop) {
    const [{ value }] = keys;
    const closed = size === 4 && dot(value, last.value) < 0 ? value.map((c) => -c) : value;
    seam = Math.max(seam, distance(closed, last.value));
    last.value = closed;
  }
  if (Math.fround(total) > last.time) {
    last.out = still;
    stand(Math.fround(total), last.value);
  }
  if (keys.some(({ time }, k) => k > 0 && time <= keys[k - 1].time)) return undefined;
  return { channel: channelOf(keys, channels[0]), shifts, seam };
}

function keysOf({ times, values, interpolation }: Channel, size: number): Key[] {
  const slice = (at: number) => Array.from(values.subarray(at * size, (at + 1) * size));
  return Array.from(times, (time, key) =>
    interpolation === "LINEAR"
      ? { time, value: slice(key), into: [], out: [] }
      : { time, into: slice(3 * key), value: slice(3 * key + 1), out: slice(3 * key + 2) },
  );
}

function channelOf(keys: readonly Key[], { interpolation, values }: Channel): Channel {
  const flat = keys.flatMap(({ into, value, out }) =>
    interpolation === "LINEAR" ? value : [...into, ...value, ...out],
  );
  const stored: Values = values instanceof Int16Array ? Int16Array.from(flat) : Float32Array.from(flat);
  return { interpolation, times: Float32Array.from(keys, ({ time }) => time), values: stored };
}

/** q and −q are the same rotation. */
function turnRound(key: Key): void {
  const negative = (v: number[]) => v.map((c) => -c);
  key.value = negative(key.value);
  key.into = negative(key.into);
  key.out = negative(key.out);
}

const dot = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, c, i) => sum + c * b[i], 0);

function distance(a: readonly number[], b: readonly number[]): number {
  let square = 0;
  for (let i = 0; i < a.length; i++) square += (a[i] - b[i]) * (a[i] - b[i]);
  return Math.sqrt(square);
}
