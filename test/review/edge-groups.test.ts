import { expect, test } from "vitest";
import { normalize, type Quat } from "../../src/math/quat.js";
import { add, scale, type Vec3 } from "../../src/math/vec3.js";
import { contourOf } from "../../src/review/contour.js";
import { solidOf } from "../../src/review/outline.js";
import { meshModel } from "./meshes.js";

const RINGS = 110;

/** A dented bowl, open at the top, with a sliver of no area: 24,200 triangles. */
function bowl() {
  const positions: Vec3[] = [];
  const triangles: Vec3[] = [];
  for (let ring = 0; ring <= RINGS; ring++)
    for (let side = 0; side < RINGS; side++) {
      const polar = Math.PI * (0.2 + (0.75 * ring) / RINGS);
      const round = (2 * Math.PI * side) / RINGS;
      const radius = 0.1 + 0.02 * Math.sin(5 * polar) * Math.sin(3 * round);
      positions.push([
        radius * Math.sin(polar) * Math.cos(round),
        radius * Math.cos(polar),
        radius * Math.sin(polar) * Math.sin(round),
      ]);
    }
  for (let ring = 0; ring < RINGS; ring++)
    for (let side = 0; side < RINGS; side++) {
      const [a, b] = [ring * RINGS + side, ring * RINGS + ((side + 1) % RINGS)];
      triangles.push([a, b, a + RINGS], [b, b + RINGS, a + RINGS]);
    }
  // a corner of it on the line between the two others
  positions.push(scale(add(positions[0], positions[1]), 0.5));
  triangles.push([0, positions.length - 1, 1]);
  return meshModel(positions, triangles);
}

test("a mesh of many edges has the contour that a look at each of them finds", async () => {
  const solid = await solidOf(await bowl(), { scale: 1, centerOfMass: [0, 0, 0] });
  expect(solid.groups).toBeDefined();
  let passedOver = 0;
  for (let i = 1; i < 20; i++) {
    const view: Quat = normalize([Math.sin(i), Math.cos(2 * i), Math.sin(3 * i), Math.cos(5 * i)]);
    const rows = (of: Parameters<typeof contourOf>[0]) => {
      const { count, ends, weights } = contourOf(of, view);
      return Array.from({ length: count }, (_, n) =>
        [...ends.subarray(4 * n, 4 * n + 4), weights[n]].join(" "),
      ).sort();
    };
    const all = rows({ ...solid, groups: undefined });
    expect(rows(solid)).toEqual(all);
    passedOver += solid.edges.length / 2 - all.length;
  }
  expect(passedOver).toBeGreaterThan(100_000);
});
