import type { RotationKeys } from "./rotation-keys.js";
import type { SampledMotion } from "./sampled-motion.js";

/**
 * What the rotation keys leave to the translation: where the node (the model's origin) has to be for the *played* centre
 * of mass to lie on the true one, o = c − R̂·(centre of mass in the model), and how far the rotation alone moves points.
 */
export interface NodePath {
  /** How often the motion is compared: at its samples and the rotation keys. */
  count: number;
  /** s, ascending. */
  times: Float64Array;
  /** 4 numbers each: the node's place, world frame, m; greatest displacement by the rotation then or near by, m. */
  wanted: Float64Array;
  /** The same 4 numbers at any time of the grid. */
  wantedInto(index: number, out: Float64Array): void;
}

/** The node's path under `keys`. */
export function nodePath(motion: SampledMotion, keys: RotationKeys): NodePath {
  const { body, positions, rotations, time, samples, sampleIndex, last } = motion;
  const { indices: keyIndices, surcharges } = keys;
  const [cx, cy, cz] = body.centerOfMass;
  const diameter = 2 * body.reach;
  const pose = new Float64Array(7);
  const q = new Float64Array(4);
  let segment = -1;
  let played: ReturnType<RotationKeys["played"]>;

  const enter = (key: number): void => {
    if (key === segment) return;
    segment = key;
    played = keys.played(key);
  };

  const wantedAt = (
    t: number,
    position: Float64Array,
    p: number,
    rotation: Float64Array,
    r: number,
    surcharge: number,
    out: Float64Array,
    o: number,
  ): void => {
    played(t, q);
    const x = q[0];
    const y = q[1];
    const z = q[2];
    const w = q[3];
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
    out[o + 3] = diameter * Math.sqrt(chord * Math.max(0, 1 - chord / 4)) + surcharge;
  };

  /** At a time that belongs to two segments, what either may add counts. */
  const surchargeAt = (index: number, key: number): number =>
    index === keyIndices[key] && key > 0 ? Math.max(surcharges[key - 1], surcharges[key]) : surcharges[key];

  const wantedInto = (index: number, out: Float64Array): void => {
    let low = 0;
    for (let high = keyIndices.length - 1; high - low > 1; ) {
      const middle = (low + high) >> 1;
      if (keyIndices[middle] <= index) low = middle;
      else high = middle;
    }
    enter(low);
    motion.poseInto(index, pose);
    wantedAt(time(index), pose, 0, pose, 3, surchargeAt(index, low), out, 0);
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
      wantedAt(time(i), positions, 3 * sample, rotations, 4 * sample, surcharges[key], wanted, 4 * count);
      times[count++] = time(i);
    }
  }
  return { count, times, wanted, wantedInto };
}
