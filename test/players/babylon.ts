/** Babylon.js as a player of glTF: what it shows of a clip. */

import { NullEngine } from "@babylonjs/core/Engines/nullEngine.js";
import "@babylonjs/core/Helpers/sceneHelpers.js";
import { AppendSceneAsync } from "@babylonjs/core/Loading/sceneLoader.js";
import { Vector3 } from "@babylonjs/core/Maths/math.vector.js";
import type { TransformNode } from "@babylonjs/core/Meshes/transformNode.js";
import { Scene } from "@babylonjs/core/scene.js";
import "@babylonjs/loaders/glTF/2.0/index.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { isJson, type Player } from "./player.js";

export const babylon: Player = {
  name: "Babylon.js",
  async open(file) {
    const scene = new Scene(new NullEngine());
    scene.useRightHandedSystem = true;
    if (isJson(file))
      await AppendSceneAsync(`data:${new TextDecoder().decode(file)}`, scene, { pluginExtension: ".gltf" });
    else await AppendSceneAsync(new Uint8Array(file), scene, { pluginExtension: ".glb" });
    scene.createDefaultCamera();
    for (const group of scene.animationGroups) group.stop();
    return {
      clips: scene.animationGroups.map(({ name }) => name),
      play(clip, name, loop = true) {
        const group = scene.animationGroups.find(({ name }) => name === clip)!;
        const [root] = scene.rootNodes.filter(({ name }) => name === "__root__");
        const [only] = (root as TransformNode).getChildTransformNodes(true);
        const node = name === undefined ? only : (scene.getNodeByName(name) as TransformNode);
        group.start(loop);
        group.pause();
        // the loader turns seconds into frames of its own
        const framesPerSecond = group.targetedAnimations[0].animation.framePerSecond;
        const shown = () => {
          node.computeWorldMatrix(true);
          const matrix = node.getWorldMatrix();
          return (p: Vec3): Vec3 => {
            const { x, y, z } = Vector3.TransformCoordinates(new Vector3(...p), matrix);
            return [x, y, z];
          };
        };
        return {
          seek(time) {
            group.goToFrame(time * framesPerSecond);
            return shown();
          },
          run() {
            scene.useConstantAnimationDeltaTime = true;
            group.play(loop);
            scene.render();
            return shown();
          },
          end: () => group.stop(),
        };
      },
    };
  },
};
