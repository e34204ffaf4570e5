import { readFileSync } from "node:fs";
import { Box3 } from "three";
import { GLTFLoader } from "three/examples/jsm/loaders/GLTFLoader.js";
import { describe, expect, it } from "vitest";
import { readModel } from "../../src/gltf/read.js";
import { nodeFrame, readSurfaces, type Surface } from "../../src/gltf/surfaces.js";
import { tetrahedron } from "./models.js";
import { volume } from "./volume.js";

const folder = new URL("../data/props/", import.meta.url);
const surfacesOf = async (file: string) =>
  readSurfaces(await readModel(file, readFileSync(new URL(file, folder))));

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
    ["meshopt_lossless.glb", 0.03776416640808603],
  ])("%s encloses %d m³", async (file, expected) => {
    const { surfaces, warnings } = await surfacesOf(file);
    expect(Math.abs(volume(surfaces) / expected - 1)).toBeLessThan(1e-13);
    expect(warnings).toEqual([]);
  });
});

describe("where a prop stands", () => {
  const files = [
    "box_offpivot",
    "club",
    "hierarchy_shear",
    "mirrored",
    "two_instances",
    "quantised_i16",
    "uv_seams",
  ];
  // three keeps the skin's matrices in float32.
  const cases: [string, number][] = [
    ...files.map((file): [string, number] => [file, 1e-14]),
    ["skin_bind_pose", 1e-6],
  ];
  it.each(cases)("%s is where three shows it", async (file, tolerance) => {
    const { surfaces } = await surfacesOf(`${file}.glb`);
    const bytes = new Uint8Array(readFileSync(new URL(`${file}.glb`, folder)));
    const { scene } = await new GLTFLoader().parseAsync(bytes.buffer, "");
    const box = new Box3().setFromObject(scene, true);
    const all = surfaces.flatMap(({ positions }) => [...positions]);
    for (const axis of [0, 1, 2]) {
      const along = all.filter((_, i) => i % 3 === axis);
      expect(Math.abs(Math.min(...along) - box.min.getComponent(axis))).toBeLessThan(tolerance);
      expect(Math.abs(Math.max(...along) - box.max.getComponent(axis))).toBeLessThan(tolerance);
    }
  });
});

describe("kinds of primitives", () => {
  // biome-ignore lint/suspicious/noExplicitAny: JSON changed freely
  const read = async (change: (json: any) => void) => readSurfaces(await readModel("m", tetrahedron(change)));
  // A tetrahedron on three edges at right angles holds a sixth of their product.
  const HELD = (0.5 * 0.75 * 1) / 6;

  it("a fan has the triangles 1 2 0, 2 3 0, … (glTF 2.0, 3.7.2.1)", async () => {
    const { surfaces } = await read((json) => {
      json.meshes[0].primitives = [{ attributes: { POSITION: 0 }, mode: 6 }];
    });
    expect(corners(surfaces[0])).toEqual([
      [0.5, 0, 0],
      [0, 0.75, 0],
      [0, 0, 0],
      [0, 0.75, 0],
      [0, 0, 1],
      [0, 0, 0],
    ]);
  });

  it("a strip turns every other triangle round (glTF 2.0, 3.7.2.1)", async () => {
    const { surfaces } = await read((json) => {
      json.meshes[0].primitives = [{ attributes: { POSITION: 0 }, mode: 5 }];
    });
    expect(corners(surfaces[0])).toEqual([
      [0, 0, 0],
      [0.5, 0, 0],
      [0, 0.75, 0],
      [0.5, 0, 0],
      [0, 0, 1],
      [0, 0.75, 0],
    ]);
  });

  it("a strip's joints, triangles that name a vertex twice, are left out", async () => {
    const { surfaces } = await read((json) => {
      // The numbers 0 2 1 0 1 3 0 3 2 1 2 3 as one strip: ten triangles, of which those like 1 0 1 fall away.
      json.meshes[0].primitives[0].mode = 5;
    });
    const strip = [0, 2, 1, 0, 1, 3, 0, 3, 2, 1, 2, 3];
    const kept = strip.slice(2).filter((third, i) => new Set([strip[i], strip[i + 1], third]).size === 3);
    expect(surfaces[0].triangles).toHaveLength(3 * kept.length);
    expect(kept.length).toBeLessThan(10);
  });

  it("a rotation rounded to float32 is a rotation still", async () => {
    const { surfaces } = await read((json) => {
      json.nodes[0].rotation = [0.5, 0.5, 0.5, 0.500001];
    });
    expect(volume(surfaces)).toBeCloseTo(HELD, 15);
  });

  it("skin weights that add up to a half weigh as if they did to one", async () => {
    const bytes = new Uint8Array(readFileSync(new URL("skin_bind_pose.glb", folder)));
    const view = new DataView(bytes.buffer);
    const binary = 28 + view.getUint32(12, true);
    // Its second view: 16 weights of four floats from byte 64.
    for (let at = binary + 64; at < binary + 320; at += 4)
      view.setFloat32(at, view.getFloat32(at, true) / 2, true);
    const { surfaces } = await readSurfaces(await readModel("m", bytes));
    expect(Math.abs(volume(surfaces) / 0.0390625 - 1)).toBeLessThan(1e-13);
  });

  it("points and lines are passed over, and said", async () => {
    const { surfaces, warnings } = await read((json) => {
      json.meshes[0].primitives.push(
        { attributes: { POSITION: 0 }, mode: 0 },
        { attributes: { POSITION: 0 }, mode: 3 },
      );
      json.nodes.push({ mesh: 0 });
      json.scenes[0].nodes = [0, 1];
    });
    expect(surfaces).toHaveLength(2);
    expect(warnings).toEqual([
      "meshes[0].primitives[1] is points or lines: passed over",
      "meshes[0].primitives[2] is points or lines: passed over",
    ]);
  });

  it("a morph target counts by its weight, the node's before the mesh's", async () => {
    const grown = (json: { meshes: { primitives: { targets?: object[] }[]; weights?: number[] }[] }) => {
      json.meshes[0].primitives[0].targets = [{ POSITION: 0 }];
      json.meshes[0].weights = [1];
    };
    // Each vertex moved by itself: twice the size, eight times the volume; at weight 2, 27 times.
    expect(volume((await read(grown)).surfaces)).toBeCloseTo(8 * HELD, 14);
    const heavier = await read((json) => {
      grown(json);
      json.nodes[0].weights = [2];
    });
    expect(volume(heavier.surfaces)).toBeCloseTo(27 * HELD, 14);
  });

  it("a scene without nodes' names and materials has empty ones, and only the default scene counts", async () => {
    const { surfaces } = await read((json) => {
      json.materials = [{ name: "steel" }, {}];
      json.nodes = [{ mesh: 0 }, { name: "handle", mesh: 1 }, { name: "elsewhere", mesh: 0 }];
      json.meshes.push(structuredClone(json.meshes[0]));
      json.meshes[1].primitives[0].material = 0;
      json.scenes = [{ nodes: [2] }, { nodes: [0, 1] }];
      json.scene = 1;
    });
    expect(surfaces.map(({ nodeName, materialName }) => [nodeName, materialName])).toEqual([
      ["", ""],
      ["handle", "steel"],
    ]);
  });

  it("interleaved vertices may end with the last one's bytes (glTF 2.0, 3.6.2.4)", async () => {
    const { surfaces } = await read((json) => {
      // Every second vertex of the tetrahedron, and no room for a whole stride after the second.
      json.accessors[0] = { bufferView: 0, componentType: 5126, count: 2, type: "VEC3" };
      json.bufferViews[0] = { buffer: 0, byteLength: 36, byteStride: 24 };
      json.accessors[1] = { bufferView: 2, componentType: 5126, count: 3, type: "VEC3" };
      json.bufferViews.push({ buffer: 0, byteLength: 36 });
      json.meshes[0].primitives = [{ attributes: { POSITION: 1 } }, { attributes: { POSITION: 0 } }];
    });
    expect(surfaces).toHaveLength(1);
  });

  it("vertices that no triangle uses are left out", async () => {
    const { surfaces } = await read((json) => {
      json.accessors[1].count = 3;
    });
    expect(surfaces[0].positions).toHaveLength(9);
  });

  it("a sparse part without an offset starts at its view's start, whatever the accessor's offset", async () => {
    const { surfaces } = await read((json) => {
      json.accessors[0] = {
        bufferView: 2,
        byteOffset: 12,
        componentType: 5126,
        count: 3,
        type: "VEC3",
        sparse: { count: 1, indices: { bufferView: 1, componentType: 5123 }, values: { bufferView: 0 } },
      };
      json.bufferViews.push({ buffer: 0, byteLength: 48 });
      json.meshes[0].primitives[0] = { attributes: { POSITION: 0 } };
    });
    // Vertex 0 (the first number in the view of indices) becomes the first vertex of the tetrahedron: the origin.
    expect([...surfaces[0].positions]).toEqual([0, 0, 0, 0, 0.75, 0, 0, 0, 1]);
  });
});

describe("nodeFrame", () => {
  // biome-ignore lint/suspicious/noExplicitAny: JSON changed freely
  const model = (change: (json: any) => void) => readModel("m", tetrahedron(change));

  it("is the node's place and axes in the scene, without its scale", async () => {
    const found = nodeFrame(
      await model((json) => {
        // A quarter turn about y, twice the size, at (1, 2, 3); in it a socket 1 along z, a quarter turn about x.
        json.nodes = [
          {
            children: [1],
            translation: [1, 2, 3],
            rotation: [0, Math.SQRT1_2, 0, Math.SQRT1_2],
            scale: [2, 2, 2],
          },
          { name: "socket", translation: [0, 0, 1], rotation: [Math.SQRT1_2, 0, 0, Math.SQRT1_2] },
        ];
      }),
      "socket",
    )!;
    // By hand: z of the outer node points along the scene's x; the product of the two quarter turns is (½, ½, -½, ½).
    [3, 2, 3].forEach((value, i) => {
      expect(found.position[i]).toBeCloseTo(value, 14);
    });
    [0.5, 0.5, -0.5, 0.5].forEach((value, i) => {
      expect(found.rotation[i]).toBeCloseTo(value, 14);
    });
  });

  it("of a mirrored node is a rotation all the same, its x turned round", async () => {
    const found = nodeFrame(
      await model((json) => {
        json.nodes[0].scale = [-1, 1, 1];
      }),
      "solid",
    )!;
    expect(found.rotation.map(Math.abs)).toEqual([0, 0, 0, 1]);
  });

  it("knows only the default scene, and refuses what is ambiguous or flat", async () => {
    expect(nodeFrame(await model(() => {}), "nobody")).toBeUndefined();
    const twice = await model((json) => {
      json.nodes[0].children = [1];
      json.nodes.push({ name: "solid" });
    });
    expect(() => nodeFrame(twice, "solid")).toThrow('2 nodes are named "solid"');
    const flat = await model((json) => {
      json.nodes[0].scale = [0, 1, 1];
    });
    expect(() => nodeFrame(flat, "solid")).toThrow("scaled to nothing");
  });
});

function corners({ positions, triangles }: Surface): number[][] {
  return [...triangles].map((i) => [...positions.subarray(3 * i, 3 * i + 3)]);
}
