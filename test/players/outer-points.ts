import type { Vec3 } from "../../src/math/vec3.js";

/** A handful of the prop's points, the furthest out in eight directions. */
export function outerPoints(extremes: Float64Array): Vec3[] {
  const directions: Vec3[] = [-1, 1].flatMap((x) =>
    [-1, 1].flatMap((y) => [-1, 1].map((z): Vec3 => [x, y, z])),
  );
  return directions.map((d) => {
    let best: Vec3 = [extremes[0], extremes[1], extremes[2]];
    const along = (p: Vec3) => p[0] * d[0] + p[1] * d[1] + p[2] * d[2];
    for (let i = 3; i < extremes.length; i += 3) {
      const p: Vec3 = [extremes[i], extremes[i + 1], extremes[i + 2]];
      if (along(p) > along(best)) best = p;
    }
    return best;
  });
}
