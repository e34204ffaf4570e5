/** Clips written and read by a general glTF library (glTF-Transform), as a pipeline made of libraries would. */

import { type Animation, type Document, type Node, NodeIO } from "@gltf-transform/core";
import { ALL_EXTENSIONS } from "@gltf-transform/extensions";

/** Linear keys. */
export interface Channel {
  times: Float32Array;
  values: Float32Array | Int16Array;
}

export interface ClipChannels {
  translation: Channel;
  rotation: Channel;
}

export const io = new NodeIO().registerExtensions(ALL_EXTENSIONS);

/** A new node over the whole scene. */
export function nodeOverScene(document: Document, name: string): Node {
  const root = document.getRoot();
  const scene = root.getDefaultScene() ?? root.listScenes()[0];
  const node = document.createNode(name);
  for (const child of scene.listChildren()) node.addChild(child);
  scene.addChild(node);
  return node;
}

export function addClip(document: Document, node: Node, name: string, channels: ClipChannels): void {
  const animation = document.createAnimation(name);
  for (const path of ["translation", "rotation"] as const)
    addChannel(document, animation, node, path, channels[path]);
}

function addChannel(
  document: Document,
  animation: Animation,
  node: Node,
  path: "translation" | "rotation",
  { times, values }: Channel,
): void {
  const buffer = document.getRoot().listBuffers()[0];
  const accessor = (array: Channel["values"], type: "SCALAR" | "VEC3" | "VEC4") =>
    document
      .createAccessor()
      .setArray(array as Float32Array<ArrayBuffer>)
      .setType(type)
      .setBuffer(buffer);
  const sampler = document
    .createAnimationSampler()
    .setInterpolation("LINEAR")
    .setInput(accessor(times, "SCALAR"))
    .setOutput(accessor(values, path === "translation" ? "VEC3" : "VEC4"));
  const channel = document
    .createAnimationChannel()
    .setTargetNode(node)
    .setTargetPath(path)
    .setSampler(sampler);
  animation.addSampler(sampler).addChannel(channel);
}

/** The clips of a file, in its order. */
export async function readClips(glb: Uint8Array): Promise<ClipChannels[]> {
  const document = await io.readBinary(glb);
  return document
    .getRoot()
    .listAnimations()
    .map((animation) => {
      const channelOf = (path: string): Channel => {
        const sampler = animation
          .listChannels()
          .find((channel) => channel.getTargetPath() === path)
          ?.getSampler();
        return {
          times: sampler?.getInput()?.getArray() as Float32Array,
          values: sampler?.getOutput()?.getArray() as Float32Array,
        };
      };
      return { translation: channelOf("translation"), rotation: channelOf("rotation") };
    });
}
