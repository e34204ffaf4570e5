import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { splitGlb } from "../../src/gltf/glb.js";
import { ModelError } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { readSurfaces } from "../../src/gltf/surfaces.js";
import { bytesOf, FACES, glbOf, TETRAHEDRON, tetrahedron } from "./models.js";
import { volume } from "./volume.js";

// A tetrahedron on three edges at right angles holds a sixth of their product.
const HELD = (0.5 * 0.75 * 1) / 6;

// biome-ignore lint/suspicious/noExplicitAny: JSON changed freely
type Change = (json: any) => void;
const read = async (change: Change) => readSurfaces(await readModel("m", tetrahedron(change)));

/** The tetrahedron three times: moved, turned by normalised bytes, and scaled. */
// biome-ignore lint/suspicious/noExplicitAny: JSON changed freely
function instanced(change: (json: any, attributes: any) => void = () => {}): Uint8Array {
  const translations = new Float32Array([0, 0, 0, 10, 0, 0, 0, 20, 0]);
  // A half turn about y is (0, 1, 0, 0): 127 is 1 in a normalised byte (glTF 2.0, 3.11).
  const rotations = new Uint8Array([0, 0, 0, 127, 0, 127, 0, 0, 0, 0, 0, 127]);
  const scales = new Float32Array([1, 1, 1, 1, 1, 1, 2, 2, -2]);
  let glb = new Uint8Array();
  tetrahedron((json) => {
    json.bufferViews.push(
      { buffer: 0, byteOffset: 72, byteLength: 36 },
      { buffer: 0, byteOffset: 108, byteLength: 12 },
      { buffer: 0, byteOffset: 120, byteLength: 36 },
    );
    json.accessors.push(
      { bufferView: 2, componentType: 5126, count: 3, type: "VEC3" },
      { bufferView: 3, componentType: 5120, normalized: true, count: 3, type: "VEC4" },
      { bufferView: 4, componentType: 5126, count: 3, type: "VEC3" },
    );
    json.buffers[0].byteLength = 156;
    const attributes = { TRANSLATION: 2, ROTATION: 3, SCALE: 4, _ID: 99 };
    json.nodes[0].extensions = { EXT_mesh_gpu_instancing: { attributes } };
    json.nodes[0].translation = [100, 0, 0];
    json.extensionsRequired = ["EXT_mesh_gpu_instancing"];
    change(json, attributes);
    glb = new Uint8Array(glbOf(json, bytesOf(TETRAHEDRON, FACES, translations, rotations, scales)));
  });
  return glb;
}

describe("EXT_mesh_gpu_instancing", () => {
  const readInstanced = async (...change: Parameters<typeof instanced>) =>
    readSurfaces(await readModel("m", instanced(...change)));

  it("shows the mesh once for each instance, within the node", async () => {
    const { surfaces, warnings } = await readInstanced();
    expect(warnings).toEqual([]);
    // By hand: the tip (0, 0, 1) of each, node translation 100 + instance translation + turned and scaled tip.
    const tips = surfaces.map(({ positions }) => [...positions.subarray(9, 12)]);
    expect(tips).toEqual([
      [100, 0, 1],
      [110, 0, -1],
      [100, 20, -2],
    ]);
    // The third is twice as large and mirrored, its winding turned back.
    expect(surfaces.map((surface) => volume([surface]) / HELD)).toEqual([
      expect.closeTo(1, 12),
      expect.closeTo(1, 12),
      expect.closeTo(8, 12),
    ]);
  });

  it("takes what is not stated as of a node without it", async () => {
    const { surfaces } = await readInstanced((_, attributes) => {
      attributes.ROTATION = undefined;
      attributes.SCALE = undefined;
    });
    expect(volume(surfaces)).toBeCloseTo(3 * HELD, 13);
    const single = await readInstanced((json) => {
      json.nodes[0].extensions.EXT_mesh_gpu_instancing.attributes = {};
    });
    expect(volume(single.surfaces)).toBeCloseTo(HELD, 13);
  });

  it.each<[string, Parameters<typeof instanced>[0], string]>([
    ["an accessor that is none", (_, a) => (a.SCALE = 7), "SCALE is 7; it must be the index"],
    ["an accessor of another type", (_, a) => (a.ROTATION = 2), "ROTATION has the type VEC3"],
    ["unequal counts", (json) => (json.accessors[4].count = 2), "SCALE has 2 entries; another has 3"],
  ])("with %s is refused", async (_, change, message) => {
    await expect(readInstanced(change)).rejects.toThrow(ModelError);
    await expect(readInstanced(change)).rejects.toThrow(message);
  });

  it("of a skinned mesh, which stands where its joints are, are one, and said", async () => {
    const { json, binary } = splitGlb(
      "m",
      readFileSync(new URL("../data/props/skin_bind_pose.glb", import.meta.url)),
    );
    const changed = JSON.parse(new TextDecoder().decode(json));
    const TRANSLATION = changed.accessors.push({ componentType: 5126, count: 3, type: "VEC3" }) - 1;
    for (const node of changed.nodes)
      if (node.skin !== undefined)
        Object.assign(node, {
          name: "arm",
          extensions: { EXT_mesh_gpu_instancing: { attributes: { TRANSLATION } } },
        });
    const { surfaces, warnings } = await readSurfaces(await readModel("m", glbOf(changed, binary)));
    // Volume: test/data/props.json.
    expect(volume(surfaces) / 0.0390625).toBeCloseTo(1, 12);
    expect(warnings).toEqual([
      'the node "arm" is skinned and has instances (EXT_mesh_gpu_instancing): read as one',
    ]);
  });

  it("of a node with a skin whose mesh has no joints are counted", async () => {
    const { surfaces, warnings } = await readInstanced((json) => {
      json.nodes.push({ name: "joint" });
      json.skins = [{ joints: [1] }];
      json.nodes[0].skin = 0;
    });
    expect(surfaces).toHaveLength(3);
    expect(warnings).toEqual([]);
  });

  it("so many that they would fill the memory are refused", async () => {
    const many = readInstanced((json, attributes) => {
      // Zeros made from nothing.
      json.accessors[2] = { componentType: 5126, count: 1_000_000, type: "VEC3" };
      attributes.ROTATION = undefined;
      attributes.SCALE = undefined;
    });
    await expect(many).rejects.toThrow("its scene shows too much");
  });
});

describe("MSFT_lod", () => {
  const levels: Change = (json) => {
    json.nodes[0].extensions = { MSFT_lod: { ids: [1, 2] } };
    json.nodes.push({ name: "lower", children: [3] }, { name: "lowest", mesh: 0 }, { mesh: 0 });
  };

  it("counts the highest level alone, wherever the others stand", async () => {
    for (const roots of [[0], [0, 1, 2]]) {
      const { surfaces, warnings } = await read((json) => {
        levels(json);
        json.scenes[0].nodes = roots;
      });
      expect(surfaces.map(({ nodeName }) => nodeName)).toEqual(["solid"]);
      expect(warnings).toEqual([]);
    }
  });

  it("with a level that is no node is refused", async () => {
    const wrong = read((json) => {
      levels(json);
      json.nodes[0].extensions.MSFT_lod.ids = [9];
    });
    await expect(wrong).rejects.toThrow("nodes[0].extensions.MSFT_lod.ids[0] is 9");
  });
});

describe("KHR_node_visibility", () => {
  const hidden =
    (visible: unknown): Change =>
    (json) => {
      json.nodes.push(
        { name: "helper", children: [2], extensions: { KHR_node_visibility: { visible } } },
        { mesh: 0 },
      );
      json.scenes[0].nodes = [0, 1];
    };

  it("hidden nodes are left out with all below them, and said", async () => {
    const { surfaces, warnings } = await read(hidden(false));
    expect(surfaces).toHaveLength(1);
    expect(warnings).toEqual(['the node "helper" is hidden (KHR_node_visibility): left out']);
  });

  it("shown nodes count, which is the default", async () => {
    for (const visible of [true, undefined]) expect((await read(hidden(visible))).surfaces).toHaveLength(2);
    await expect(read(hidden("no"))).rejects.toThrow('visible is "no"; it must be true or false');
  });
});
