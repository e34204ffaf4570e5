import { cos, sin } from "../math/elementary.js";
import { GreatCircle } from "./great-circle.js";
import type { RotationKeys } from "./linear-rotation.js";
import type { SampledFlight } from "./sampled-flight.js";

/**
 * What the rotation keys leave to the translation: where the node (the model's origin) has to be for the *played* centre
 * of mass to lie on the true one, o = c − R̂·(centre of mass in the model), and how far the rotation alone moves points.
 */
export interface NodePath {
  /** How often the motion is compared: at the flight's samples and the rotation keys. */
  count: number;
  /** s, ascending. */
  times: Float64Array;
  /** 4 numbers each: the node's place, world frame, m; greatest displacement by the rotation, m. */
  wanted: Float64Array;
  /** The same 4 numbers at any time of the grid. */
  wantedInto(index: number, out: Float64Array): void;
}

/** The node's path under `keys`. */
export function nodePath(flight: SampledFlight, keys: RotationKeys): NodePath {
  const { body, positions, rotations, time, samples, sampleIndex, last } = flight;
  const { indices: keyIndices, played } = keys;
  const [cx, cy, cz] = body.centerOfMass;
  const diameter = 2 * body.reach;
  const circle = new GreatCircle();
  const pose = new Float64Array(7);
  let segment = -1;
  let start = 0;
  let speed = 0;

  const enter = (key: number): void => {
    if (key === segment) return;
    segment = key;
    start = time(keyIndices[key]);
    circle.set(played, 4 * key, played, 4 * (key + 1));
    speed = circle.angle / (time(keyIndices[key + 1]) - start);
  };

  const wantedAt = (
    t: number,
    position: Float64Array,
    p: number,
    rotation: Float64Array,
    r: number,
    out: Float64Array,
    o: number,
  ): void => {
    const { from, side } = circle;
    const c = cos((t - start) * speed);
    const s = sin((t - start) * speed);
    const x = c * from[0] + s * side[0];
    const y = c * from[1] + s * side[1];
    const z = c * from[2] + s * side[2];
    const w = c * from[3] + s * side[3];
    const dx = x - rotation[r];
    const dy = y - rotation[r + 1];
    const dz = z - rotation[r + 2];
    const dw = w - rotation[r + 3];
    const chord = dx * dx + dy * dy + dz * dz + dw * dw;
    // R̂·com = com + w·t + u × t with t = 2u × com, u the vector part.
    const tx = 2 * (y * cz - z * cy);
    const ty = 2 * (z * cx - x * cz);
    const tz = 2 * (x * cy - y * cx);
    out[o] = position[p] - (cx + w * tx + y * tz - z * ty);
    out[o + 1] = position[p + 1] - (cy + w * ty + z * tx - x * tz);
    out[o + 2] = position[p + 2] - (cz + w * tz + x * ty - y * tx);
    // 2·reach·sin(θ/2) from the chord 2·sin(θ/4).
    out[o + 3] = diameter * Math.sqrt(chord * (1 - chord / 4));
  };

  const wantedInto = (index: number, out: Float64Array): void => {
    let low = 0;
    for (let high = keyIndices.length - 1; high - low > 1; ) {
      const middle = (low + high) >> 1;
      if (keyIndices[middle] <= index) low = middle;
      else high = middle;
    }
    enter(low);
    flight.poseInto(index, pose);
    wantedAt(time(index), pose, 0, pose, 3, out, 0);
  };

  const times = new Float64Array(samples + keyIndices.length);
  const wanted = new Float64Array(4 * times.length);
  const here = new Float64Array(4);
  let count = 0;
  let sample = 0;
  for (let key = 0; key < keyIndices.length; key++) {
    const index = keyIndices[key];
    wantedInto(index, here);
    wanted.set(here, 4 * count);
    times[count++] = time(index);
    if (index === last) break;
    if (sampleIndex(sample) === index) sample++;
    enter(key);
    for (; sampleIndex(sample) < keyIndices[key + 1]; sample++) {
      const i = sampleIndex(sample);
      wantedAt(time(i), positions, 3 * sample, rotations, 4 * sample, wanted, 4 * count);
      times[count++] = time(i);
    }
  }
  return { count, times, wanted, wantedInto };
}
