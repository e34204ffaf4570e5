/** three.js as a player of glTF: what it shows of a clip. */

import { AnimationMixer, Vector3 } from "three";
import { GLTFLoader } from "three/examples/jsm/loaders/GLTFLoader.js";
import type { Vec3 } from "../../src/math/vec3.js";
import type { Player } from "./player.js";

export const three: Player = {
  name: "three.js",
  async open(glb) {
    // Node has no images to decode textures with; the demo's models have none
    const { scene, animations } = await new GLTFLoader().parseAsync(glb.slice().buffer, "");
    return {
      clips: animations.map(({ name }) => name),
      play(clip, name) {
        const mixer = new AnimationMixer(scene);
        mixer.clipAction(animations.find(({ name }) => name === clip)!).play();
        const node = name === undefined ? scene.children[0] : scene.getObjectByName(name)!;
        const point = new Vector3();
        return {
          seek(time) {
            mixer.setTime(time);
            scene.updateMatrixWorld(true);
            return (p: Vec3): Vec3 =>
              point
                .set(...p)
                .applyMatrix4(node.matrixWorld)
                .toArray();
          },
          end: () => mixer.stopAllAction(),
        };
      },
    };
  },
};
