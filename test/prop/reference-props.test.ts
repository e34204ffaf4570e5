import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { readModel } from "../../src/gltf/read.js";
import type { Mat3 } from "../../src/math/mat3.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { type Prop, type PropOptions, weigh } from "../../src/prop/prop.js";

// Expected numbers: test/data/props.json and test/data/real/real.json, summed over the stored vertices in exact arithmetic,
// independently of this program.

interface Reference {
  id: string;
  file: string;
  mode: string;
  density: number;
  densities_by_material: Record<string, number> | null;
  size: number;
  rel_tol?: number;
  expected: { mass: number; volume: number; com: Vec3; inertia: Mat3; principal: Vec3 };
}

const data = (path: string) => new URL(`../data/${path}`, import.meta.url);
const references = (path: string): Reference[] => JSON.parse(readFileSync(data(path), "utf8")).props;

async function weighFile(path: string, options?: PropOptions): Promise<Prop> {
  return weigh(path, await readModel(path, readFileSync(data(path))), options);
}

function expectReference(prop: Prop, { expected, size }: Reference, tolerance: number): void {
  const { mass, volume, com, inertia, principal } = expected;
  const greatest = principal[2];
  expect(Math.abs(prop.mass - mass) / mass).toBeLessThan(tolerance);
  expect(Math.abs(prop.volume - volume) / volume).toBeLessThan(tolerance);
  for (let i = 0; i < 3; i++) {
    expect(Math.abs(prop.centerOfMass[i] - com[i]) / size).toBeLessThan(tolerance);
    expect(Math.abs(prop.principal.moments[i] - principal[i]) / greatest).toBeLessThan(tolerance);
    for (let j = 0; j < 3; j++)
      expect(Math.abs(prop.inertia[i][j] - inertia[i][j]) / greatest).toBeLessThan(tolerance);
  }
}

describe("reference props", () => {
  // The reader does not take EXT_meshopt_compression.
  const solids = references("props.json").filter(
    ({ mode, id }) => mode === "solid" && id !== "meshopt_lossless",
  );

  test("are all there", () => {
    expect(solids).toHaveLength(18);
  });

  for (const reference of solids)
    test(`${reference.id} weighs what exact sums say`, async () => {
      const density = reference.densities_by_material ?? reference.density;
      expectReference(await weighFile(reference.file, { density }), reference, reference.rel_tol!);
    });
});

describe("props that others made", () => {
  for (const reference of references("real/real.json").filter(({ id }) => id !== "holed_ball"))
    test(`${reference.id} weighs what exact sums say`, async () => {
      expectReference(await weighFile(reference.file, { density: reference.density }), reference, 1e-9);
    });

  test("a ball with a hole is refused with what to do", async () => {
    // 9 open edges: test/data/real/real.json
    await expect(weighFile("real/holed_ball.glb")).rejects.toThrow(
      /not closed: 9 open edges in node .*close it/,
    );
  });

  test("a ball with a hole is taken where mass, centre and inertia are stated", async () => {
    const prop = await weighFile("real/holed_ball.glb", {
      mass: 2,
      centerOfMass: [1.5, 1.5, 1.5],
      inertia: [1, 2, 2.5],
    });
    expect([prop.mass, prop.volume, prop.centerOfMass]).toEqual([2, 0, [1.5, 1.5, 1.5]]);
    expect(prop.principal).toEqual({ moments: [1, 2, 2.5], axes: [0, 0, 0, 1] });
  });
});
