/** Names that would do harm where they are taken for markup. */

import { readFileSync } from "node:fs";
import { type Document, NodeIO } from "@gltf-transform/core";

/** `hit` counts what gets through. */
export const HARM = {
  tag: "<img src=x onerror=\"window.hit='tag'\">",
  script: "</script><script>window.hit='script'</script>",
  attribute: "\" onmouseover=\"window.hit='attribute'\" autofocus onfocus=\"window.hit='focus'",
  style: "</style><svg onload=\"window.hit='style'\">",
  comment: "<!--<script>",
} as const;

/** A model whose nodes, meshes, materials and animation are called so. */
export async function hostileModel(path: string): Promise<Uint8Array> {
  const io = new NodeIO();
  const document: Document = await io.readBinary(new Uint8Array(readFileSync(path)));
  const root = document.getRoot();
  const names = Object.values(HARM);
  const all = [...root.listNodes(), ...root.listMeshes(), ...root.listMaterials(), ...root.listScenes()];
  all.forEach((part, i) => {
    part.setName(`${names[i % names.length]}${i}`);
  });
  return io.writeBinary(document);
}
