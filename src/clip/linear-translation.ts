import { longestSegments } from "./longest-segments.js";
import type { NodePath } from "./node-path.js";
import type { SampledFlight } from "./sampled-flight.js";
import { STRIDE } from "./time-grid.js";

/** Translation keys on the times of a flight's grid. */
export interface TranslationKeys {
  /** Grid index of each key. */
  indices: number[];
  /** As stored, 3 numbers a key. */
  values: Float32Array;
  /** Greatest displacement of any point, by both channels together, at the times compared and the keys, m. */
  error: number;
}

/**
 * The fewest translation keys found with which no point is further than `limit` m from the true motion at any time
 * compared, the rotation being played as `path` says; undefined where not even a key on every time of the grid does it.
 * Each key is where the node has to be, rounded to float32.
 *
 * The displacement of the worst point is at most |Δc| + 2·reach·sin(θ/2): Δc that of the played centre of mass, θ the
 * angle between played and true rotation. It is that much where Δc is square to the axis of θ.
 */
export function translationKeys(
  flight: SampledFlight,
  path: NodePath,
  limit: number,
): TranslationKeys | undefined {
  const { time, last } = flight;
  const { count, times, wanted } = path;
  // The segment in hand: its key, its whole way, its time and speed, and the first time compared in it.
  const from = new Float64Array(4);
  const to = new Float64Array(4);
  const way = new Float64Array(3);
  let fromIndex = -1;
  let start = 0;
  let rate = 0;
  let begin = 0;

  /** Takes the segment from grid index `a` to `b` in hand; returns the displacement at `b`. */
  const enter = (a: number, b: number): number => {
    if (a !== fromIndex) {
      path.wantedInto(a, from);
      for (let i = 0; i < 3; i++) from[i] = Math.fround(from[i]);
      fromIndex = a;
      start = time(a);
      if (a === 0) begin = 0;
      while (times[begin] < start) begin++;
    }
    path.wantedInto(b, to);
    let square = 0;
    for (let i = 0; i < 3; i++) {
      const stored = Math.fround(to[i]);
      way[i] = stored - from[i];
      square += (stored - to[i]) * (stored - to[i]);
    }
    rate = 1 / (time(b) - start);
    return Math.sqrt(square) + to[3];
  };

  const displacement = (k: number): number => {
    const share = (times[k] - start) * rate;
    const x = from[0] + share * way[0] - wanted[4 * k];
    const y = from[1] + share * way[1] - wanted[4 * k + 1];
    const z = from[2] + share * way[2] - wanted[4 * k + 2];
    return Math.sqrt(x * x + y * y + z * z) + wanted[4 * k + 3];
  };

  const fits = (a: number, b: number): boolean => {
    if (enter(a, b) > limit) return false;
    const end = time(b);
    // Half the segments tried are too long; most of those show it about the middle.
    const middle = Math.min(count - 1, begin + Math.floor((b - a) / (2 * STRIDE)));
    if (times[middle] < end && displacement(middle) > limit) return false;
    for (let k = begin; k < count && times[k] < end; k++) if (displacement(k) > limit) return false;
    return true;
  };

  const indices = longestSegments(last, fits);
  if (!indices) return undefined;

  const values = new Float32Array(3 * indices.length);
  let error = 0;
  for (let key = 1; key < indices.length; key++) {
    error = Math.max(error, enter(indices[key - 1], indices[key]));
    const end = time(indices[key]);
    for (let k = begin; k < count && times[k] <= end; k++) error = Math.max(error, displacement(k));
    if (key === 1) values.set(from.subarray(0, 3));
    values.set(to.subarray(0, 3), 3 * key);
  }
  return { indices, values, error };
}
