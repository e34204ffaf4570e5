import type { Animation, AnimationChannel, Document, Node } from "@gltf-transform/core";
import type { Body } from "../clip/body.js";
import { cutMotion } from "../clip/cut.js";
import { sampleKeys } from "../clip/sampled-keys.js";
import { smallestTrack } from "../clip/smallest.js";
import { floatStore } from "../clip/store-rotation.js";
import { fromOrigin } from "../clip/time-grid.js";
import { type Channel, type Track, trackBytes } from "../clip/track.js";
import { length, ZERO } from "../math/vec3.js";
import { nodeBall } from "./node-ball.js";
import { leftAlone, STILL_SCALE } from "./reducible.js";

/** How far `reduceRigidClips` may move anything, and with which keys. */
export interface ReduceOptions {
  /** No point of a node's geometry is moved further than this, scene frame, m. */
  toleranceMetres: number;
  /** As a throw file's; default `linear`, which plays everywhere. */
  keys?: "linear" | "cubic" | "smallest";
  /** Told of every clip and node it moves, in the document's order. */
  onClip?: (report: ReducedClip) => void;
}

/** What became of one clip and one node that it moves. */
export interface ReducedClip {
  clip: string;
  node: string;
  /** Why it was left as it was; undefined where it was cut again. */
  left?: string;
  /** Proved, m; 0 where left. */
  error: number;
  bytes: { before: number; after: number };
}

/** float32 steps of the greatest coordinate that keys need, as `leastTolerance` says. */
const LEAST_STEPS = 4 / 0x80_00_00;

/**
 * A glTF-Transform transform that gives clips which move a node as one rigid piece few keys: `await document.transform(reduceRigidClips({
 * toleranceMetres: 0.001 }))`. Translation and rotation of a node are cut together, by the same proof as throws: no point of the geometry at or
 * below the node is further than the tolerance from where the clip had it, at any time. The first and the last keys stay, to float32.
 *
 * What cannot be proved, or would not get smaller, is left as it was and told to `onClip`: other curves than linear ones, a scale
 * that changes, morphing geometry, none at all, and nodes above or below others that the same clip moves.
 */
export function reduceRigidClips(options: ReduceOptions): (document: Document) => void {
  const { onClip = () => undefined } = options;
  return (document) => {
    for (const clip of document.getRoot().listAnimations())
      for (const node of targets(clip)) {
        const report = reduced(document, clip, node, options);
        onClip({ clip: clip.getName(), node: node.getName(), ...report });
      }
  };
}

const targets = (clip: Animation): Node[] => [
  ...new Set(clip.listChannels().flatMap((channel) => channel.getTargetNode() ?? [])),
];

function reduced(
  document: Document,
  clip: Animation,
  node: Node,
  { toleranceMetres, keys = "linear" }: ReduceOptions,
): Omit<ReducedClip, "clip" | "node"> {
  const all = clip.listChannels().filter((channel) => channel.getTargetNode() === node);
  const channels = all.filter((channel) => channel.getTargetPath() !== "scale");
  const left = (why: string) => ({ left: why, error: 0, bytes: { before, after: before } });
  let before = 0;
  for (const channel of channels) {
    const sampler = channel.getSampler();
    before += (sampler?.getInput()?.getByteLength() ?? 0) + (sampler?.getOutput()?.getByteLength() ?? 0);
  }
  const reason = leftAlone(clip, node, all);
  if (reason !== undefined) return left(reason);
  const of = (path: string) => channels.find((channel) => channel.getTargetPath() === path);
  const [translation, rotation] = [of("translation"), of("rotation")];
  const source: Track = {
    translation: linearChannel(translation, node.getTranslation()),
    rotation: linearChannel(rotation, node.getRotation()),
    duration: 0,
    error: 0,
  };
  const ball = nodeBall(node);
  if (ball === undefined) return left("nothing at or below the node has geometry");
  // as much as a scale that stands still may make of it
  if (all.length > channels.length) ball.radius += STILL_SCALE * (length(ball.center) + ball.radius);
  // Turned about its own origin alone, or not at all, the node needs only that.
  const body: Body = !rotation
    ? { centerOfMass: ZERO, axes: [0, 0, 0, 1], reach: 0 }
    : translation
      ? { centerOfMass: ball.center, axes: [0, 0, 0, 1], reach: ball.radius }
      : { centerOfMass: ZERO, axes: [0, 0, 0, 1], reach: length(ball.center) + ball.radius };
  const tolerance = toleranceMetres / ball.outerScale;
  let greatest = 0;
  for (const c of source.translation.values) greatest = Math.max(greatest, Math.abs(c));
  if (!(tolerance >= LEAST_STEPS * (greatest + fromOrigin(body))))
    return left("the tolerance is finer than float32 keys can hold");

  const motion = sampleKeys(source, body, tolerance);
  const limit = tolerance - motion.surcharge;
  const withTranslation = translation !== undefined;
  const cut =
    keys === "smallest"
      ? smallestTrack(motion, limit, floatStore, withTranslation)
      : cutMotion(motion, limit, {
          rotation: keys,
          translation: withTranslation ? keys : "none",
          store: floatStore,
        });
  if (!cut) return left("no keys were found that hold the tolerance");
  const empty: Channel = { interpolation: "LINEAR", times: new Float32Array(), values: new Float32Array() };
  const after = trackBytes({ ...cut, ...(!rotation && { rotation: empty }) });
  if (after >= before) return left("it has few keys already");
  if (translation) write(document, clip, translation, cut.translation);
  if (rotation) write(document, clip, rotation, cut.rotation);
  return { error: cut.error * ball.outerScale, bytes: { before, after } };
}

/** A channel's keys as float32; of a node's own rest where nothing moves it. */
function linearChannel(channel: AnimationChannel | undefined, rest: readonly number[]): Channel {
  const sampler = channel?.getSampler();
  const [input, output] = [sampler?.getInput(), sampler?.getOutput()];
  if (!input || !output)
    return { interpolation: "LINEAR", times: Float32Array.of(0), values: Float32Array.from(rest) };
  const size = rest.length;
  const values = new Float32Array(size * output.getCount());
  const element: number[] = [];
  for (let i = 0; i < output.getCount(); i++) values.set(output.getElement(i, element), size * i);
  return { interpolation: "LINEAR", times: Float32Array.from(input.getArray() ?? []), values };
}

/** Puts a channel on a sampler of its own with these keys; what only the old one used goes. */
function write(document: Document, clip: Animation, channel: AnimationChannel, keys: Channel): void {
  const old = channel.getSampler()!;
  const [input, output] = [old.getInput()!, old.getOutput()!];
  const buffer = input.getBuffer();
  const accessor = (array: Channel["values"], type: "SCALAR" | "VEC3" | "VEC4") =>
    document.createAccessor().setType(type).setArray(array.slice()).setBuffer(buffer);
  const sampler = document
    .createAnimationSampler()
    .setInterpolation(keys.interpolation)
    .setInput(accessor(keys.times, "SCALAR"))
    .setOutput(accessor(keys.values, channel.getTargetPath() === "rotation" ? "VEC4" : "VEC3"));
  clip.addSampler(sampler);
  channel.setSampler(sampler);
  for (const property of [old, input, output])
    if (property.listParents().every((parent) => parent === document.getRoot() || parent === clip))
      property.dispose();
}
