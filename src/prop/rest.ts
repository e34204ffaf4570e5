import { cos, sin } from "../math/elementary.js";
import { RequestError } from "../math/request-error.js";
import {
  addScaled,
  cross,
  distance,
  dot,
  length,
  negate,
  normalize,
  scale,
  subtract,
  type Vec3,
} from "../math/vec3.js";
import { convexHull } from "./hull.js";
import { type HullFace, hullFaces, solidAngle } from "./hull-faces.js";
import type { Prop } from "./prop.js";
import type { Shape } from "./shape-kind.js";

/** A flat side that a prop can rest on. */
export interface RestingFace {
  /** Outwards, unit, model's frame: down when it rests. */
  normal: Vec3;
  /** Of all orientations: those from which the prop tips onto this side, 0 to 1; all together 1. */
  share: number;
}

/** Of the reach: a centre of mass this near to an edge is not held up. */
const MARGIN = 1e-9;

/**
 * The flat sides of a prop's hull that it rests on, the likeliest first. A side is stable where the centre of mass lies over its inside.
 *
 * Their shares are the quasi-static estimate of Goldberg, Mirtich, Zhuang, Craig, Carlisle & Canny, Part pose statistics: estimators and experiments,
 * IEEE Trans. Robotics and Automation 15, 849, 1999: of all orientations, as even, those count for a side in which the vertical through the centre of mass leaves
 * the hull there (its solid angle); from a side that is not stable the prop tips over the edge nearest the centre of mass onto the next, until one is.
 * No speed is left that would carry it further. On a curved side it rolls for good, or, a ring, tips over from it.
 *
 * @param shape what the prop was weighed from, where that was a shape
 * @throws RequestError for a body without such a side
 */
export function restingFaces(prop: Prop, shape?: Shape): RestingFace[] {
  const found = shape && !("box" in shape) ? roundFaces(shape, prop) : polyhedron(corners(prop, shape), prop);
  const whole = found.reduce((sum, { share }) => sum + share, 0);
  if (!(whole > 0))
    throw new RequestError(
      ["arrive", "facing"],
      `"${prop.name}" has no flat side to rest on (found rest)`,
      "name a direction, such as [[y, up]]",
    );
  return found
    .filter(({ share }) => share > 0)
    .map(({ normal, share }) => ({ normal, share: share / whole }))
    .sort((a, b) => b.share - a.share);
}

/** Hull points from the centre of mass. */
function corners({ extremes, centerOfMass, scale: factor }: Prop, shape?: Shape): Float64Array {
  if (!shape || !("box" in shape)) return extremes.map((value, i) => value - centerOfMass[i % 3]);
  const half = scale(shape.box, factor / 2);
  return Float64Array.from({ length: 24 }, (_, i) => {
    const axis = i % 3;
    const side = (Math.floor(i / 3) >> axis) & 1 ? 1 : -1;
    return side * half[axis] - centerOfMass[axis];
  });
}

function polyhedron(points: Float64Array, { reach }: Prop): RestingFace[] {
  const hull = convexHull(points);
  if (!hull) return bothSides(points);
  const faces = hullFaces(points, hull.triangles, reach);
  const shares = faces.map(() => 0);
  for (const [i, { solidAngle: seen }] of faces.entries()) {
    const end = restingOn(faces, i, MARGIN * reach);
    if (end !== undefined) shares[end] += Math.max(0, seen);
  }
  return faces.map(({ normal }, i) => ({ normal, share: shares[i] }));
}

/** The face that a body comes to rest on from one of its faces; undefined where it never does: its centre of mass lies outside. */
function restingOn(faces: readonly HullFace[], from: number, margin: number): number | undefined {
  let at = from;
  // each tipping lowers the centre of mass: no face comes twice
  for (let tipped = 0; tipped <= faces.length; tipped++) {
    const { normal, edges } = faces[at];
    const under = scale(normal, dot(normal, edges[0].from));
    const beyond = edges.filter(({ from: a, to: b }) => {
      const inward = cross(normal, normalize(subtract(b, a)));
      return -dot(inward, a) <= margin;
    });
    if (beyond.length === 0) return at;
    at = beyond.reduce((near, edge) => (apart(edge, under) < apart(near, under) ? edge : near)).across;
  }
  return undefined;
}

/** Of points that lie in one plane. */
function bothSides(points: Float64Array): RestingFace[] {
  const places = Array.from({ length: points.length / 3 }, (_, i): Vec3 => {
    const [x, y, z] = points.subarray(3 * i, 3 * i + 3);
    return [x, y, z];
  });
  const furthest = (from: (p: Vec3) => number): Vec3 =>
    places.reduce((far, p) => (from(p) > from(far) ? p : far));
  const a = furthest(length);
  const b = furthest((p) => distance(p, a));
  const along = subtract(b, a);
  const across = (p: Vec3): Vec3 => cross(along, subtract(p, a));
  const normal = normalize(across(furthest((p) => length(across(p)))));
  return [normal, negate(normal)].map((side) => ({ normal: side, share: 1 / 2 }));
}

const UP: Vec3 = [0, 1, 0];
const DOWN: Vec3 = [0, -1, 0];

/** Of a shape of revolution about +Y. */
function roundFaces(shape: Exclude<Shape, { box: Vec3 }>, prop: Prop): RestingFace[] {
  const [x, y, z] = prop.centerOfMass;
  /** A side that ends at a height over the shape's middle, of this radius. */
  const end = (normal: Vec3, height: number, radius: number): RestingFace[] => {
    const middle: Vec3 = [-x, height * prop.scale - y, -z];
    const isHeld = length([x, 0, z]) < radius * prop.scale * (1 - MARGIN) && normal[1] * middle[1] > 0;
    return isHeld ? [{ normal, share: discAngle(middle, radius * prop.scale) }] : [];
  };
  const ends = (radius: number, height: number) => [
    ...end(UP, height / 2, radius),
    ...end(DOWN, -height / 2, radius),
  ];
  if ("cylinder" in shape) return ends(shape.cylinder.radius, shape.cylinder.length);
  if ("disc" in shape) return ends(shape.disc.radius, shape.disc.thickness);
  if ("tube" in shape) return ends(shape.tube.outer, shape.tube.length);
  if ("cone" in shape) return end(DOWN, -shape.cone.length / 2, shape.cone.radius);
  if ("sphere" in shape || "ellipsoid" in shape || "capsule" in shape) return [];
  // a ring tips as the disc in its middle would: by the side of that which is down
  const radius = shape.ring.radius * prop.scale;
  if (length([x, 0, z]) >= radius) return [];
  const near = y === 0 ? 1 / 2 : discAngle([-x, -y, -z], radius) / (4 * Math.PI);
  return [
    { normal: UP, share: y < 0 ? near : 1 - near },
    { normal: DOWN, share: y < 0 ? 1 - near : near },
  ];
}

/** From a point to an edge. */
function apart({ from, to }: HullFace["edges"][number], point: Vec3): number {
  const along = subtract(to, from);
  const share = dot(subtract(point, from), along) / dot(along, along);
  return distance(point, addScaled(from, along, Math.min(1, Math.max(0, share))));
}

/** Points to a circle: its solid angle is then right to 1e-4 of itself. */
const CIRCLE = 720;

/** A level disc's solid angle from the centre of mass, its middle at a place from there. */
function discAngle([x, y, z]: Vec3, radius: number): number {
  const rim = (i: number): Vec3 => {
    const angle = (2 * Math.PI * i) / CIRCLE;
    return [x + radius * cos(angle), y, z + radius * sin(angle)];
  };
  let sum = 0;
  for (let i = 0; i < CIRCLE; i++) sum += solidAngle([x, y, z], rim(i), rim(i + 1));
  return Math.abs(sum);
}
