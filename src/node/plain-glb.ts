/** Baked files as a page can show them: each whole, and without compression that needs a decoder. */

import { resolve } from "node:path";
import { Logger, NodeIO } from "@gltf-transform/core";
import { ALL_EXTENSIONS } from "@gltf-transform/extensions";
import { MeshoptDecoder } from "meshoptimizer/decoder";
import { splitGlb } from "../gltf/glb.js";
import { spliceGlb } from "../gltf/splice.js";
import { DECODERS } from "./draco.js";
import { readModelFile } from "./model-files.js";

/** Meshes and textures may stay compressed in a baked file; for looking at it they are unpacked. */
const UNPACKED = ["EXT_meshopt_compression", "KHR_draco_mesh_compression"];

/**
 * A .glb or .gltf on disk as one .glb.
 *
 * @throws ModelError as `readModelFile` does
 */
export async function readPlainGlb(folder: string, name: string): Promise<Uint8Array> {
  const { model } = await readModelFile(resolve(folder, name), name);
  return plainGlb(spliceGlb(model, { nodes: [], clips: [] }));
}

/** The same model and clips unpacked; as it is where nothing is packed, or it cannot be. */
export async function plainGlb(glb: Uint8Array): Promise<Uint8Array> {
  const { extensionsUsed = [] } = JSON.parse(new TextDecoder().decode(splitGlb("", glb).json));
  if (!UNPACKED.some((name) => extensionsUsed.includes(name))) return glb;
  const io = new NodeIO()
    .setLogger(new Logger(Logger.Verbosity.SILENT))
    .registerExtensions(ALL_EXTENSIONS)
    .registerDependencies({
      "meshopt.decoder": MeshoptDecoder,
      ...(extensionsUsed.includes("KHR_draco_mesh_compression") && {
        "draco3d.decoder": await DECODERS.draco?.(),
      }),
    });
  try {
    const document = await io.readBinary(glb);
    for (const extension of document.getRoot().listExtensionsUsed())
      if (UNPACKED.includes(extension.extensionName)) extension.dispose();
    return await io.writeBinary(document);
  } catch {
    // the page says itself what it cannot show
    return glb;
  }
}
