import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { readModel } from "../../src/gltf/read.js";
import { readSurfaces, type Surface } from "../../src/gltf/surfaces.js";

const folder = new URL("../data/props/", import.meta.url);
const surfacesOf = async (file: string) =>
  readSurfaces(await readModel(file, readFileSync(new URL(file, folder))));

/** Enclosed volume by the divergence theorem: a sixth of the sum of the corners' triple products. */
function volume(surfaces: Surface[]): number {
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

describe("surfaces of the reference props", () => {
  // Volumes: the reference set beside these files, worked out independently (exact sums over the stored vertices).
  it.each([
    ["box_offpivot.glb", 0.09375],
    ["tetra_regular.glb", 0.041666666666666664],
    ["l_solid.glb", 0.0234375],
    ["ellipsoid.glb", 0.025078433912027],
    ["club.glb", 0.0015235177307995546],
    ["hierarchy_shear.glb", 0.09375],
    ["mirrored.glb", 0.0625],
    ["two_instances.glb", 0.1875],
    ["inverted_winding.glb", -0.0234375],
    ["strip_box.glb", 0.09375],
    ["uv_seams.glb", 0.09375],
    ["cavity.glb", 0.34375],
    ["overlapping_parts.glb", 0.25],
    ["quantised_i16.glb", 0.0625],
    ["sparse_override.glb", 0.1171875],
    ["skin_bind_pose.glb", 0.0390625],
    ["degenerate_mixed.glb", 0.09375],
  ])("%s encloses %d m³", async (file, expected) => {
    const { surfaces, warnings } = await surfacesOf(file);
    expect(Math.abs(volume(surfaces) / expected - 1)).toBeLessThan(1e-13);
    expect(warnings).toEqual([]);
  });
});
