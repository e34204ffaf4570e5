/** Outlines in place, as a view shows them. */

import { multiply } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import type { Exposure } from "./exposures.js";
import { outlineOf } from "./outline.js";
import { areaOf, around, type Bounds, NOWHERE } from "./plane.js";
import type { SheetProp } from "./sheet-input.js";
import { inView, type View } from "./view.js";

export interface Pose {
  /** Of the exposure. */
  number: number;
  /** Closed, x y x y… in m, view's axes. */
  rings: Float64Array[];
  /** m² */
  area: number;
}

export type Posed = Pick<Exposure, "number" | "centerOfMass" | "rotation">;

/** @param detail greatest distance from the true silhouette, m */
export function poseOf(
  prop: SheetProp,
  view: View,
  { number, centerOfMass, rotation }: Posed,
  detail: number,
): Pose {
  const [x, y] = inView(view, centerOfMass);
  const { rings } = outlineOf(prop.solid, multiply(view.rotation, rotation), detail);
  return {
    number,
    area: areaOf(rings),
    rings: rings.map((ring) => ring.map((value, i) => value + (i % 2 === 0 ? x : y))),
  };
}

export function boundsOf(poses: readonly Pose[], places: readonly Vec3[]): Bounds {
  let bounds = NOWHERE;
  for (const { rings } of poses)
    for (const ring of rings)
      for (let i = 0; i < ring.length; i += 2) bounds = around(bounds, [ring[i], ring[i + 1]]);
  for (const [x, y] of places) bounds = around(bounds, [x, y]);
  return bounds;
}
