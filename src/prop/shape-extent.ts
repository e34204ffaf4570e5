import { length, type Vec3 } from "../math/vec3.js";
import type { Shape } from "./shape-kind.js";

/** Bounding box of a shape, m. */
export function shapeSize(shape: Shape): Vec3 {
  if ("box" in shape) return shape.box;
  if ("sphere" in shape) return [2 * shape.sphere, 2 * shape.sphere, 2 * shape.sphere];
  if ("ellipsoid" in shape) return [2 * shape.ellipsoid[0], 2 * shape.ellipsoid[1], 2 * shape.ellipsoid[2]];
  if ("disc" in shape) return round(shape.disc.radius, shape.disc.thickness);
  if ("tube" in shape) return round(shape.tube.outer, shape.tube.length);
  if ("ring" in shape) return round(shape.ring.radius + shape.ring.thickness / 2, shape.ring.thickness);
  const { radius, length } =
    "cylinder" in shape ? shape.cylinder : "cone" in shape ? shape.cone : shape.capsule;
  return round(radius, length);
}

const round = (radius: number, height: number): Vec3 => [2 * radius, height, 2 * radius];

/**
 * Distance in metres from a place to the furthest point of the shape. Exact, but for an ellipsoid seen from off its centre,
 * where it is a bound (never less than the true one).
 */
export function shapeReach(shape: Shape, from: Vec3): number {
  const away = length([from[0], 0, from[2]]);
  const aside = Math.abs(from[1]);
  const rim = (radius: number, halfLength: number) => length([radius + away, halfLength + aside, 0]);
  if ("box" in shape) {
    const [x, y, z] = shape.box;
    return length([x / 2 + Math.abs(from[0]), y / 2 + aside, z / 2 + Math.abs(from[2])]);
  }
  if ("sphere" in shape) return shape.sphere + length(from);
  if ("ellipsoid" in shape) return Math.max(...shape.ellipsoid) + length(from);
  if ("cylinder" in shape) return rim(shape.cylinder.radius, shape.cylinder.length / 2);
  if ("disc" in shape) return rim(shape.disc.radius, shape.disc.thickness / 2);
  if ("tube" in shape) return rim(shape.tube.outer, shape.tube.length / 2);
  if ("cone" in shape) {
    const half = shape.cone.length / 2;
    return Math.max(length([away, half - from[1], 0]), length([shape.cone.radius + away, half + from[1], 0]));
  }
  // A segment and a circle, each thickened by a ball.
  if ("capsule" in shape) {
    const { radius, length: whole } = shape.capsule;
    return radius + length([away, whole / 2 - radius + aside, 0]);
  }
  return shape.ring.thickness / 2 + length([shape.ring.radius + away, aside, 0]);
}
