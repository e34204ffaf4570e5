import type { GLTF } from "@gltf-transform/core";
import type { GltfJson, Model } from "./model.js";

/**
 * What is left of a model for clips alone. With `keepsNodes` its scenes and all nodes, by the same indices, but nothing they show:
 * a clip that moves one of them finds it, and its parents, where they were. Without, an empty scene.
 */
export function bareModel({ name, json: { scene, scenes, nodes } }: Model, keepsNodes: boolean): Model {
  const json: GltfJson = { asset: { version: "2.0" } };
  if (keepsNodes) {
    if (scene !== undefined) json.scene = scene;
    if (scenes) json.scenes = scenes.map((each) => pick(each, ["name", "nodes"]));
    if (nodes)
      json.nodes = nodes.map((node) =>
        pick(node, ["name", "translation", "rotation", "scale", "matrix", "children"]),
      );
  }
  return { name, container: "glb", text: JSON.stringify(json), json, buffers: [], images: new Map() };
}

function pick<T extends GLTF.INode | GLTF.IScene>(object: T, keys: readonly (keyof T)[]): T {
  const entries = keys.flatMap((key) => (object[key] === undefined ? [] : [[key, object[key]]]));
  return Object.fromEntries(entries) as T;
}
