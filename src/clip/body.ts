import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";

/** What a clip must know of the prop. */
export interface Body {
  /** Model frame, m. */
  centerOfMass: Vec3;
  /** Turns x, y, z onto the principal axes, model frame. */
  axes: Quat;
  /** Furthest point from the centre of mass, m. */
  reach: number;
}
