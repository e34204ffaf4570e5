/** three.js as a player of glTF: what it shows of a clip. */

import { AnimationMixer, LoopOnce, Vector3 } from "three";
import { GLTFLoader } from "three/examples/jsm/loaders/GLTFLoader.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { isJson, type Player, STEP } from "./player.js";

// Its loader tells of progress by an event that Node does not have.
globalThis.ProgressEvent ??= class extends Event {} as unknown as typeof ProgressEvent;

export const three: Player = {
  name: "three.js",
  async open(file) {
    // Node has no images to decode textures with; the demo's models have none
    const { scene, animations } = await new GLTFLoader().parseAsync(
      isJson(file) ? new TextDecoder().decode(file) : file.slice().buffer,
      "",
    );
    return {
      clips: animations.map(({ name }) => name),
      play(clip, name, loop = true) {
        const mixer = new AnimationMixer(scene);
        const action = mixer.clipAction(animations.find(({ name }) => name === clip)!);
        if (!loop) {
          action.setLoop(LoopOnce, 1);
          action.clampWhenFinished = true;
        }
        action.play();
        const node = name === undefined ? scene.children[0] : scene.getObjectByName(name)!;
        const point = new Vector3();
        const shown = () => {
          scene.updateMatrixWorld(true);
          return (p: Vec3): Vec3 =>
            point
              .set(...p)
              .applyMatrix4(node.matrixWorld)
              .toArray();
        };
        return {
          seek(time) {
            mixer.setTime(time);
            return shown();
          },
          run() {
            mixer.update(STEP);
            return shown();
          },
          end: () => mixer.stopAllAction(),
        };
      },
    };
  },
};
