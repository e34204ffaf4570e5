import { createRequire } from "node:module";
import RAPIER from "@dimforge/rapier3d-compat";
import { beforeAll, describe, expect, test } from "vitest";
import { joinGlb } from "../../src/gltf/glb.js";
import { readModel } from "../../src/gltf/read.js";
import { readSurfaces } from "../../src/gltf/surfaces.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { findParts } from "../../src/prop/closed-parts.js";
import { massOfSurfaces } from "../../src/prop/mass-of-surfaces.js";
import { weigh } from "../../src/prop/prop.js";
import { type Shape, shapeModel } from "../../src/prop/shape.js";
import { shapeReach } from "../../src/prop/shape-extent.js";
import { shapeMass } from "../../src/prop/shape-mass.js";
import { shapeMesh } from "../../src/prop/shape-mesh.js";
import { weld } from "../../src/prop/weld.js";

const validator = createRequire(import.meta.url)("gltf-validator");

const PI = Math.PI;

/**
 * Volume, centre along the axis, moments per mass about x, y, z, reach. Moments typed from the table of solids in the CRC
 * Standard Mathematical Tables and the list of moments of inertia common to handbooks (Bronshtein & Semendyayev); the capsule's and
 * the cone's about the centre of mass from there by the parallel axis theorem.
 */
const handbook: [string, Shape, { volume: number; y?: number; moments: Vec3; reach: number }][] = [
  [
    "box",
    { box: [0.2, 0.3, 0.6] },
    { volume: 0.036, moments: [0.45 / 12, 0.4 / 12, 0.13 / 12], reach: 0.35 },
  ],
  ["sphere", { sphere: 0.5 }, { volume: PI / 6, moments: [0.1, 0.1, 0.1], reach: 0.5 }],
  [
    "ellipsoid",
    { ellipsoid: [0.1, 0.2, 0.3] },
    { volume: (4 / 3) * PI * 0.006, moments: [0.13 / 5, 0.1 / 5, 0.05 / 5], reach: 0.3 },
  ],
  [
    "cylinder",
    { cylinder: { radius: 0.3, length: 0.8 } },
    {
      volume: PI * 0.072,
      moments: [0.09 / 4 + 0.64 / 12, 0.09 / 2, 0.09 / 4 + 0.64 / 12],
      reach: 0.5,
    },
  ],
  [
    "cone",
    { cone: { radius: 0.3, length: 0.8 } },
    {
      volume: PI * 0.024,
      y: -0.2,
      // about the apex 3/20 r² + 3/5 h², less (3h/4)²
      moments: [0.0135 + 0.384 - 0.36, 0.027, 0.0135 + 0.384 - 0.36],
      // apex 0.6 away, rim √(0.09 + 0.04)
      reach: 0.6,
    },
  ],
  [
    // Bars of no length between the ends: a ball.
    "capsule as short as can be",
    { capsule: { radius: 0.5, length: 1 } },
    { volume: PI / 6, moments: [0.1, 0.1, 0.1], reach: 0.5 },
  ],
  [
    "ring",
    { ring: { radius: 0.4, thickness: 0.2 } },
    {
      volume: 2 * PI * PI * 0.4 * 0.01,
      // (4R² + 5a²)/8 and (4R² + 3a²)/4
      moments: [0.69 / 8, 0.67 / 4, 0.69 / 8],
      reach: 0.5,
    },
  ],
  [
    "disc",
    { disc: { radius: 0.4, thickness: 0.06 } },
    { volume: PI * 0.0096, moments: [0.04 + 0.0003, 0.08, 0.04 + 0.0003], reach: Math.hypot(0.4, 0.03) },
  ],
  [
    "tube",
    { tube: { outer: 0.3, inner: 0.2, length: 0.8 } },
    { volume: PI * 0.04, moments: [0.13 / 4 + 0.64 / 12, 0.065, 0.13 / 4 + 0.64 / 12], reach: 0.5 },
  ],
];

const capsule: [string, Shape] = ["capsule", { capsule: { radius: 0.2, length: 1 } }];
const all: [string, Shape][] = [...handbook.map(([name, shape]): [string, Shape] => [name, shape]), capsule];

describe("shapes in closed form", () => {
  for (const [name, shape, { volume, y = 0, moments, reach }] of handbook)
    test(`a ${name} is what handbooks say`, async () => {
      const prop = await weigh(name, shape, { density: 700 });
      expect(prop.volume).toBeCloseTo(volume, 13);
      expect(prop.mass / (700 * volume)).toBeCloseTo(1, 13);
      expect(prop.centerOfMass).toEqual([0, y, 0]);
      for (let i = 0; i < 3; i++) expect(prop.inertia[i][i] / prop.mass).toBeCloseTo(moments[i], 13);
      expect(prop.reach).toBeCloseTo(reach, 13);
      expect(prop.warnings).toEqual([]);
    });
});

const welded = ({ positions, triangles }: { positions: Float64Array; triangles: Uint32Array }) =>
  weld([{ positions, triangles, owners: new Uint32Array(triangles.length / 3) }]);

const SOLID = { solid: "auto", wall: 0.002, isWallStated: false } as const;

describe("the meshes of shapes", () => {
  for (const [name, shape] of all) {
    test(`a ${name}'s mesh is closed, faces outwards and weighs nearly as much`, async () => {
      const { surfaces } = await readSurfaces(shapeModel(name, shape));
      const meshes = surfaces.map(welded);
      const { closed, open } = findParts(meshes);
      expect([closed.length, open.length]).toEqual([1, 0]);
      const { body, warnings } = massOfSurfaces(meshes, [{ density: 1000, label: name }], SOLID);
      expect(warnings).toEqual([]);
      const ideal = shapeMass(shape, 1000);
      const isRound = !("box" in shape);
      // A circle of 32 corners has 1 − (π/16)²/6 of the area: 0.64 % less; a ring's and a ball's second curve of 16 up to four times that.
      const short = 1 - body.volume / ideal.volume;
      expect(short).toBeGreaterThan(isRound ? 0.004 : -5e-7);
      expect(short).toBeLessThan(isRound ? 0.034 : 5e-7);
      for (let i = 0; i < 3; i++) {
        expect(Math.abs(body.centerOfMass[i] - ideal.centerOfMass[i])).toBeLessThan(1e-7);
        const loss = 1 - body.inertia[i][i] / ideal.inertia[i][i];
        expect(loss).toBeGreaterThan(-5e-7);
        expect(loss).toBeLessThan(isRound ? 0.06 : 5e-7);
      }
    });

    if (!("box" in shape))
      test(`a ${name}'s mesh nears it four times as much with every halving of its edges`, () => {
        const ideal = shapeMass(shape, 1000);
        const losses = [64, 128].map((around) => {
          const { positions, indices } = shapeMesh(shape, around);
          const mesh = { positions: Float64Array.from(positions), triangles: Uint32Array.from(indices) };
          const { body } = massOfSurfaces([welded(mesh)], [{ density: 1000, label: name }], SOLID);
          return [
            1 - body.volume / ideal.volume,
            1 - body.inertia[0][0] / ideal.inertia[0][0],
            1 - body.inertia[1][1] / ideal.inertia[1][1],
          ];
        });
        // What chords leave of a circle is of the second order in their length, then of the fourth.
        losses[0].forEach((loss, i) => {
          expect(loss / losses[1][i]).toBeGreaterThan(3.95);
          expect(loss / losses[1][i]).toBeLessThan(4.05);
        });
      });

    test(`a ${name}'s normals are unit vectors that face as its triangles do`, () => {
      const { json, buffers } = shapeModel(name, shape);
      const [at, normals, , indices] = json.accessors!.map((accessor) => {
        const { byteOffset = 0, byteLength } = json.bufferViews![accessor.bufferView!];
        const bytes = buffers[0].slice(byteOffset, byteOffset + byteLength).buffer;
        return accessor.componentType === 5126 ? new Float32Array(bytes) : new Uint16Array(bytes);
      });
      const vec = (array: ArrayLike<number>, i: number) => [array[3 * i], array[3 * i + 1], array[3 * i + 2]];
      for (let t = 0; t < indices.length; t += 3) {
        const corners = [...indices.subarray(t, t + 3)];
        const [a, b, c] = corners.map((i) => vec(at, i));
        const [u, v] = [b, c].map((p) => p.map((value, i) => value - a[i]));
        const face = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
        const size = Math.hypot(...face);
        expect(size).toBeGreaterThan(0);
        for (const i of corners) {
          const normal = vec(normals, i);
          expect(Math.hypot(...normal)).toBeCloseTo(1, 6);
          const cosine = normal.reduce((sum, value, k) => sum + (value * face[k]) / size, 0);
          expect(cosine).toBeGreaterThan(0.9);
        }
      }
    });

    test(`the validator has nothing against a ${name}, but that no texture uses its UVs yet`, async () => {
      const { text, buffers } = shapeModel(name, shape);
      const glb = joinGlb({ json: new TextEncoder().encode(text), binary: buffers[0] });
      const { issues } = await validator.validateBytes(glb);
      expect(
        issues.messages.map(({ code, pointer }: { code: string; pointer: string }) => [code, pointer]),
      ).toEqual([["UNUSED_OBJECT", "/meshes/0/primitives/0/attributes/TEXCOORD_0"]]);
      const model = await readModel(name, glb);
      expect(model.json.materials?.map((material) => material.name)).toEqual([name]);
    });

    test(`no point of a ${name} is further than its reach, wherever it is seen from, and one is nearly as far`, async () => {
      const { surfaces } = await readSurfaces(shapeModel(name, shape));
      const { positions } = surfaces[0];
      for (const from of [
        [0, 0, 0],
        [0.1, 0.2, -0.3],
        [0, -0.7, 0],
        [0.5, 0.01, 0.02],
      ] as Vec3[]) {
        let furthest = 0;
        for (let i = 0; i < positions.length; i += 3)
          furthest = Math.max(
            furthest,
            Math.hypot(positions[i] - from[0], positions[i + 1] - from[1], positions[i + 2] - from[2]),
          );
        const reach = shapeReach(shape, from);
        expect(furthest).toBeLessThan(reach + 1e-7);
        if (!("ellipsoid" in shape)) expect(furthest).toBeGreaterThan(0.985 * reach);
      }
    });
  }
});

describe("a physics engine as a second opinion", () => {
  // @dimforge/rapier3d-compat works out mass properties of its own shapes; it counts in single precision.
  const SINGLE = 2e-6;
  beforeAll(() => RAPIER.init());

  const engine: [string, Shape, () => RAPIER.ColliderDesc][] = [
    ["box", { box: [0.2, 0.3, 0.6] }, () => RAPIER.ColliderDesc.cuboid(0.1, 0.15, 0.3)],
    ["sphere", { sphere: 0.5 }, () => RAPIER.ColliderDesc.ball(0.5)],
    ["cylinder", { cylinder: { radius: 0.3, length: 0.8 } }, () => RAPIER.ColliderDesc.cylinder(0.4, 0.3)],
    ["disc", { disc: { radius: 0.4, thickness: 0.06 } }, () => RAPIER.ColliderDesc.cylinder(0.03, 0.4)],
    ["cone", { cone: { radius: 0.3, length: 0.8 } }, () => RAPIER.ColliderDesc.cone(0.4, 0.3)],
    ["capsule", { capsule: { radius: 0.2, length: 1 } }, () => RAPIER.ColliderDesc.capsule(0.3, 0.2)],
  ];
  for (const [name, shape, collider] of engine)
    test(`a ${name} weighs the same`, async () => {
      const prop = await weigh(name, shape, { density: 700 });
      expectEngine(prop, collider().setDensity(700), SINGLE);
    });

  test("the mesh of an ellipsoid, weighed as a mesh, is its convex hull", async () => {
    const model = shapeModel("egg", { ellipsoid: [0.1, 0.2, 0.3] });
    const { surfaces } = await readSurfaces(model);
    const prop = await weigh("egg", model, { density: 700 });
    expectEngine(
      prop,
      RAPIER.ColliderDesc.convexHull(Float32Array.from(surfaces[0].positions))!.setDensity(700),
      // its hull may pass over corners this near to it
      1e-4,
    );
  });

  function expectEngine(
    prop: { mass: number; centerOfMass: Vec3; principal: { moments: Vec3 }; reach: number },
    collider: RAPIER.ColliderDesc,
    tolerance: number,
  ): void {
    const world = new RAPIER.World({ x: 0, y: 0, z: 0 });
    const body = world.createRigidBody(RAPIER.RigidBodyDesc.dynamic());
    world.createCollider(collider, body);
    body.recomputeMassPropertiesFromColliders();
    const { x, y, z } = body.localCom();
    const moments = Object.values(body.principalInertia()).sort((a, b) => a - b);
    expect(Math.abs(body.mass() / prop.mass - 1)).toBeLessThan(tolerance);
    [x, y, z].forEach((value, i) => {
      expect(Math.abs(value - prop.centerOfMass[i])).toBeLessThan(tolerance);
    });
    expect(moments).toHaveLength(3);
    moments.forEach((moment, i) => {
      expect(Math.abs(moment / prop.principal.moments[i] - 1)).toBeLessThan(5 * tolerance);
    });
    world.free();
  }
});

describe("shapes that are none", () => {
  const faults: [Shape, RegExp][] = [
    [{ box: [1, 0, 1] }, /^shape\.box\.1: is 0; needs a length above 0/],
    [{ sphere: -1 }, /^shape\.sphere: is -1; needs a length above 0/],
    [{ cone: { radius: Number.NaN, length: 1 } }, /^shape\.cone\.radius: is NaN/],
    [
      { capsule: { radius: 0.5, length: 0.9 } },
      /^shape\.capsule\.length: is 0\.9, .*at least twice the radius, 1$/,
    ],
    [
      { ring: { radius: 0.5, thickness: 1 } },
      /^shape\.ring\.thickness: is 1: .*less than twice the radius, 1$/,
    ],
    [{ tube: { outer: 0.5, inner: 0.5, length: 1 } }, /^shape\.tube\.inner: is 0\.5, .*less than 0\.5$/],
  ];
  for (const [shape, message] of faults)
    test(`${JSON.stringify(shape)} is refused`, () => {
      expect(() => shapeModel("x", shape)).toThrow(message);
    });
});
