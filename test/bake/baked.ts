/** Throw files baked in memory, and what stands in the files that come of them. */

import { type Bake, bake } from "../../src/bake/bake.js";
import type { MotionState } from "../../src/bake/motion.js";
import type { ModelSource } from "../../src/bake/props.js";
import { splitGlb } from "../../src/gltf/glb.js";
import { readModel } from "../../src/gltf/read.js";
import type { Vec3 } from "../../src/math/vec3.js";
import type { ClipRecord, TakesRecord } from "../../src/record/clip-record.js";
import { recordOf } from "../../src/record/record-of.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";

interface FlownState extends MotionState {
  velocity: Vec3;
}

/** What the clip of a throw that flies has; the tests of others say so. */
export interface FlownClip extends ClipRecord {
  candidate: number;
  apex: NonNullable<ClipRecord["apex"]>;
  release: FlownState;
  arrival: FlownState;
  flight: NonNullable<ClipRecord["flight"]>;
}

export interface Baked {
  bake: Bake;
  record: Omit<TakesRecord, "clips"> & { clips: FlownClip[] };
  /** Bytes of a throw's file. */
  glb(throwName: string): Uint8Array;
}

/** Models are asked for by their path and are the bytes given. */
export async function baked(text: string, models: Record<string, Uint8Array> = {}): Promise<Baked> {
  const file = parseThrowFile("test.throws.yaml", text);
  const source: ModelSource = async (path) => ({ model: await readModel(path, models[path]), sha256: "" });
  const made = await bake(file, source);
  return {
    bake: made,
    record: (await recordOf(file, text, made)) as Baked["record"],
    glb: (name) => made.files.find((file) => file.name === `${name}.glb`)!.content,
  };
}

export const jsonOf = (glb: Uint8Array) => JSON.parse(new TextDecoder().decode(splitGlb("", glb).json));

export interface ReadClip {
  name: string;
  // biome-ignore lint/suspicious/noExplicitAny: whatever was written
  extras: any;
  /** By path: times and values. */
  [path: string]: { times: number[]; values: number[] } | unknown;
}

/** Every animation of a file, its float32 keys read as glTF 2.0, 3.6 says. */
export function clipsOf(glb: Uint8Array): Record<string, ReadClip> {
  const { binary } = splitGlb("", glb);
  const json = jsonOf(glb);
  const read = (index: number): number[] => {
    const { bufferView, byteOffset = 0, count, type } = json.accessors[index];
    const at = (json.bufferViews[bufferView].byteOffset ?? 0) + byteOffset;
    const size = { SCALAR: 1, VEC3: 3, VEC4: 4 }[type as string]! * count;
    return Array.from(new Float32Array(binary!.slice(at, at + 4 * size).buffer));
  };
  return Object.fromEntries(
    // biome-ignore lint/suspicious/noExplicitAny: raw glTF
    json.animations.map((animation: any) => {
      const clip: ReadClip = { name: animation.name, extras: animation.extras };
      for (const { sampler, target } of animation.channels) {
        const { input, output } = animation.samplers[sampler];
        clip[target.path] = { times: read(input), values: read(output) };
      }
      return [animation.name, clip];
    }),
  );
}
