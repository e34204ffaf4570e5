/** Models compressed by general tools, for the tests of their decoding. */

import { type Document, NodeIO } from "@gltf-transform/core";
import {
  EXTMeshoptCompression,
  KHRDracoMeshCompression,
  KHRMeshQuantization,
} from "@gltf-transform/extensions";
import { meshopt } from "@gltf-transform/functions";
// @ts-expect-error it comes without types
import draco3d from "draco3dgltf";
import { MeshoptEncoder } from "meshoptimizer/encoder";

const io = new NodeIO()
  .registerExtensions([EXTMeshoptCompression, KHRDracoMeshCompression, KHRMeshQuantization])
  .registerDependencies({
    "draco3d.encoder": await draco3d.createEncoderModule(),
    "meshopt.encoder": MeshoptEncoder,
  });
await MeshoptEncoder.ready;

/** A document that the tests may change, from a .glb. */
export const open = (glb: Uint8Array): Promise<Document> => io.readBinary(new Uint8Array(glb));

export async function meshoptGlb(document: Document): Promise<Uint8Array> {
  document
    .createExtension(EXTMeshoptCompression)
    .setRequired(true)
    .setEncoderOptions({ method: EXTMeshoptCompression.EncoderMethod.QUANTIZE });
  return io.writeBinary(document);
}

/** As the usual tool makes it: reordered, quantised to 14 bits and filtered. */
export async function lossyMeshoptGlb(document: Document): Promise<Uint8Array> {
  await document.transform(meshopt({ encoder: MeshoptEncoder, level: "high" }));
  return io.writeBinary(document);
}

/** Positions rounded to `bits` of the greatest extent. */
export async function dracoGlb(
  document: Document,
  method: "EDGEBREAKER" | "SEQUENTIAL",
  bits: number,
): Promise<Uint8Array> {
  document
    .createExtension(KHRDracoMeshCompression)
    .setRequired(true)
    .setEncoderOptions({
      method: KHRDracoMeshCompression.EncoderMethod[method],
      quantizationBits: { POSITION: bits },
    });
  return io.writeBinary(document);
}
