import { length, scale, subtract, type Vec3 } from "../math/vec3.js";
import { convexHull } from "./hull.js";
import type { Prop } from "./prop.js";
import type { Shape } from "./shape-kind.js";
import { pointsSupport } from "./support-points.js";

/** The convex hull of a prop as touching and clearing see it: nothing else of a body can be the first to meet a plane. */
export interface Support {
  /**
   * A point p for which p·direction is least over the whole prop, in metres from the centre of mass; both in the model's frame, the direction of
   * any length but zero. Where several do, always the same one.
   */
  lowest(direction: Vec3): Vec3;
}

/**
 * The support of a weighed prop: exact for a shape (a sphere is a sphere, not its mesh; a ring its convex hull), and for a mesh that of its vertices to 1e-13 of its size.
 *
 * @param shape what the prop was weighed from, where that was a shape
 */
export function propSupport(prop: Prop, shape?: Shape): Support {
  const { centerOfMass } = prop;
  if (!shape) {
    const points = prop.extremes.map((value, i) => value - centerOfMass[i % 3]);
    const hull = convexHull(points);
    if (!hull) return pointsSupport(points);
    const corners = new Float64Array(3 * hull.corners.length);
    hull.corners.forEach((corner, i) => {
      corners.set(points.subarray(3 * corner, 3 * corner + 3), 3 * i);
    });
    return pointsSupport(corners);
  }
  const lowest = shapeLowest(shape);
  return { lowest: (direction) => subtract(scale(lowest(direction), prop.scale), centerOfMass) };
}

/**
 * The lowest point of a shape of its own size about its own centre: support functions of the elementary bodies (van den Bergen, Collision Detection
 * in Interactive 3D Environments, 2004, section 4.3.4).
 */
export function shapeLowest(shape: Shape): (direction: Vec3) => Vec3 {
  if ("box" in shape) {
    const [x, y, z] = scale(shape.box, 0.5);
    return (d) => [against(d[0], x), against(d[1], y), against(d[2], z)];
  }
  if ("sphere" in shape) return (d) => onBall(d, shape.sphere);
  if ("ellipsoid" in shape) {
    const [a, b, c] = shape.ellipsoid;
    return (d) => {
      const stretched: Vec3 = [a * d[0], b * d[1], c * d[2]];
      const size = length(stretched);
      return [(-a * stretched[0]) / size, (-b * stretched[1]) / size, (-c * stretched[2]) / size];
    };
  }
  if ("cylinder" in shape) return drum(shape.cylinder.radius, shape.cylinder.length);
  if ("disc" in shape) return drum(shape.disc.radius, shape.disc.thickness);
  if ("tube" in shape) return drum(shape.tube.outer, shape.tube.length);
  if ("cone" in shape) {
    const { radius, length: height } = shape.cone;
    return (d) => {
      const level = length([d[0], 0, d[2]]);
      // the tip lies lower than the rim where −radius·level − (height/2)·dy exceeds (height/2)·dy
      return height * d[1] < -radius * level ? [0, height / 2, 0] : onCircle(d, radius, -height / 2);
    };
  }
  if ("capsule" in shape) {
    const { radius, length: whole } = shape.capsule;
    return (d) => raised(onBall(d, radius), against(d[1], whole / 2 - radius));
  }
  const { radius, thickness } = shape.ring;
  return (d) => {
    const middle = onCircle(d, radius, 0);
    const tube = onBall(d, thickness / 2);
    return [middle[0] + tube[0], tube[1], middle[2] + tube[2]];
  };
}

/** A solid of revolution of two equal ends. */
const drum = (radius: number, height: number) => (d: Vec3) => onCircle(d, radius, against(d[1], height / 2));

/** The end of −size..size that lies against the sign. */
const against = (component: number, size: number): number => (component > 0 ? -size : size);

function onBall(d: Vec3, radius: number): Vec3 {
  const size = length(d);
  return [(-radius * d[0]) / size, (-radius * d[1]) / size, (-radius * d[2]) / size];
}

/** On the level circle about +Y; along +Y every point of it is as low: the one at +X. */
function onCircle(d: Vec3, radius: number, height: number): Vec3 {
  const level = length([d[0], 0, d[2]]);
  return level === 0 ? [radius, height, 0] : [(-radius * d[0]) / level, height, (-radius * d[2]) / level];
}

const raised = (p: Vec3, height: number): Vec3 => [p[0], p[1] + height, p[2]];
