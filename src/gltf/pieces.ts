import type { GLTF } from "@gltf-transform/core";
import { GREATEST_COPIES, tooMuch } from "./budget.js";
import { INSTANCING, instanceCount } from "./instancing.js";
import type { GltfJson, Model } from "./model.js";
import { isSkinned } from "./skin.js";
import { hasTriangles } from "./triangles.js";

/** A primitive with triangles that a node shows, once or as often as the node has instances. */
export interface Piece {
  node: number;
  primitive: GLTF.IMeshPrimitive;
  /** Its place in the file, for messages. */
  where: string;
  /** Of the mesh's morph targets, in the rest pose. */
  weights: number[];
  copies: number;
}

/** The pieces that the nodes show; counted as it goes, for a few bytes can name billions. */
export function listPieces(model: Model, nodes: Iterable<number>, warnings: Set<string>): Piece[] {
  const { json } = model;
  const shownBy = new Map<number, Pick<Piece, "primitive" | "where">[]>();
  const pieces: Piece[] = [];
  let total = 0;
  for (const node of nodes) {
    const { mesh, name, weights } = json.nodes![node];
    if (mesh === undefined) continue;
    const instances = instanceCount(json, node);
    let primitives = shownBy.get(mesh);
    if (!primitives) {
      primitives = solidPrimitives(json, mesh, warnings);
      shownBy.set(mesh, primitives);
    }
    for (const { primitive, where } of primitives) {
      const copies = isSkinned(json, node, primitive) ? 1 : instances;
      if (copies !== instances)
        warnings.add(`the node "${name ?? node}" is skinned and has instances (${INSTANCING}): read as one`);
      total += copies;
      if (total > GREATEST_COPIES) throw tooMuch(model);
      pieces.push({ node, primitive, where, copies, weights: weights ?? json.meshes![mesh].weights ?? [] });
    }
  }
  return pieces;
}

function solidPrimitives(
  json: GltfJson,
  mesh: number,
  warnings: Set<string>,
): Pick<Piece, "primitive" | "where">[] {
  return json.meshes![mesh].primitives.flatMap((primitive, p) => {
    const where = `meshes[${mesh}].primitives[${p}]`;
    if (!hasTriangles(primitive.mode ?? 4)) warnings.add(`${where} is points or lines: passed over`);
    else if (primitive.attributes.POSITION === undefined)
      warnings.add(`${where} has no positions: passed over`);
    else return [{ primitive, where }];
    return [];
  });
}
