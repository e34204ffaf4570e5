/** The keys of a baked file's clips, read without a loader: many takes are posed from them at once. */

import type { GLTF } from "@gltf-transform/core";
import type { Channel, Track, Values } from "../../../clip/track.js";
import { SHORT } from "../../../gltf/accessor-layout.js";
import type { Container } from "./container.js";

/** What a clip moves. */
export interface ClipChannels {
  /** Index of the file's animation. */
  animation: number;
  track: Pick<Track, "translation" | "rotation">;
  /** Nodes by index; no translation: it turns alone. */
  nodes: { translation?: number; rotation: number };
}

const NO_KEYS: Channel = { interpolation: "LINEAR", times: new Float32Array(), values: new Float32Array() };

/** Throws an Error in words where the file has no such clip, or one that tossbake did not write. */
export function clipChannels(name: string, container: Container, clip: string): ClipChannels {
  const { json } = container;
  const animation = (json.animations ?? []).findIndex((each) => each.name === clip);
  if (animation < 0) throw new Error(`${name} has no clip "${clip}"`);
  const { channels, samplers } = json.animations![animation];
  const find = (path: string) => channels.find(({ target }) => target.path === path);
  const [translation, rotation] = [find("translation"), find("rotation")];
  if (rotation?.target.node === undefined)
    throw new Error(`the clip "${clip}" of ${name} turns no node: it is none of a throw`);
  const channel = (sampler: number) => readChannel(container, samplers[sampler]);
  return {
    animation,
    track: {
      translation: translation ? channel(translation.sampler) : NO_KEYS,
      rotation: channel(rotation.sampler),
    },
    nodes: { translation: translation?.target.node, rotation: rotation.target.node },
  };
}

function readChannel(
  container: Container,
  { input, output, interpolation }: GLTF.IAnimationSampler,
): Channel {
  return {
    interpolation: interpolation === "CUBICSPLINE" ? "CUBICSPLINE" : "LINEAR",
    times: readValues(container, input) as Float32Array,
    values: readValues(container, output),
  };
}

const COMPONENTS: Partial<Record<string, number>> = { SCALAR: 1, VEC3: 3, VEC4: 4 };

function readValues({ json, buffers }: Container, accessor: number): Values {
  const { bufferView, byteOffset = 0, count, type, componentType } = json.accessors![accessor];
  const view = json.bufferViews![bufferView!];
  const content = buffers[view.buffer];
  const start = content.byteOffset + (view.byteOffset ?? 0) + byteOffset;
  const length = count * COMPONENTS[type]!;
  const size = componentType === SHORT ? 2 : 4;
  const bytes = content.buffer.slice(start, start + size * length);
  return componentType === SHORT ? new Int16Array(bytes) : new Float32Array(bytes);
}
