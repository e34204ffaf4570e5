/**
 * Normals from the shape itself: faces that meet at less than the crease angle share a smooth normal, others
 * keep a sharp edge. A face weighs by its area, so that a narrow bevel reads as a rounded edge of a flat face.
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
  const faces = triangles.map((corners) => faceNormal(corners.map((i) => rounded[i])));
  const around = facesByPoint(triangles, points.length);
  const leastCosine = Math.cos((creaseDegrees * Math.PI) / 180);

  const positions = [];
  const normals = [];
  const indices = [];
  const known = new Map();
  triangles.forEach((corners, face) => {
    for (const point of corners) {
      const sum = new Vector3();
      for (const other of around[point]) {
        if (faces[other].unit.dot(faces[face].unit) >= leastCosine) {
          sum.addScaledVector(faces[other].unit, faces[other].area);
        }
      }
      const normal = roundTo(sum.normalize().toArray(), NORMAL_STEPS);
      const key = `${rounded[point]},${normal}`;
      if (!known.has(key)) {
        known.set(key, known.size);
        positions.push(...rounded[point]);
        normals.push(...normal);
      }
      indices.push(known.get(key));
    }
  });
  return {
    positions: new Float32Array(positions),
    normals: new Float32Array(normals),
    indices: new Uint16Array(indices),
  };
}

function facesByPoint(triangles, count) {
  const around = Array.from({ length: count }, () => []);
  triangles.forEach((corners, face) => {
    for (const point of corners) around[point].push(face);
  });
  return around;
}

function faceNormal(corners) {
  const [a, b, c] = corners.map((p) => new Vector3(...p));
  const unit = b.sub(a).cross(c.sub(a));
  const area = unit.length() / 2;
  if (area === 0) throw new Error(`a triangle without area at ${corners[0]}`);
  return { unit: unit.normalize(), area };
}

function roundTo(vector, steps) {
  return vector.map((x) => Math.round(x * steps) / steps + 0); // + 0: no negative zero
}
