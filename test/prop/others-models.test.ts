import { readFileSync } from "node:fs";
import { Vector3 } from "three";
import { ConvexHull } from "three/examples/jsm/math/ConvexHull.js";
import { describe, expect, test } from "vitest";
import { readModel } from "../../src/gltf/read.js";
import { type Prop, type PropOptions, weigh } from "../../src/prop/prop.js";

// Models that others made, for other ends: hand_fixed.glb, hand_skinned.glb (generic-hand/left.glb, unchanged) and grip_parts.glb
// (generic-trigger-squeeze/left.glb without textures, normals and texture coordinates) from @webxr-input-profiles/assets 1.0.20, MIT;
// rock.glb and holed_ball.glb from Debian's assimp-testmodels, BSD-3-Clause. Licences beside them.

async function weighed(file: string, options?: PropOptions): Promise<Prop> {
  const path = `../data/real/${file}`;
  return weigh(file, await readModel(file, readFileSync(new URL(path, import.meta.url))), options);
}

describe("a hand-held grip of nine nodes, most of them open", () => {
  test("weighs as one would think, and says of each guess which key settles it", async () => {
    const prop = await weighed("grip_parts.glb");
    expect(prop.warnings).toEqual([
      expect.stringMatching(
        /^node "Body".*node "Plate".*2 flat openings are capped.*if it is hollow, state wall$/,
      ),
      expect.stringMatching(
        /^node "GRIP".*node "trigger".*2 open parts are taken as a thin surface.*state wall/,
      ),
    ]);
    // As large as a fist's inside, 13 cm long: a fifth to half of its box (common practice, no source); round about its length.
    const [x, y, z] = prop.size;
    expect(prop.volume / (x * y * z)).toBeGreaterThan(0.2);
    expect(prop.volume / (x * y * z)).toBeLessThan(0.5);
    expect(Math.abs(prop.names.long[2])).toBeGreaterThan(0.9);
    expect(prop.principal.moments[1] / prop.principal.moments[2]).toBeGreaterThan(0.85);
  });

  test("of walls, as a case is, weighs as its area does, about the same place", async () => {
    const [solid, walls] = [
      await weighed("grip_parts.glb"),
      await weighed("grip_parts.glb", { wall: 0.002 }),
    ];
    expect([walls.volume, walls.warnings]).toEqual([0, []]);
    expect(walls.mass).toBeLessThan(solid.mass);
    for (let i = 0; i < 3; i++)
      expect(Math.abs(walls.centerOfMass[i] - solid.centerOfMass[i])).toBeLessThan(0.1 * solid.reach);
  });
});

test("a hand on a skeleton weighs what a stiff one does, within a tenth", async () => {
  // The same maker's hand twice: with 25 joints, in its rest pose, and without.
  const [skinned, fixed] = [await weighed("hand_skinned.glb"), await weighed("hand_fixed.glb")];
  expect(skinned.warnings).toEqual([]);
  expect(Math.abs(skinned.mass / fixed.mass - 1)).toBeLessThan(0.1);
  for (let i = 0; i < 3; i++)
    expect(Math.abs(skinned.principal.moments[i] / fixed.principal.moments[i] - 1)).toBeLessThan(0.25);
});

describe("the volume of a hull is what another library's hull has", () => {
  for (const file of ["hand_fixed.glb", "hand_skinned.glb", "grip_parts.glb", "rock.glb", "holed_ball.glb"])
    test(file, async () => {
      const prop = await weighed(file, { solid: "hull" });
      const points = Array.from({ length: prop.extremes.length / 3 }, (_, i) =>
        new Vector3().fromArray(prop.extremes, 3 * i),
      );
      let six = 0;
      for (const { edge } of new ConvexHull().setFromPoints(points).faces) {
        const corners = [edge, edge.next, edge.prev].map((side) => side.head().point);
        six += corners[0].dot(corners[1].clone().cross(corners[2]));
      }
      expect(prop.volume / (six / 6)).toBeCloseTo(1, 12);
    });
});
