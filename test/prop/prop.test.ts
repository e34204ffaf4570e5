import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { joinGlb } from "../../src/gltf/glb.js";
import type { Model } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { type Prop, type PropOptions, weigh } from "../../src/prop/prop.js";
import { shapeModel } from "../../src/prop/shape.js";
import { difference } from "./bodies.js";

const load = (path: string): Promise<Model> =>
  readModel(path, readFileSync(new URL(`../data/props/${path}`, import.meta.url)));

const club = await load("club.glb");
const ell = await load("l_solid.glb");
const open = await load("open_box.glb");

/** A box of 1 × 1 × 1 m: 1000 kg of water, moments 1000/6. */
const cube = (options?: PropOptions): Promise<Prop> => weigh("cube", { box: [1, 1, 1] }, options);

describe("density", () => {
  // Expected masses: test/data/props.json says 7.42257512738 kg with ash 680, iron 7800 and 0.0015235177307995546 m³ in all.
  test("goes by material name, else node name, else default, else water", async () => {
    const { mass: water } = await weigh("club", club);
    expect(water).toBeCloseTo(1.52351773079955, 12);
    const { mass: mixed } = await weigh("club", club, { density: { ash: 680, default: 7800 } });
    expect(mixed).toBeCloseTo(7.422575127382966, 10);
    const { mass: ironIsWater } = await weigh("club", club, { density: { ash: 680 } });
    // ash V_a + iron V_i = m and V_a + V_i = V give V_a
    const ash = (7800 * 0.0015235177307995546 - 7.422575127382966) / (7800 - 680);
    expect(ironIsWater).toBeCloseTo(680 * ash + 1000 * (0.0015235177307995546 - ash), 10);
    const byNode = await weigh("club", club, { density: { handle: 680, knob: 7800 } });
    expect(byNode.mass).toBe(mixed);
    const materialFirst = await weigh("club", club, { density: { handle: 1, ash: 680, knob: 7800 } });
    expect(materialFirst.mass).toBe(mixed);
  });

  test("0 leaves a part out of the weighing, not out of the reach", async () => {
    const whole = await weigh("club", club, { density: { iron: 0 } });
    expect(whole.mass).toBeLessThan(1.5);
    expect(whole.size).toEqual((await weigh("club", club)).size);
    await expect(weigh("club", club, { density: 0 })).rejects.toThrow("density: is 0 throughout; needs");
  });

  test("of a name that is nowhere in the model is an error", async () => {
    await expect(weigh("club", club, { density: { irn: 7800 } })).rejects.toThrow(
      'density.irn: no material or node is called "irn"; nearest is "iron"',
    );
  });
});

describe("mass and weights", () => {
  test("a stated mass scales the density", async () => {
    const [free, stated] = [await weigh("L", ell), await weigh("L", ell, { mass: 2 })];
    const factor = 2 / free.mass;
    expect(stated.volume).toBe(free.volume);
    expect(
      difference(stated, {
        ...free,
        mass: 2,
        inertia: free.inertia.map((row) => row.map((v) => v * factor)) as never,
      }),
    ).toBeLessThan(1e-15);
  });

  test("point masses add by the parallel axis theorem", async () => {
    // 1000 kg cube, 1000 kg at 2 m along x: centre at 1 m; across 1000/6 + 2 × 1000 × 1²
    const prop = await cube({ weights: [{ at: [2, 0, 0], mass: 1000 }] });
    expect([prop.mass, prop.centerOfMass]).toEqual([2000, [1, 0, 0]]);
    expect(prop.inertia[0][0]).toBeCloseTo(1000 / 6, 10);
    expect(prop.inertia[1][1]).toBeCloseTo(1000 / 6 + 2000, 10);
    // the far corners of the cube
    expect(prop.reach).toBeCloseTo(Math.hypot(1.5, 0.5, 0.5), 14);
  });

  test("a stated mass is the whole, weights included", async () => {
    const prop = await cube({ mass: 3, weights: [{ at: [0, 0.5, 0], mass: 1 }] });
    expect(prop.mass).toBe(3);
    expect(prop.centerOfMass[1]).toBeCloseTo(1 / 6, 15);
    await expect(cube({ mass: 1, weights: [{ at: [0, 0, 0], mass: 1 }] })).rejects.toThrow(
      "mass: is 1 kg, but the weights alone are 1 kg",
    );
  });
});

describe("what is stated", () => {
  test("is taken instead of what is worked out", async () => {
    const prop = await cube({ centerOfMass: [0, 0.25, 0], inertia: [3, 1, 2.5] });
    expect([prop.mass, prop.centerOfMass, prop.principal.moments]).toEqual([1000, [0, 0.25, 0], [1, 2.5, 3]]);
    expect(prop.names).toEqual({ long: [0, 1, 0], middle: [0, 0, 1], short: [1, 0, 0] });
    expect(prop.reach).toBe(Math.hypot(0.5, 0.75, 0.5));
  });

  test("makes weights an error where nothing is left for them to change", async () => {
    await expect(
      cube({ mass: 1, centerOfMass: [0, 0, 0], inertia: [1, 1, 1], weights: [{ at: [1, 0, 0], mass: 1 }] }),
    ).rejects.toThrow("weights: change nothing where mass, centerOfMass and inertia are all stated");
  });

  test("numbers that no body has are errors", async () => {
    await expect(cube({ mass: 0 })).rejects.toThrow("mass: is 0; needs kg above 0");
    await expect(cube({ scale: -1 })).rejects.toThrow("scale: is -1; needs a factor above 0");
    await expect(cube({ weights: [{ at: [0, 0, 0], mass: Number.NaN }] })).rejects.toThrow(
      "weights.0.mass: is NaN",
    );
    await expect(cube({ inertia: [1, 1, 9] })).rejects.toThrow("inertia: no body has it");
  });
});

describe("meshes that are no solids", () => {
  // test/data/props.json: 4 open edges, 1.25 m²; the box is 0.5 × 0.25 × 1 m.
  test("are capped where the opening is flat, with a warning that names the key", async () => {
    const prop = await weigh("box", open);
    expect(prop.mass).toBeCloseTo(125, 10);
    expect(prop.warnings).toEqual([
      expect.stringMatching(
        /material "sheet": not closed: a flat opening is capped and the inside is solid; if it is hollow, state wall$/,
      ),
    ]);
  });

  test("are thin where a wall is stated, in metres after scale, and then no warning is left", async () => {
    const prop = await weigh("box", open, { wall: 0.004 });
    expect(prop.mass).toBeCloseTo(1000 * 0.004 * 1.25, 12);
    expect(prop.warnings).toEqual([]);
    const { mass } = await weigh("box", open, { wall: 0.004, scale: 3 });
    expect(mass).toBeCloseTo(9 * prop.mass, 11);
    await expect(weigh("box", open, { wall: 0 })).rejects.toThrow("wall: is 0; needs metres above 0");
  });

  test("that are closed are no walls though a wall is stated, unless solid: surface says so", async () => {
    const prop = await weigh("L", ell, { wall: 0.004 });
    expect(prop.warnings).toEqual([
      "wall changes nothing: all parts are closed, and solid; solid: surface makes thin walls of the faces",
    ]);
    // 0.625 m²: test/data/props.json
    const hollow = await weigh("L", ell, { wall: 0.004, solid: "surface" });
    expect(hollow.mass).toBeCloseTo(1000 * 0.004 * 0.625, 12);
    expect(hollow.warnings).toEqual([]);
  });

  test("need no weighing, and no warning, where mass, centre and inertia are stated", async () => {
    const stated = { mass: 3.125, centerOfMass: [0, 0.175, 0], inertia: [0.386, 0.4817, 0.1387] } as const;
    const prop = await weigh("box", open, stated);
    expect([prop.mass, prop.principal.moments, prop.warnings]).toEqual([3.125, [0.1387, 0.386, 0.4817], []]);
    const flat = await weigh("flat", await load("bad/zero_volume_flat.glb"), stated);
    expect([flat.mass, flat.volume]).toEqual([3.125, 0]);
  });

  test("flat ones and empty scenes are refused", async () => {
    await expect(load("bad/zero_volume_flat.glb").then((m) => weigh("flat", m))).rejects.toThrow(/is flat/);
    // Stated to be thin, it is.
    const card = await load("bad/zero_volume_flat.glb").then((m) => weigh("flat", m, { wall: 0.001 }));
    expect(card.mass).toBeCloseTo(0.125, 12);
    await expect(load("bad/scale_zero.glb").then((m) => weigh("zero", m))).rejects.toThrow(/is flat|scale/);
    await expect(load("bad/no_mesh.gltf").then((m) => weigh("none", m))).rejects.toThrow(
      "model: has no triangles to weigh; needs a mesh in its default scene",
    );
  });
});

describe("scale", () => {
  test("s makes mass s³, inertia s⁵, places and lengths s; stated places are after it", async () => {
    const points = { grip: [0.1, 0.2, 0.3] } as const;
    const [one, two] = [await weigh("L", ell), await weigh("L", ell, { scale: 2, points })];
    expect(two.mass).toBeCloseTo(8 * one.mass, 11);
    expect(two.volume).toBeCloseTo(8 * one.volume, 14);
    expect(two.reach).toBeCloseTo(2 * one.reach, 14);
    for (let i = 0; i < 3; i++) {
      expect(two.size[i]).toBe(2 * one.size[i]);
      expect(two.centerOfMass[i]).toBeCloseTo(2 * one.centerOfMass[i], 14);
      expect(two.principal.moments[i] / one.principal.moments[i]).toBeCloseTo(32, 12);
    }
    expect(two.principal.axes).toEqual(one.principal.axes);
    expect([...two.extremes]).toEqual([...one.extremes].map((value) => 2 * value));
    expect(two.points.grip.position).toEqual([0.1, 0.2, 0.3]);
  });

  test("goes for shapes too", async () => {
    const [small, large] = [
      await weigh("ball", { sphere: 0.1 }, { scale: 5 }),
      await weigh("ball", { sphere: 0.5 }),
    ];
    expect(small.mass).toBeCloseTo(large.mass, 10);
    expect(small.reach).toBeCloseTo(0.5, 15);
  });

  test("that looks wrong is warned of", async () => {
    expect((await cube()).warnings).toEqual([]);
    expect((await cube({ scale: 10 })).warnings).toEqual([
      "reaches 8.66 m from its centre of mass: if its unit is not the metre, set scale (a model in centimetres: 0.01)",
    ]);
    expect((await cube({ scale: 0.005 })).warnings).toEqual([
      "reaches only 0.00433 m from its centre of mass: if its unit is not the metre, set scale",
    ]);
  });
});

describe("points", () => {
  /** A box with an empty node `socket` at (0.1, 0, 0.2), a quarter turn about y. */
  async function boxWithSocket(): Promise<Model> {
    const { json, buffers } = shapeModel("crate", { box: [0.5, 0.5, 0.5] });
    const S = Math.SQRT1_2;
    json.nodes!.push({ name: "socket", translation: [0.1, 0, 0.2], rotation: [0, S, 0, S] });
    json.scenes![0].nodes!.push(1);
    const text = new TextEncoder().encode(JSON.stringify(json));
    return readModel("crate.glb", joinGlb({ json: text, binary: buffers[0] }));
  }

  test("are places, or a node's place and axes after scale", async () => {
    const { points } = await weigh("crate", await boxWithSocket(), {
      scale: 2,
      points: { grip: [0, 0.1, 0], socket_r: { node: "socket" } },
    });
    expect(points.grip).toEqual({ position: [0, 0.1, 0], rotation: [0, 0, 0, 1] });
    [0.2, 0, 0.4].forEach((value, i) => {
      expect(points.socket_r.position[i]).toBeCloseTo(value, 15);
    });
    [0, Math.SQRT1_2, 0, Math.SQRT1_2].forEach((value, i) => {
      expect(points.socket_r.rotation[i]).toBeCloseTo(value, 15);
    });
  });

  test("of a node that is not there name the nearest", async () => {
    const crate = await boxWithSocket();
    await expect(weigh("crate", crate, { points: { p: { node: "sockt" } } })).rejects.toThrow(
      'points.p.node: there is no node "sockt"; nearest is "socket"',
    );
    await expect(cube({ points: { p: { node: "socket" } } })).rejects.toThrow(
      "a shape has no nodes: give a place [x, y, z]",
    );
  });
});

describe("extreme points", () => {
  test("are the vertices, each place once", async () => {
    // 24 vertices at 8 places: test/data/props.json
    const seams = await weigh("box", await load("uv_seams.glb"));
    expect(seams.extremes).toHaveLength(24);
    expect((await cube()).extremes).toHaveLength(24);
  });
});
