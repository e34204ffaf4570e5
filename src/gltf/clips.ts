/** The animations of a model as arrays of numbers. */

import type { Accessor, GLTF } from "@gltf-transform/core";
import { FLOAT } from "./accessor-layout.js";
import { decodeAccessors } from "./accessors.js";
import { shown } from "./checker.js";
import { type Model, ModelError } from "./model.js";

export interface ClipKeys {
  interpolation: "LINEAR" | "STEP" | "CUBICSPLINE";
  /** s, ascending, from 0 or later. */
  times: Float32Array;
  /** As `Channel` has them, of STEP as of LINEAR; normalised integers already as the numbers they stand for. */
  values: Float32Array;
}

export interface ReadChannel extends ClipKeys {
  node: number;
  path: "translation" | "rotation" | "scale" | "weights";
}

export interface ReadClip {
  /** "" where it has none. */
  name: string;
  /** Those that move nodes. */
  channels: ReadChannel[];
  /** JSON pointers to properties of nodes that it animates besides (KHR_animation_pointer). */
  pointers: string[];
  extras: unknown;
}

const POINTER = "KHR_animation_pointer";

/** Numbers a key; of morph weights there are as many as targets. */
const SIZES = { translation: 3, rotation: 4, scale: 3, weights: undefined };

/** By interpolation, of times a key's numbers are written. */
const PARTS = { LINEAR: 1, STEP: 1, CUBICSPLINE: 3 };

/**
 * All animations of a model, in its order; glTF 2.0, 3.11. Channels without a node are left out, as the specification says.
 *
 * @throws ModelError for keys that nothing could play: times that do not rise or are no numbers, too few values, rotations of no length
 */
export async function readClips(model: Model): Promise<ReadClip[]> {
  const { animations = [] } = model.json;
  const wanted = animations.flatMap(({ samplers = [] }) =>
    samplers.flatMap(({ input, output }) => [input, output]),
  );
  const decoded = await decodeAccessors(model, wanted);
  return animations.map(({ name = "", channels = [], samplers = [], extras }, a) => {
    const read: ReadChannel[] = [];
    const pointers: string[] = [];
    channels.forEach((channel, c) => {
      const where = `animations[${a}].channels[${c}]`;
      const pointer = pointerOf(channel.target);
      if (pointer?.startsWith("/nodes/")) pointers.push(pointer);
      if (pointer !== undefined || channel.target.node === undefined) return;
      const path = pathOf(model, channel.target.path, where);
      const sampler = samplers[channel.sampler];
      const samplerWhere = `animations[${a}].samplers[${channel.sampler}]`;
      const keys = keysOf(model, path, sampler, decoded, samplerWhere);
      read.push({ node: channel.target.node, path, ...keys });
    });
    return { name, channels: read, pointers, extras };
  });
}

const pointerOf = (target: GLTF.IAnimationChannelTarget): string | undefined => {
  const extension = target.extensions?.[POINTER] as { pointer?: unknown } | null | undefined;
  if (typeof extension !== "object" || extension === null) return undefined;
  return typeof extension.pointer === "string" ? extension.pointer : "";
};

function pathOf({ name }: Model, path: unknown, where: string): ReadChannel["path"] {
  if (typeof path === "string" && Object.hasOwn(SIZES, path)) return path as ReadChannel["path"];
  throw new ModelError(
    name,
    `${where}.target.path is ${shown(path)}`,
    `it must be one of ${Object.keys(SIZES).join(", ")}`,
  );
}

function keysOf(
  model: Model,
  path: ReadChannel["path"],
  { input, output, interpolation = "LINEAR" }: GLTF.IAnimationSampler,
  decoded: ReadonlyMap<number, Accessor>,
  where: string,
): ClipKeys {
  const refuse = (fault: string, remedy: string): never => {
    throw new ModelError(model.name, `${where}${fault}`, remedy);
  };
  if (typeof interpolation !== "string" || !Object.hasOwn(PARTS, interpolation))
    refuse(`.interpolation is ${shown(interpolation)}`, `it must be one of ${Object.keys(PARTS).join(", ")}`);
  const [clock, keyed] = [model.json.accessors![input], model.json.accessors![output]];
  if (clock.type !== "SCALAR" || clock.componentType !== FLOAT)
    refuse(`.input has the type ${clock.type} of ${clock.componentType}`, "it must be SCALAR of floats");
  const times = numbersOf(decoded.get(input)!);
  times.forEach((time, i) => {
    if (!(time >= 0 && time < Infinity))
      refuse(`.input has the time ${time} s (key ${i})`, "it must be finite, 0 or more");
    if (i > 0 && !(time > times[i - 1]))
      refuse(`.input has ${time} s after ${times[i - 1]} s (key ${i})`, "times must rise");
  });
  const values = numbersOf(decoded.get(output)!);
  const parts = PARTS[interpolation];
  const size = SIZES[path] ?? values.length / (times.length * parts);
  const type = { translation: "VEC3", rotation: "VEC4", scale: "VEC3", weights: "SCALAR" }[path];
  if (keyed.type !== type) refuse(`.output has the type ${keyed.type}`, `${path} needs ${type}`);
  if (!Number.isInteger(size) || size < 1 || values.length !== times.length * parts * size)
    refuse(
      `.output has ${keyed.count} entries`,
      `it must have ${path === "weights" ? "a whole number" : parts} for each of its ${times.length} times`,
    );
  values.forEach((value, i) => {
    if (!Number.isFinite(value))
      refuse(
        `.output has a number that is ${value} (key ${Math.floor(i / size / parts)})`,
        "it must be finite",
      );
  });
  if (path === "rotation") checkRotations(values, parts, refuse);
  return { interpolation, times, values };
}

/** Key values, not tangents: any other length than 0 is made 1 by players. */
function checkRotations(
  values: Float32Array,
  parts: number,
  refuse: (fault: string, remedy: string) => never,
): void {
  const step = 4 * parts;
  for (let i = parts === 3 ? 4 : 0; i < values.length; i += step)
    if (values.subarray(i, i + 4).every((component) => component === 0))
      refuse(
        `.output has a rotation of length 0 (key ${Math.floor(i / step)})`,
        "it must be a unit quaternion",
      );
}

/** Whatever they are stored as. */
function numbersOf(accessor: Accessor): Float32Array {
  const stored = accessor.getArray()!;
  if (stored instanceof Float32Array) return stored;
  const size = accessor.getElementSize();
  const numbers = new Float32Array(stored.length);
  const element: number[] = [];
  for (let i = 0; i < accessor.getCount(); i++) numbers.set(accessor.getElement(i, element), size * i);
  return numbers;
}
