/** A recipe's parts as a glTF document, and the document as the bytes of a .glb. */
import { Document, NodeIO } from "@gltf-transform/core";
import { MATERIALS } from "./materials.js";
import { shade } from "./shade.js";
import { join } from "./solid.js";

/**
 * @typedef {object} Part one node with one mesh
 * @property {string} name
 * @property {keyof typeof MATERIALS} material
 * @property {import("./solid.js").Solid[]} solids
 * @property {number} [crease] degrees above which an edge stays sharp; default 40
 *
 * @typedef {object} Recipe
 * @property {string} name of the file and of the node that holds the parts
 * @property {Part[]} parts
 * @property {Record<string, { at: number[], rotation?: number[] }>} sockets empty nodes: places to hold or aim by
 */

/** @param {Recipe} recipe @returns {Promise<Uint8Array>} */
export async function writeGlb(recipe) {
  const document = new Document();
  document.getRoot().getAsset().generator = "tossbake assets/build-props.js";
  const buffer = document.createBuffer();
  const prop = document.createNode(`${recipe.name}_model`);
  document.getRoot().setDefaultScene(document.createScene(recipe.name).addChild(prop));
  const materials = new Map();
  for (const part of recipe.parts) {
    if (!materials.has(part.material)) materials.set(part.material, addMaterial(document, part.material));
    const { positions, normals, indices } = shade(join(...part.solids), part.crease ?? 40);
    const accessor = (type, array) =>
      document.createAccessor().setType(type).setArray(array).setBuffer(buffer);
    const primitive = document
      .createPrimitive()
      .setAttribute("POSITION", accessor("VEC3", positions))
      .setAttribute("NORMAL", accessor("VEC3", normals))
      .setIndices(accessor("SCALAR", indices))
      .setMaterial(materials.get(part.material));
    prop.addChild(
      document.createNode(part.name).setMesh(document.createMesh(part.name).addPrimitive(primitive)),
    );
  }
  for (const [name, { at, rotation }] of Object.entries(recipe.sockets)) {
    // The extras say that the node is meant to be empty.
    const socket = document.createNode(`socket_${name}`).setTranslation(at).setExtras({ socket: name });
    if (rotation) socket.setRotation(rotation);
    prop.addChild(socket);
  }
  return new NodeIO().writeBinary(document);
}

function addMaterial(document, name) {
  const { baseColor, metallic, roughness, alphaMode } = MATERIALS[name];
  const material = document
    .createMaterial(name)
    .setBaseColorFactor(baseColor)
    .setMetallicFactor(metallic)
    .setRoughnessFactor(roughness);
  return alphaMode ? material.setAlphaMode(alphaMode) : material;
}
