import { atan2 } from "../math/elementary.js";
import { cross, dot, length, subtract, type Vec3 } from "../math/vec3.js";
import { vertex } from "./vertex.js";

/**
 * Whether a point lies within a closed surface, whichever way its triangles face: the solid angle that the surface spans
 * from the point is 4π times a whole number, 0 outside. Triangle: Van Oosterom & Strackee, "The solid angle of a plane
 * triangle", IEEE Trans. Biomed. Eng. 30 (1983) 125.
 */
export function isInside(point: Vec3, positions: Float64Array, triangles: Uint32Array): boolean {
  let halfAngles = 0;
  for (let t = 0; t < triangles.length; t += 3) {
    const a = subtract(vertex(positions, triangles[t]), point);
    const b = subtract(vertex(positions, triangles[t + 1]), point);
    const c = subtract(vertex(positions, triangles[t + 2]), point);
    const [la, lb, lc] = [length(a), length(b), length(c)];
    const over = dot(a, cross(b, c));
    const under = la * lb * lc + dot(a, b) * lc + dot(b, c) * la + dot(c, a) * lb;
    halfAngles += atan2(over, under);
  }
  // Halfway between outside (0) and once round (2π in half angles).
  return Math.abs(halfAngles) > Math.PI;
}
