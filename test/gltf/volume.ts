import type { Surface } from "../../src/gltf/surfaces.js";

/** Enclosed volume by the divergence theorem: a sixth of the sum of the corners' triple products. */
export function volume(surfaces: Surface[]): number {
  let sum = 0;
  for (const { positions: p, triangles: t } of surfaces)
    for (let i = 0; i < t.length; i += 3) {
      const [a, b, c] = [3 * t[i], 3 * t[i + 1], 3 * t[i + 2]];
      sum +=
        p[a] * (p[b + 1] * p[c + 2] - p[b + 2] * p[c + 1]) +
        p[a + 1] * (p[b + 2] * p[c] - p[b] * p[c + 2]) +
        p[a + 2] * (p[b] * p[c + 1] - p[b + 1] * p[c]);
    }
  return sum / 6;
}
