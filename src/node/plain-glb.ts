/** Baked files as a page can show them: each whole, and without compression that needs a decoder. */

import { resolve } from "node:path";
import { Logger, NodeIO } from "@gltf-transform/core";
import { ALL_EXTENSIONS } from "@gltf-transform/extensions";
import { MeshoptDecoder } from "meshoptimizer/decoder";
import { joinGlb, splitGlb } from "../gltf/glb.js";
import { spliceGlb } from "../gltf/splice.js";
import { DECODERS } from "./draco.js";
import { readModelFile } from "./model-files.js";

const MESHOPT = "EXT_meshopt_compression";
const DRACO = "KHR_draco_mesh_compression";

/** The ratified name, whose content differs by a further filter alone (from memory); the reader knows the first. */
const MESHOPT_RATIFIED = "KHR_meshopt_compression";

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
  const { json, ...chunks } = splitGlb("", glb);
  const text = new TextDecoder().decode(json);
  const { extensionsUsed = [] } = JSON.parse(text);
  if (![MESHOPT, MESHOPT_RATIFIED, DRACO].some((name) => extensionsUsed.includes(name))) return glb;
  const io = new NodeIO()
    .setLogger(new Logger(Logger.Verbosity.SILENT))
    .registerExtensions(ALL_EXTENSIONS)
    .registerDependencies({
      "meshopt.decoder": MeshoptDecoder,
      ...(extensionsUsed.includes(DRACO) && { "draco3d.decoder": await DECODERS.draco?.() }),
    });
  try {
    const renamed = new TextEncoder().encode(text.replaceAll(`"${MESHOPT_RATIFIED}"`, `"${MESHOPT}"`));
    const document = await io.readBinary(joinGlb({ ...chunks, json: renamed }));
    for (const extension of document.getRoot().listExtensionsUsed())
      if ([MESHOPT, DRACO].includes(extension.extensionName)) extension.dispose();
    return await io.writeBinary(document);
  } catch {
    // the page says itself what it cannot show
    return glb;
  }
}
