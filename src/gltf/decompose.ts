import { determinant, diagonal, multiply, transpose } from "../math/mat3.js";
import { type Quat, toMatrix } from "../math/quat.js";
import { length, type Vec3 } from "../math/vec3.js";
import { type Frame, frameRotation } from "./scene.js";

/**
 * Translation, rotation and scale of a frame, a mirrored one with its x scaled negatively. Undefined where it has none: a
 * sheared frame, or one that is flat.
 */
export function decompose(frame: Frame): { translation: Vec3; rotation: Quat; scale: Vec3 } | undefined {
  const rotation = frameRotation(frame.linear);
  if (!rotation) return undefined;
  const columns = transpose(frame.linear);
  const x = length(columns[0]);
  const scale: Vec3 = [determinant(frame.linear) < 0 ? -x : x, length(columns[1]), length(columns[2])];
  const greatest = Math.max(...scale.map(Math.abs));
  const again = multiply(toMatrix(rotation), diagonal(scale));
  // Matrices are stated to float32 as a rule.
  const same = again.every((row, i) =>
    row.every((entry, j) => Math.abs(entry - frame.linear[i][j]) < 1e-5 * greatest),
  );
  return same ? { translation: frame.origin, rotation, scale } : undefined;
}
