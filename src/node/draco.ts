/** The decoder of Draco-compressed meshes, loaded from its package when a model needs it. */

import type { Decoders } from "../gltf/decoders.js";

export const DECODERS: Decoders = {
  async draco() {
    // @ts-expect-error it comes without types
    const { default: draco3d } = await import("draco3dgltf");
    return draco3d.createDecoderModule();
  },
};
