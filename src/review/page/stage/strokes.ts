/** Lines as wide as they are asked to be on the screen. */

import { type ColorRepresentation, type Object3D, Vector2 } from "three";
import { LineMaterial } from "three/examples/jsm/lines/LineMaterial.js";
import { LineSegments2 } from "three/examples/jsm/lines/LineSegments2.js";
import { LineSegmentsGeometry } from "three/examples/jsm/lines/LineSegmentsGeometry.js";

export interface StrokeStyle {
  color: ColorRepresentation;
  /** px */
  width: number;
  /** m, on and off. */
  dash?: readonly [number, number];
  /** Seen through all that is before it. */
  through?: boolean;
  opacity?: number;
}

/** @param points two a segment, x y z each, m */
export function strokes(
  points: ArrayLike<number>,
  { color, width, dash, through = false, opacity = 1 }: StrokeStyle,
): LineSegments2 {
  const geometry = new LineSegmentsGeometry();
  geometry.setPositions(Array.from(points));
  const material = new LineMaterial({ color, linewidth: width, transparent: opacity < 1, opacity });
  material.resolution = new Vector2(1, 1);
  if (dash) {
    material.dashed = true;
    [material.dashSize, material.gapSize] = dash;
  }
  if (through) {
    material.depthTest = false;
    material.depthWrite = false;
  }
  const lines = new LineSegments2(geometry, material);
  if (dash) lines.computeLineDistances();
  if (through) lines.renderOrder = 10;
  lines.frustumCulled = false;
  return lines;
}

/** One line through all the points, x y z each. */
export function chained(points: ArrayLike<number>): Float64Array {
  const count = points.length / 3;
  const pairs = new Float64Array(6 * Math.max(0, count - 1));
  for (let i = 0; i + 1 < count; i++) for (let k = 0; k < 6; k++) pairs[6 * i + k] = points[3 * i + k];
  return pairs;
}

/** Takes lines, meshes and all below away for good, with their geometries and materials. */
export function discard(object: Object3D | undefined): void {
  if (!object) return;
  object.removeFromParent();
  object.traverse((each) => {
    const { geometry, material } = each as unknown as {
      geometry?: { dispose(): void };
      material?: { dispose(): void };
    };
    // all sprites share one geometry, which is the library's own
    if (!("isSprite" in each)) geometry?.dispose();
    material?.dispose();
  });
}
