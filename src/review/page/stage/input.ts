/** What the stage needs to know of a throw and its prop; the page's data has it and more. */

import type { TakeMotion } from "../../../bake/take-motion.js";
import type { Quat } from "../../../math/quat.js";
import type { Vec3 } from "../../../math/vec3.js";

/** Metres in the model's scene frame, after `scale`. */
export interface StageProp {
  name: string;
  centerOfMass: Vec3;
  /** `principal.axes`: turns x, y, z onto long, middle, short. */
  axes: Quat;
  /** Distance of the furthest point from the centre of mass. */
  reach: number;
  /** Edges of the bounding box, for a prop that comes without a mesh. */
  size?: Vec3;
  /** Of that box; default: the centre of mass. */
  middle?: Vec3;
  /** Named points that have a path of their own. */
  points: Readonly<Record<string, Vec3>>;
}

export interface StageTake {
  motion: TakeMotion;
  /** Name of the baked file. */
  file: string;
  /** Name of the animation in it. */
  clip: string;
}

export interface StageThrow {
  takes: readonly StageTake[];
}

/** Hands over a baked file, or one that a .gltf among them names. */
export type FileSource = (name: string) => Promise<ArrayBuffer>;
