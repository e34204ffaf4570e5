/** Primitive bodies: axis +Y, the middle of the bounding box in the origin, metres. */

import { RequestError } from "../math/request-error.js";
import type { Vec3 } from "../math/vec3.js";

/** A primitive body, lengths in m before `scale`. */
export type Shape =
  /** Whole edges. */
  | { readonly box: Vec3 }
  /** Radius. */
  | { readonly sphere: number }
  /** Half axes. */
  | { readonly ellipsoid: Vec3 }
  | { readonly cylinder: { readonly radius: number; readonly length: number } }
  /** Base at -Y. */
  | { readonly cone: { readonly radius: number; readonly length: number } }
  /** Length over all. */
  | { readonly capsule: { readonly radius: number; readonly length: number } }
  /** Torus: radius to the middle of the tube, the tube's diameter. */
  | { readonly ring: { readonly radius: number; readonly thickness: number } }
  | { readonly disc: { readonly radius: number; readonly thickness: number } }
  /** Radii. */
  | { readonly tube: { readonly outer: number; readonly inner: number; readonly length: number } };

/** What a shape is called. */
export type ShapeKind = Shape extends infer S ? (S extends Shape ? keyof S : never) : never;

/** @throws RequestError at ["shape", …] for lengths that make no body */
export function checkShape(shape: Shape): void {
  for (const [kind, sizes] of Object.entries(shape) as [string, number | object][])
    for (const [key, value] of typeof sizes === "number" ? [["", sizes]] : Object.entries(sizes))
      if (!(value > 0 && value < Number.POSITIVE_INFINITY))
        throw new RequestError(
          ["shape", kind, key].filter(Boolean),
          `is ${value}`,
          "needs a length above 0, in metres",
        );
  if ("capsule" in shape && shape.capsule.length < 2 * shape.capsule.radius)
    throw new RequestError(
      ["shape", "capsule", "length"],
      `is ${shape.capsule.length}, less than its two round ends`,
      `needs at least twice the radius, ${2 * shape.capsule.radius}`,
    );
  if ("ring" in shape && shape.ring.thickness >= 2 * shape.ring.radius)
    throw new RequestError(
      ["shape", "ring", "thickness"],
      `is ${shape.ring.thickness}: the tube leaves no hole in the middle`,
      `needs less than twice the radius, ${2 * shape.ring.radius}`,
    );
  if ("tube" in shape && shape.tube.inner >= shape.tube.outer)
    throw new RequestError(
      ["shape", "tube", "inner"],
      `is ${shape.tube.inner}, not less than the outer radius`,
      `needs less than ${shape.tube.outer}`,
    );
}
