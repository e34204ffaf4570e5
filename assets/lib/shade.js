/**
 * Normals from the shape itself: an edge whose faces meet at less than the crease angle is smooth, others are
 * sharp. Round a point, the faces between sharp edges share one normal; a face weighs by its area, so that a
 * narrow bevel reads as the rounded edge of a flat face.
 */
import { Vector3 } from "three";

const MICROMETRES = 1e6;
const NORMAL_STEPS = 1e5;

/**
 * @param {import("./solid.js").Solid} solid
 * @param {number} creaseDegrees
 * @returns {{ positions: Float32Array, normals: Float32Array, indices: Uint16Array }} ready for glTF
 */
export function shade({ points, triangles }, creaseDegrees) {
  // Whole micrometres: the last digit of a sine is not the same in every engine, the file must be.
  const rounded = points.map((point) => roundTo(point, MICROMETRES));
  const faces = triangles.map((corners) => measure(corners.map((i) => rounded[i])));
  const facesAt = rounded.map(() => []);
  triangles.forEach((corners, face) => {
    for (const point of corners) facesAt[point].push(face);
  });
  const leastCosine = Math.cos((creaseDegrees * Math.PI) / 180);
  const isSmooth = (a, b) => faces[a].unit.dot(faces[b].unit) >= leastCosine;

  const positions = [];
  const normals = [];
  const indexOf = new Map();
  facesAt.forEach((around, point) => {
    for (const fan of fans(around, point, triangles, isSmooth)) {
      const sum = new Vector3();
      for (const face of fan) {
        sum.addScaledVector(faces[face].unit, faces[face].area);
        indexOf.set(`${face} ${point}`, positions.length / 3);
      }
      positions.push(...rounded[point]);
      normals.push(...roundTo(sum.normalize().toArray(), NORMAL_STEPS));
    }
  });
  const indices = triangles.flatMap((corners, face) =>
    corners.map((point) => indexOf.get(`${face} ${point}`)),
  );
  return {
    positions: new Float32Array(positions),
    normals: new Float32Array(normals),
    indices: new Uint16Array(indices),
  };
}

/** The faces round a point in groups that smooth edges hold together. */
function fans(around, point, triangles, isSmooth) {
  const left = new Set(around);
  const groups = [];
  for (const first of around) {
    if (!left.delete(first)) continue;
    const group = [first];
    for (const face of group) {
      for (const other of left) {
        const shareEdge = triangles[face].some((p) => p !== point && triangles[other].includes(p));
        if (shareEdge && isSmooth(face, other)) {
          left.delete(other);
          group.push(other);
        }
      }
    }
    groups.push(group);
  }
  return groups;
}

function measure(corners) {
  const [a, b, c] = corners.map((p) => new Vector3(...p));
  const unit = b.sub(a).cross(c.sub(a));
  const area = unit.length() / 2;
  if (area === 0) throw new Error(`a triangle without area at ${corners[0]}`);
  return { unit: unit.normalize(), area };
}

function roundTo(vector, steps) {
  return vector.map((x) => Math.round(x * steps) / steps + 0); // + 0: no negative zero
}
