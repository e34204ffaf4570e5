import type { Vec3 } from "../../src/math/vec3.js";

/** A program that plays glTF and that nobody here wrote. */
export interface Player {
  name: string;
  open(glb: Uint8Array): Promise<OpenedFile>;
}

export interface OpenedFile {
  clips: string[];
  /** Starts a clip; `seek` answers where a point of the named node (default: the scene's only root) then stands, right-handed, +Y up. */
  play(clip: string, node?: string): { seek(time: number): (point: Vec3) => Vec3; end(): void };
}
