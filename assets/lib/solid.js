/**
 * Closed, outward-wound meshes, built by joining rings of points.
 *
 * Everything here returns a `Solid`: points in metres, and triangles whose every edge is shared by exactly one
 * other triangle that runs it the other way. Normals come later (shade.js), from the angle between faces.
 */
import { Euler, Matrix4, ShapeUtils, Vector2, Vector3 } from "three";

/** @typedef {[number, number, number]} Point */
/** @typedef {{ points: Point[], triangles: [number, number, number][] }} Solid */

const DEGREES = Math.PI / 180;

/**
 * Joins neighbouring rings by a band of triangles. Rings have equally many points, or one (a pole).
 * Open ends are filled by a fan round their middle, or by the triangles given.
 * @param {Point[][]} rings
 * @param {{ closed?: boolean, caps?: number[][] }} [options] `closed`: the last ring joins the first
 * @returns {Solid}
 */
export function skin(rings, { closed = false, caps } = {}) {
  /** @type {Solid} */
  const solid = { points: [], triangles: [] };
  const starts = rings.map((ring) => {
    solid.points.push(...ring);
    return solid.points.length - ring.length;
  });
  const bands = closed ? rings.length : rings.length - 1;
  for (let i = 0; i < bands; i++) {
    const j = (i + 1) % rings.length;
    addBand(solid, starts[i], rings[i].length, starts[j], rings[j].length);
  }
  if (!closed) {
    addCap(solid, starts[0], rings[0], false, caps);
    addCap(solid, starts.at(-1), rings.at(-1), true, caps);
  }
  return outward(solid);
}

function addBand(solid, a, countA, b, countB) {
  const count = Math.max(countA, countB);
  for (let i = 0; i < count; i++) {
    const next = (i + 1) % count;
    if (countA > 1) solid.triangles.push([a + i, a + next, countB > 1 ? b + i : b]);
    if (countB > 1) solid.triangles.push([b + next, b + i, countA > 1 ? a + next : a]);
  }
}

function addCap(solid, start, ring, isLast, caps) {
  if (ring.length === 1) return;
  const turn = ([i, j, k]) => (isLast ? [i, j, k] : [k, j, i]);
  if (caps) {
    for (const triangle of caps) solid.triangles.push(turn(triangle.map((i) => start + i)));
    return;
  }
  const middle = solid.points.length;
  solid.points.push([0, 1, 2].map((axis) => ring.reduce((sum, p) => sum + p[axis], 0) / ring.length));
  for (let i = 0; i < ring.length; i++) {
    solid.triangles.push(turn([start + i, start + ((i + 1) % ring.length), middle]));
  }
}

/**
 * A profile turned about +Y: pairs [radius, height]. A radius of 0 at an end is a pole; `closed` turns a loop
 * (a hoop, a cup with a wall).
 */
export function lathe(profile, { segments = 20, closed = false } = {}) {
  const rings = profile.map(([radius, y]) =>
    radius === 0
      ? [[0, y, 0]]
      : around(segments, (angle) => [radius * Math.sin(angle), y, radius * Math.cos(angle)]),
  );
  return skin(rings, { closed });
}

/** `count` points, one for each of as many even angles of a full circle. */
export function around(count, pointAt) {
  return Array.from({ length: count }, (_, i) => pointAt((2 * Math.PI * i) / count, i));
}

/**
 * A section carried along a curve of three.js.
 * @param curve anything with getPointAt and computeFrenetFrames
 * @param {(along: number) => [number, number][]} sectionAt the section's outline at 0..1 of the length, in metres
 */
export function sweep(curve, sectionAt, { steps = 32, closed = false } = {}) {
  const { normals, binormals } = curve.computeFrenetFrames(steps, closed);
  const rings = [];
  for (let i = 0; i < (closed ? steps : steps + 1); i++) {
    const centre = curve.getPointAt(i / steps);
    rings.push(
      sectionAt(i / steps).map(([u, v]) =>
        new Vector3().copy(centre).addScaledVector(normals[i], u).addScaledVector(binormals[i], v).toArray(),
      ),
    );
  }
  return skin(rings, { closed });
}

/** A superellipse across +Y: half width along x, half thickness along z; squareness 2 is an ellipse. */
export function oval([y, halfWidth, halfThickness = halfWidth, squareness = 2], count = 20) {
  const bow = (x) => Math.sign(x) * Math.abs(x) ** (2 / squareness);
  return around(count, (angle) => [
    halfWidth * bow(Math.cos(angle)),
    y,
    halfThickness * bow(Math.sin(angle)),
  ]);
}

/** The outline of a round wire. */
export function circle(radius, count = 8) {
  return around(count, (angle) => [radius * Math.cos(angle), radius * Math.sin(angle)]);
}

/**
 * A flat outline (in x and y) given a thickness along z, centred on z = 0, its edges bevelled.
 * @param {[number, number][]} outline counter-clockwise, not crossing itself
 * @param {{ sharpFoot?: boolean }} [options] `sharpFoot`: no bevel at -z, for a relief that stands on a face
 */
export function extrude(outline, thickness, bevel, { sharpFoot = false } = {}) {
  const inner = inset(outline, bevel);
  const half = thickness / 2;
  const at = (points, z) => points.map(([x, y]) => [x, y, z]);
  const caps = ShapeUtils.triangulateShape(
    inner.map(([x, y]) => new Vector2(x, y)),
    [],
  );
  const foot = sharpFoot ? [at(outline, -half)] : [at(inner, -half), at(outline, bevel - half)];
  return skin([...foot, at(outline, half - bevel), at(inner, half)], { caps });
}

/** The outline drawn `depth` further in, corners mitred. */
export function inset(outline, depth) {
  return outline.map((point, i) => {
    const before = inwardNormal(outline.at(i - 1), point);
    const after = inwardNormal(point, outline[(i + 1) % outline.length]);
    const factor = depth / (1 + before[0] * after[0] + before[1] * after[1]);
    return [point[0] + factor * (before[0] + after[0]), point[1] + factor * (before[1] + after[1])];
  });
}

function inwardNormal(from, to) {
  const [x, y] = [to[0] - from[0], to[1] - from[1]];
  const length = Math.sqrt(x * x + y * y);
  return [-y / length, x / length];
}

/** A box of the given whole edges, centred, its edges bevelled. */
export function box([x, y, z], bevel) {
  const [a, b] = [x / 2, y / 2];
  const ring = (width, height, depth) => [
    [-width, bevel - height, depth],
    [bevel - width, -height, depth],
    [width - bevel, -height, depth],
    [width, bevel - height, depth],
    [width, height - bevel, depth],
    [width - bevel, height, depth],
    [bevel - width, height, depth],
    [-width, height - bevel, depth],
  ];
  // The end faces have four corners, each shared by two points of the ring next to it.
  const face = (depth) => [
    [bevel - a, bevel - b, depth],
    [a - bevel, bevel - b, depth],
    [a - bevel, b - bevel, depth],
    [bevel - a, b - bevel, depth],
  ];
  const sides = skin([ring(a, b, bevel - z / 2), ring(a, b, z / 2 - bevel)], { caps: [] });
  for (const [depth, start, flip] of [
    [-z / 2, 0, true],
    [z / 2, 8, false],
  ]) {
    const base = sides.points.length;
    sides.points.push(...face(depth));
    const add = (...corners) => sides.triangles.push(flip ? corners.reverse() : corners);
    for (let corner = 0; corner < 4; corner++) {
      const [p, q] = [start + 2 * corner, start + 2 * corner + 1];
      const next = start + ((2 * corner + 2) % 8);
      const [c, d] = [base + corner, base + ((corner + 1) % 4)];
      add(p, q, c);
      add(q, next, d);
      add(q, d, c);
    }
    add(base, base + 1, base + 2);
    add(base, base + 2, base + 3);
  }
  return outward(sides);
}

/** Turned by degrees about x, then y, then z, and carried to a place. */
export function move(solid, { turn = [0, 0, 0], at = [0, 0, 0] }) {
  const matrix = new Matrix4()
    .makeRotationFromEuler(new Euler(turn[0] * DEGREES, turn[1] * DEGREES, turn[2] * DEGREES, "ZYX"))
    .setPosition(at[0], at[1], at[2]);
  return {
    points: solid.points.map((p) => new Vector3(...p).applyMatrix4(matrix).toArray()),
    triangles: solid.triangles,
  };
}

/** A body with a cavity: the inner surface faces inwards. */
export function hollow(outer, inner) {
  return join(outer, reverse(inner));
}

/** Several solids as one mesh. */
export function join(...solids) {
  const all = { points: [], triangles: [] };
  for (const { points, triangles } of solids) {
    const start = all.points.length;
    all.points.push(...points);
    all.triangles.push(...triangles.map((t) => t.map((i) => start + i)));
  }
  return all;
}

function outward(solid) {
  return signedVolume(solid) < 0 ? reverse(solid) : solid;
}

function reverse({ points, triangles }) {
  return { points, triangles: triangles.map(([i, j, k]) => [k, j, i]) };
}

/** Sum over the tetrahedra from the origin: Σ a·(b×c) / 6. */
function signedVolume({ points, triangles }) {
  let sum = 0;
  for (const [i, j, k] of triangles) {
    const [a, b, c] = [points[i], points[j], points[k]];
    sum +=
      a[0] * (b[1] * c[2] - b[2] * c[1]) +
      a[1] * (b[2] * c[0] - b[0] * c[2]) +
      a[2] * (b[0] * c[1] - b[1] * c[0]);
  }
  return sum / 6;
}
