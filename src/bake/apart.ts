import type { ThrowFile } from "../throwfile/types.js";

/** The same throws for who wants their motion alone: any of them can then be baked without the others, and no mesh is copied. */
export const apart = (file: ThrowFile): ThrowFile => ({
  ...file,
  bake: { ...file.bake, files: "per-take", container: "glb", mesh: false },
});
