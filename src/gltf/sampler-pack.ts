import type { GLTF } from "@gltf-transform/core";
import { FLOAT, SHORT } from "./accessor-layout.js";
import { type ClipChannel, contentKey, type NewClip, outputType, type SamplerType } from "./graft.js";

/**
 * Lays the keys of clips one behind the other for a single buffer view, each array once however many channels use it
 * (takes of one length share their times).
 */
export class SamplerPack {
  readonly accessors: GLTF.IAccessor[] = [];
  byteLength = 0;
  readonly #arrays: { at: number; array: Float32Array | Int16Array }[] = [];
  readonly #known = new Map<string, number>();

  constructor(
    readonly bufferView: number,
    readonly firstAccessor: number,
  ) {}

  /** The animation of a clip; `nodeOf` gives the node a channel moves. */
  animation(clip: NewClip, nodeOf: (target: ClipChannel["target"]) => number): GLTF.IAnimation {
    return {
      name: clip.name,
      ...(clip.extras && { extras: clip.extras as Record<string, unknown> }),
      channels: clip.channels.map(({ target, path }, sampler) => ({
        sampler,
        target: { node: nodeOf(target), path },
      })),
      samplers: clip.channels.map(({ path, interpolation, times, values }) => ({
        input: this.#add(times, "SCALAR"),
        output: this.#add(values, outputType(path)),
        // What a reader takes where nothing is said (glTF 2.0, 5.5).
        ...(interpolation !== "LINEAR" && { interpolation }),
      })),
    };
  }

  /** Little-endian, as glTF has it. */
  write(bytes: Uint8Array, start: number): void {
    const view = new DataView(bytes.buffer, bytes.byteOffset + start, this.byteLength);
    for (const { at, array } of this.#arrays) {
      if (array instanceof Int16Array)
        for (let i = 0; i < array.length; i++) view.setInt16(at + 2 * i, array[i], true);
      else for (let i = 0; i < array.length; i++) view.setFloat32(at + 4 * i, array[i], true);
    }
  }

  #add(array: Float32Array | Int16Array, type: SamplerType): number {
    const floats = array instanceof Float32Array;
    const key = contentKey(array, type);
    const known = this.#known.get(key);
    if (known !== undefined) return known;
    const index = this.firstAccessor + this.accessors.length;
    this.accessors.push({
      bufferView: this.bufferView,
      ...(this.byteLength > 0 && { byteOffset: this.byteLength }),
      componentType: floats ? FLOAT : SHORT,
      ...(!floats && { normalized: true }),
      count: array.length / { SCALAR: 1, VEC3: 3, VEC4: 4 }[type],
      type,
      // Required of times (glTF 2.0, 3.11).
      ...(type === "SCALAR" && { min: [shortest(array[0])], max: [shortest(array[array.length - 1])] }),
    });
    this.#known.set(key, index);
    this.#arrays.push({ at: this.byteLength, array });
    // Four int16 or any floats: always a multiple of four.
    this.byteLength += array.byteLength;
    return index;
  }
}

/**
 * The number with fewest digits that is this float32 once it is rounded to float32, as readers treat an accessor's bounds
 * (glTF 2.0, 3.6.2.5): 0.94 for 0.9399999976158142.
 */
function shortest(value: number): number {
  for (let digits = 1; digits < 9; digits++) {
    const short = Number(value.toPrecision(digits));
    if (Math.fround(short) === value) return short;
  }
  return value;
}
