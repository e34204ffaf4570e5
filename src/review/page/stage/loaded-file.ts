/** A baked file as three.js loads it. */

import {
  type AnimationClip,
  BufferGeometry,
  type Group,
  type Mesh,
  type MeshStandardMaterial,
  type Object3D,
} from "three";
import { type GLTF, GLTFLoader } from "three/examples/jsm/loaders/GLTFLoader.js";
import { asGlb, type Container } from "./container.js";

/** 0 to 1 */
const MOST_METAL = 0.3;

export interface LoadedFile {
  scene: Group;
  /** In the order of the file's animations. */
  animations: AnimationClip[];
  /** Of the file's nodes by their index. */
  node(index: number): Object3D;
  /** What cannot be shown of it, in words; "" for all is. */
  missing: string;
}

/** Loads a file as any page does that plays glTF; what needs a decoder that is not in the page is left out, and told. */
export async function loadFile(container: Container): Promise<LoadedFile> {
  const loader = new GLTFLoader();
  const missing: string[] = [];
  const used = container.json.extensionsUsed ?? [];
  if (used.some((name) => name.endsWith("_meshopt_compression"))) {
    const { MeshoptDecoder } = await import("three/examples/jsm/libs/meshopt_decoder.module.js");
    loader.setMeshoptDecoder(MeshoptDecoder);
  }
  if (used.includes("KHR_draco_mesh_compression")) {
    loader.setDRACOLoader(EMPTY_MESHES as never);
    missing.push(
      "Its meshes are compressed with Draco, which this page has no decoder for: a box shows where it is.",
    );
  }
  const shown = used.includes("KHR_texture_basisu") ? withoutTextures(container) : container;
  if (shown !== container)
    missing.push("Its textures are compressed with Basis Universal, which this page has no decoder for.");
  const gltf = await loader.parseAsync(asGlb(shown), "");
  const nodes = nodesOf(gltf);
  dullMetal(gltf.scene);
  return {
    scene: gltf.scene,
    animations: gltf.animations,
    node: (index) => nodes.get(index)!,
    missing: missing.join(" "),
  };
}

/** Stands in for a decoder: meshes come out without a vertex. */
const EMPTY_MESHES = {
  preload() {},
  decodeDracoFile(_bytes: ArrayBuffer, done: (geometry: BufferGeometry) => void) {
    done(new BufferGeometry());
  },
};

/**
 * Metal shows nothing but what is round it, and here nothing is: without this it is black. Surroundings to mirror would have to be blurred for each
 * roughness first, which takes software rendering ten seconds.
 */
function dullMetal(scene: Group): void {
  scene.traverse((object) => {
    for (const material of [(object as Mesh).material ?? []].flat() as Partial<MeshStandardMaterial>[])
      if (material.metalness !== undefined) material.metalness = Math.min(material.metalness, MOST_METAL);
  });
}

function nodesOf({ scene, parser }: GLTF): Map<number, Object3D> {
  const nodes = new Map<number, Object3D>();
  scene.traverse((object) => {
    const index = parser.associations.get(object)?.nodes;
    // the meshes that a node of several is made of name it too: their parent comes first
    if (index !== undefined && !nodes.has(index)) nodes.set(index, object);
  });
  return nodes;
}

function withoutTextures(container: Container): Container {
  const { textures: _t, images: _i, ...json } = structuredClone(container.json);
  for (const material of json.materials ?? []) {
    delete material.normalTexture;
    delete material.occlusionTexture;
    delete material.emissiveTexture;
    delete material.extensions;
    delete material.pbrMetallicRoughness?.baseColorTexture;
    delete material.pbrMetallicRoughness?.metallicRoughnessTexture;
  }
  const needed = json.extensionsRequired?.filter((name) => name !== "KHR_texture_basisu");
  return { ...container, json: { ...json, extensionsRequired: needed } };
}
