import type { Accessor, Document, Node } from "@gltf-transform/core";
import {
  type ClipChannel,
  checkClipNames,
  contentKey,
  GENERATOR,
  type Graft,
  type NewNode,
  outputType,
  type SamplerType,
} from "./graft.js";

/**
 * A glTF-Transform transform that does to a document what `spliceGlb` does to a file: `await document.transform(throwClips(graft))`.
 * Indices of the model's own nodes count through `document.getRoot().listNodes()`.
 */
export function throwClips(graft: Graft): (document: Document) => void {
  return (document) => {
    const root = document.getRoot();
    checkClipNames(
      "the document",
      root.listAnimations().map((animation) => animation.getName()),
      graft.clips,
    );
    root.getAsset().generator = GENERATOR;
    const own = root.listNodes();
    const added = addNodes(document, graft.nodes);
    for (const { node, translation, rotation, scale } of graft.rests ?? []) {
      if (translation) own[node].setTranslation([...translation]);
      if (rotation) own[node].setRotation([...rotation]);
      if (scale) own[node].setScale([...scale]);
    }
    const buffer = root.listBuffers()[0] ?? document.createBuffer();
    const accessors = new Map<string, Accessor>();
    const accessor = (array: Float32Array | Int16Array, type: SamplerType): Accessor => {
      const key = contentKey(array, type);
      const known = accessors.get(key);
      if (known) return known;
      const made = document
        .createAccessor()
        .setType(type)
        .setBuffer(buffer)
        .setNormalized(array instanceof Int16Array);
      // A copy: a document's arrays are its owner's to change.
      made.setArray(array.slice());
      accessors.set(key, made);
      return made;
    };
    const nodeOf = (target: ClipChannel["target"]): Node =>
      "added" in target ? added[target.added] : own[target.node];
    for (const clip of graft.clips) {
      const animation = document.createAnimation(clip.name);
      if (clip.extras) animation.setExtras(clip.extras as Record<string, unknown>);
      for (const { target, path, interpolation, times, values } of clip.channels) {
        const sampler = document
          .createAnimationSampler()
          .setInput(accessor(times, "SCALAR"))
          .setOutput(accessor(values, outputType(path)))
          .setInterpolation(interpolation);
        const channel = document
          .createAnimationChannel()
          .setTargetNode(nodeOf(target))
          .setTargetPath(path)
          .setSampler(sampler);
        animation.addSampler(sampler).addChannel(channel);
      }
    }
  };
}

function addNodes(document: Document, nodes: NewNode[]): Node[] {
  const added = nodes.map(({ name, translation, rotation, scale }) => {
    const node = document.createNode(name);
    if (translation) node.setTranslation([...translation]);
    if (rotation) node.setRotation([...rotation]);
    if (scale) node.setScale([...scale]);
    return node;
  });
  if (added.length === 0) return added;
  const root = document.getRoot();
  const scene = root.getDefaultScene() ?? root.listScenes()[0] ?? document.createScene();
  root.setDefaultScene(scene);
  const former = scene.listChildren();
  const others = root.listScenes().filter((other) => other !== scene);
  const shared = others.map((other) => ({ other, nodes: other.listChildren() }));
  for (const child of former) scene.removeChild(child);
  nodes.forEach(({ children = [], holdsScene }, i) => {
    for (const child of children) added[i].addChild(added[child]);
    if (holdsScene) for (const child of former) added[i].addChild(child);
  });
  scene.addChild(added[0]);
  // glTF-Transform takes a node that becomes a child out of every scene.
  for (const { other, nodes: before } of shared) {
    if (other.listChildren().length === before.length) continue;
    for (const child of before) other.removeChild(child);
    for (const child of before) other.addChild(child.getParentNode() ? added[0] : child);
  }
  return added;
}
