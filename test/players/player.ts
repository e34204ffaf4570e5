import type { Vec3 } from "../../src/math/vec3.js";

/** A program that plays glTF and that nobody here wrote. */
export interface Player {
  name: string;
  /** A .glb, or the JSON of a .gltf that has its buffers inside. */
  open(file: Uint8Array): Promise<OpenedFile>;
}

export interface OpenedFile {
  clips: string[];
  /**
   * Starts a clip, over and over (default) or once; `seek` answers where a point of the named node (default: the scene's only root) then stands, right-handed, +Y up;
   * `run` the same after letting it play on by itself for another `STEP`.
   */
  play(
    clip: string,
    node?: string,
    loop?: boolean,
  ): { seek(time: number): (point: Vec3) => Vec3; run(): (point: Vec3) => Vec3; end(): void };
}

/** s: what Babylon.js goes on by from frame to frame where it is told to be regular. */
export const STEP = 0.016;

export const isJson = (file: Uint8Array): boolean => file[0] === "{".charCodeAt(0);
