/** One take played from its baked file, as an engine plays it. */

import { type AnimationAction, AnimationMixer, Group, LoopOnce, type Matrix4, type Object3D } from "three";
import { clone } from "three/examples/jsm/utils/SkeletonUtils.js";
import type { Carrier } from "./clip-poses.js";
import type { LoadedFile } from "./loaded-file.js";

export class PlayedTake {
  readonly object: Object3D;
  /** What moves with the prop. */
  readonly content: Object3D;
  readonly #mixer: AnimationMixer;
  readonly #action: AnimationAction;
  readonly #toContent: Matrix4;
  readonly #attached: Group[] = [];

  /** @param asCopy leaves the file's own objects free for another take */
  constructor(file: LoadedFile, animation: number, carrier: Carrier, asCopy = false) {
    const content = file.node(carrier.content);
    this.object = asCopy ? clone(file.scene) : file.scene;
    this.content = asCopy ? atPath(this.object, pathTo(content, file.scene)) : content;
    this.#toContent = carrier.toContent;
    this.#mixer = new AnimationMixer(this.object);
    this.#action = this.#mixer.clipAction(file.animations[animation]);
    this.#action.setLoop(LoopOnce, 1);
    this.#action.clampWhenFinished = true;
    this.#action.play();
    this.seek(0);
  }

  /** s within the clip; beyond its ends it stands still. */
  seek(t: number): void {
    this.#action.time = Math.max(0, Math.min(t, this.#action.getClip().duration));
    this.#mixer.update(0);
    this.object.updateMatrixWorld(true);
  }

  /** From the model as modelled, in m, to the world, as the scene graph has it. */
  matrix(): Matrix4 {
    return this.content.matrixWorld.clone().multiply(this.#toContent);
  }

  /** Puts something that is in metres as modelled where the prop is. */
  attach(object: Object3D): void {
    const holder = new Group();
    holder.matrixAutoUpdate = false;
    holder.matrix.copy(this.#toContent);
    holder.add(object);
    this.content.add(holder);
    this.#attached.push(holder);
    this.object.updateMatrixWorld(true);
  }

  /** The file's own objects stay as they are. */
  dispose(): void {
    for (const holder of this.#attached) holder.removeFromParent();
    this.#mixer.stopAllAction();
    this.#mixer.uncacheRoot(this.object);
    this.object.removeFromParent();
  }
}

function pathTo(object: Object3D, root: Object3D): number[] {
  const path: number[] = [];
  for (let at = object; at !== root; at = at.parent!) path.unshift(at.parent!.children.indexOf(at));
  return path;
}

const atPath = (root: Object3D, path: readonly number[]): Object3D =>
  path.reduce((object, index) => object.children[index], root);
