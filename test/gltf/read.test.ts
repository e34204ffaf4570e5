import { readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { ModelError } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { spliceGlb } from "../../src/gltf/splice.js";
import { readSurfaces } from "../../src/gltf/surfaces.js";
import { bytesDataUri } from "../../src/gltf/uri.js";
import { bytesOf, FACES, glbOf, graft, TETRAHEDRON, tetrahedron } from "./models.js";

const bad = new URL("../data/props/bad/", import.meta.url);
const gltf = (json: unknown) => new TextEncoder().encode(JSON.stringify(json));
const asset = { version: "2.0" };

async function complaint(bytes: Uint8Array): Promise<string> {
  try {
    await readSurfaces(await readModel("prop.glb", bytes, async () => new Uint8Array(72)));
  } catch (error) {
    expect(error).toBeInstanceOf(ModelError);
    return (error as ModelError).message;
  }
  return "nothing";
}

describe("files that must be refused", () => {
  // The files and why: the reference set they come from.
  it.each([
    ["declared_4gb.glb", "the header states 4294967295 bytes and the file has 760"],
    ["index_out_of_range.glb", "meshes[0].primitives[0] uses vertex 9; it has 4 vertices"],
    ["missing_buffer.gltf", 'the file "nowhere.bin" (buffers[0].uri) cannot be read: no such file'],
    ["nan_positions.glb", "meshes[0].primitives[0] has a position that is NaN (vertex 2)"],
    ["node_cycle.glb", "node 1 is its own ancestor"],
    ["not_gltf.glb", "its JSON is not UTF-8"],
    ["path_traversal.gltf", 'buffers[0].uri "../../outside.bin" leads to a parent folder'],
    ["remote_uri.gltf", 'buffers[0].uri "http://127.0.0.1:9/x.bin" has a scheme'],
    ["truncated.glb", "the header states 760 bytes and the file has 720"],
  ])("%s: %s", async (file, fault) => {
    const asked: string[] = [];
    const reading = readModel(file, readFileSync(new URL(file, bad)), async (path) => {
      asked.push(path);
      throw new Error("no such file");
    }).then(readSurfaces);
    await expect(reading).rejects.toThrow(ModelError);
    await expect(reading).rejects.toThrow(`${file}: ${fault}`);
    expect(asked).toEqual(file === "missing_buffer.gltf" ? ["nowhere.bin"] : []);
  });
});

describe("the container", () => {
  const good = tetrahedron();
  const changed = (at: number, word: number) => {
    const bytes = good.slice();
    new DataView(bytes.buffer).setUint32(at, word, true);
    return bytes;
  };

  // Places of the fields: glTF 2.0, 4.4.
  it.each([
    ["version 1", changed(4, 1), "the GLB version is 1"],
    ["a length too small", changed(8, 100), "the header states 100 bytes"],
    ["a JSON chunk of 4 GB", changed(12, 0xffffffff), "the chunk at byte 12 runs past the end"],
    ["a JSON chunk as long as the file", changed(12, good.length), "the chunk at byte 12 runs past the end"],
    ["a first chunk of another type", changed(16, 0x12345678), "the first chunk is of type 0x12345678"],
    ["a header alone", good.slice(0, 12), "the file ends after 12 bytes"],
    ["nothing", new Uint8Array(), "it is not JSON"],
    ["three bytes", good.slice(0, 3), "it is not JSON"],
    ["a JSON chunk that is no JSON", glbOf('{"asset":'), "it is not JSON"],
    ["a list", gltf([]), "its JSON is not an object"],
    ["bytes that are not UTF-8", glbOf('{"a":"').fill(0xff, 24), "its JSON is not UTF-8"],
    ["a key twice", glbOf('{"asset":{"version":"2.0"},"nodes":[],"nodes":[]}'), 'the key "nodes" twice'],
    [
      "200,000 nested lists",
      glbOf(`{"asset":{"extras":${"[".repeat(2e5)}${"]".repeat(2e5)}}}`),
      "nested more than 200 deep",
    ],
    [
      "a million nodes of two bytes",
      glbOf(`{"asset":{"version":"2.0"},"nodes":[{}${",{}".repeat(1e6)}]}`),
      "its JSON holds more than 500000 values",
    ],
    ["no BIN chunk", glbOf({ asset, buffers: [{ byteLength: 4 }] }), "the file has no BIN chunk for it"],
    [
      "a BIN chunk too short",
      glbOf({ asset, buffers: [{ byteLength: 8 }] }, new Uint8Array(4)),
      "there are only 4 bytes of it",
    ],
  ])("with %s is refused", async (_, bytes, fault) => {
    expect(await complaint(bytes)).toContain(fault);
  });

  it("is read at any place within its memory", async () => {
    const shifted = new Uint8Array(good.length + 3);
    shifted.set(good, 3);
    const { surfaces } = await readSurfaces(await readModel("m", shifted.subarray(3)));
    expect(surfaces[0].positions).toHaveLength(12);
  });
});

describe("a file a model may not name", () => {
  it.each([
    ["../x.bin", "parent folder"],
    ["a/../../x.bin", "parent folder"],
    ["%2e%2e/x.bin", "parent folder"],
    ["a%2F..%2F..%2Fx.bin", "parent folder"],
    ["..\\x.bin", "backslash"],
    ["..%5Cx.bin", "backslash"],
    ["/etc/x.bin", "absolute"],
    ["%2Fetc/x.bin", "absolute"],
    ["//host/x.bin", "absolute"],
    ["file:///x.bin", "scheme"],
    ["FILE:x.bin", "scheme"],
    ["C:/x.bin", "scheme"],
    ["https://host/x.bin", "scheme"],
    ["javascript:1", "scheme"],
    ["h%74tp://host/x.bin", "scheme"],
    ["x%00.bin", "control characters"],
    ["x\u0000.bin", "control characters"],
    ["%E0%A4%A.bin", "percent-encoded"],
    ["", "empty"],
  ])("%j (%s) is never asked for, as a buffer or an image", async (uri, why) => {
    const asked: string[] = [];
    for (const json of [
      {
        asset,
        buffers: [
          { byteLength: 4, uri: "fine.bin" },
          { byteLength: 4, uri },
        ],
      },
      { asset, images: [{ uri: "fine.png" }, { uri }] },
    ]) {
      const reading = readModel("m.gltf", gltf(json), async (path) => {
        asked.push(path);
        return new Uint8Array(4);
      });
      await expect(reading).rejects.toThrow(ModelError);
      await expect(reading).rejects.toThrow(why);
    }
    expect(asked).toEqual([]);
  });

  it("is any, where there is nothing to read files with", async () => {
    const reading = readModel("m.gltf", gltf({ asset, buffers: [{ byteLength: 4, uri: "a.bin" }] }));
    await expect(reading).rejects.toThrow("use a .glb file");
  });

  it.each([
    ["data:,abc", "is not base64"],
    ["data:application/octet-stream;base64,####", "characters that are not base64"],
    ["data:application/octet-stream;base64,AAAA", "there are only 3 bytes of it"],
  ])("%s is no buffer of 4 bytes", async (uri, fault) => {
    expect(await complaint(gltf({ asset, buffers: [{ byteLength: 4, uri }] }))).toContain(fault);
  });

  it("may be part of the file itself, or in a folder below", async () => {
    const bytes = Uint8Array.from({ length: 20_000 }, (_, i) => i % 251);
    const json = {
      asset,
      buffers: [
        { byteLength: bytes.length, uri: bytesDataUri(bytes) },
        { byteLength: 72, uri: "parts/..bin" },
      ],
    };
    const { buffers } = await readModel("m.gltf", gltf(json), async () => new Uint8Array(72));
    expect(buffers[0]).toEqual(bytes);
    expect(buffers[1]).toHaveLength(72);
  });
});

describe("JSON that does not fit together", () => {
  // biome-ignore lint/suspicious/noExplicitAny: broken on purpose
  const cases: [(json: any) => void, string][] = [
    [(j) => delete j.asset, "it has no asset"],
    [(j) => (j.asset.version = "1.0"), 'asset.version is "1.0"; glTF 2.0 is read'],
    [(j) => (j.asset.minVersion = "2.1"), 'asset.minVersion is "2.1"'],
    [(j) => (j.scene = 1), "scene is 1; it must be the index of one of scenes, 0 to 0"],
    [(j) => (j.scene = -1), "scene is -1"],
    [(j) => (j.scene = 0.5), "scene is 0.5"],
    [(j) => (j.scene = "0"), 'scene is "0"'],
    [(j) => (j.scenes = {}), "scenes is an object; it must be a list"],
    [(j) => (j.scenes[0].nodes = [7]), "scenes[0].nodes[0] is 7"],
    [(j) => (j.scenes[0].nodes = [0, 0]), "scenes[0].nodes names a node twice"],
    [(j) => (j.nodes = [null]), "nodes[0] is null"],
    [(j) => (j.nodes[0].mesh = 1), "nodes[0].mesh is 1"],
    [(j) => (j.nodes[0].skin = 0), "nodes[0].skin is 0; the model has no skins"],
    [(j) => (j.nodes[0].children = [0]), "node 0 is its own ancestor"],
    [(j) => (j.nodes[0].children = [1.5]), "nodes[0].children[0] is 1.5"],
    [
      (j) => j.nodes.push({ children: [2] }, {}, { children: [2] }),
      "node 2 is a child of node 1 and of node 3",
    ],
    [(j) => j.nodes.push({ children: [0] }), "scenes[0].nodes has node 0; it must be a root"],
    [(j) => (j.nodes[0].translation = [1, 2]), "nodes[0].translation has 2 entries; it must have 3"],
    [(j) => (j.nodes[0].scale = [1, 2, null]), "nodes[0].scale[2] is null"],
    [(j) => (j.nodes[0].rotation = [0, 0, 0, 0]), "nodes[0].rotation has the length 0"],
    [(j) => (j.nodes[0].matrix = Array(16).fill(1)), "nodes[0].matrix has the last row 1,1,1,1"],
    [(j) => (j.meshes[0].primitives = []), "meshes[0] has no primitives"],
    [
      (j) => (j.meshes[0].primitives[0].attributes.POSITION = 2),
      "meshes[0].primitives[0].attributes.POSITION is 2",
    ],
    [(j) => (j.meshes[0].primitives[0].attributes.POSITION = 1), "POSITION has the type SCALAR"],
    [
      (j) => (j.meshes[0].primitives[0].attributes.NORMAL = 1),
      "attributes.NORMAL has 12 entries; there are 4 positions",
    ],
    [(j) => (j.meshes[0].primitives[0].indices = 0), "indices has the type VEC3 of 5126"],
    [(j) => (j.meshes[0].primitives[0].mode = 7), "mode is 7; it must be a whole number from 0 to 6"],
    [(j) => (j.meshes[0].primitives[0].material = 0), "material is 0; the model has no materials"],
    [(j) => (j.accessors[0].bufferView = 2), "accessors[0].bufferView is 2"],
    [(j) => (j.accessors[0].componentType = 5124), "accessors[0].componentType is 5124"],
    [(j) => (j.accessors[0].type = "VEC5"), 'accessors[0].type is "VEC5"'],
    [(j) => (j.accessors[0].count = 5), "accessors[0] needs 60 bytes (5 elements); bufferViews[0] has 48"],
    [(j) => (j.accessors[0].count = 0), "accessors[0].count is 0"],
    [(j) => (j.accessors[0].count = 1e300), "accessors[0].count is 1e+300"],
    [(j) => (j.accessors[0].byteOffset = 4), "accessors[0] needs 52 bytes"],
    [(j) => (j.accessors[0].byteOffset = -4), "accessors[0].byteOffset is -4"],
    [
      (j) => (j.accessors[0] = { componentType: 5126, count: 3.6e8, type: "VEC3" }),
      "count is 360000000 without a bufferView",
    ],
    [(j) => (j.bufferViews[0].byteStride = 8), "byteStride is 8; accessors[0] has elements of 12 bytes"],
    [(j) => (j.bufferViews[0].buffer = 1), "bufferViews[0].buffer is 1"],
    [(j) => (j.bufferViews[1].byteLength = 25), "bufferViews[1] ends at byte 73; buffers[0] has 72 bytes"],
    [(j) => (j.bufferViews[1].byteOffset = 2 ** 52), "bufferViews[1] ends at byte"],
    [
      (j) => (j.buffers[0].byteLength = 0xffffffff),
      "buffers[0].byteLength is 4294967295; there are only 72 bytes",
    ],
    [(j) => (j.accessors[0].sparse = { count: 5 }), "accessors[0].sparse.count is 5"],
    [
      (j) =>
        (j.accessors[0].sparse = {
          count: 4,
          indices: { bufferView: 1, byteOffset: 20, componentType: 5123 },
          values: { bufferView: 0 },
        }),
      "accessors[0].sparse.indices needs 28 bytes",
    ],
    [
      (j) =>
        (j.accessors[0].sparse = {
          count: 4,
          indices: { bufferView: 1, componentType: 5123 },
          values: { bufferView: 1 },
        }),
      "accessors[0].sparse.values needs 48 bytes",
    ],
    [
      // Vertex numbers 0, 2, 1, 0 as the index data has them: 2 is one too many for two vertices.
      (j) => {
        j.accessors[0].count = 2;
        j.accessors[0].sparse = {
          count: 2,
          indices: { bufferView: 1, componentType: 5123 },
          values: { bufferView: 0, byteOffset: 24 },
        };
      },
      "accessors[0].sparse changes element 2; it has 2",
    ],
    [(j) => (j.skins = [{ joints: [4] }]), "skins[0].joints[0] is 4"],
    [(j) => (j.skins = [{ joints: [] }]), "skins[0] has no joints"],
    [(j) => (j.skins = [{ joints: [0], inverseBindMatrices: 0 }]), "inverseBindMatrices has 4 of VEC3"],
    [
      (j) => (j.animations = [{ samplers: [{ input: 9, output: 0 }], channels: [] }]),
      "samplers[0].input is 9",
    ],
    [
      (j) => (j.animations = [{ samplers: [], channels: [{ sampler: 0, target: {} }] }]),
      "channels[0].sampler is 0",
    ],
    [
      (j) =>
        (j.animations = [
          { samplers: [{ input: 0, output: 0 }], channels: [{ sampler: 0, target: { node: 3 } }] },
        ]),
      "channels[0].target.node is 3",
    ],
    [(j) => (j.images = [{}]), "images[0].bufferView is missing"],
    [
      (j) => (j.extensionsRequired = ["EXT_unheard_of"]),
      "requires the extension EXT_unheard_of; that is not known here",
    ],
    [(j) => (j.extensionsRequired = "KHR"), 'extensionsRequired is "KHR"; it must be a list'],
  ];
  it.each(cases.map(([change, fault]) => ({ change, fault })))("$fault", async ({ change, fault }) => {
    expect(await complaint(tetrahedron(change))).toContain(fault);
  });

  it("a chain of 20,000 nodes is refused, one of 1,000 is read", async () => {
    const chain = (length: number) =>
      tetrahedron((json) => {
        const nodes = Array.from({ length }, (_, i) =>
          i + 1 < length ? { children: [i + 1] } : { mesh: 0 },
        );
        json.nodes = nodes;
      });
    expect(await complaint(chain(20_000))).toContain("lies more than 1000 deep");
    expect(await complaint(chain(1000))).toBe("nothing");
  });

  it("a mesh shown so often that it would fill the memory is refused", async () => {
    const bytes = tetrahedron((json) => {
      json.meshes[0].primitives = Array(2000).fill(json.meshes[0].primitives[0]);
      json.nodes = Array.from({ length: 2000 }, () => ({ mesh: 0 }));
      json.scenes[0].nodes = json.nodes.map((_: unknown, i: number) => i);
    });
    expect(await complaint(bytes)).toContain("its scene shows too much");
  });

  it("as many triangles as refused of a few bytes are read where the file really holds them", async () => {
    const corners = 1_800_000;
    const indices = Uint32Array.from({ length: corners }, (_, i) => [0, 2, 1, 0, 1, 3][i % 6]);
    const file = (held: boolean) => {
      let glb = new Uint8Array();
      tetrahedron((json) => {
        json.bufferViews[1].byteLength = 4 * corners;
        json.accessors[1] = {
          ...(held && { bufferView: 1 }),
          componentType: 5125,
          count: corners,
          type: "SCALAR",
        };
        json.buffers[0].byteLength = 48 + 4 * corners;
        if (!held) json.bufferViews.pop();
        if (!held) json.buffers[0].byteLength = 72;
        glb = new Uint8Array(glbOf(json, bytesOf(TETRAHEDRON, held ? indices : FACES)));
      });
      return glb;
    };
    expect(await complaint(file(true))).toBe("nothing");
    expect(await complaint(file(false))).toContain(
      "its scene shows too much; of a file of this size at most",
    );
  });

  it("appearance extensions, a zero scale and unknown optional extensions are no faults", async () => {
    const bytes = tetrahedron((json) => {
      json.nodes[0].scale = [1, 0, 1];
      json.extensionsUsed = ["KHR_texture_transform", "KHR_materials_unlit", "EXT_unheard_of"];
      json.extensionsRequired = ["KHR_texture_transform", "KHR_materials_unlit"];
    });
    expect(await complaint(bytes)).toBe("nothing");
  });
});

describe("whatever is damaged", () => {
  const survives = async (bytes: Uint8Array) => {
    try {
      const model = await readModel("m", bytes, async () => new Uint8Array(72));
      await readSurfaces(model);
      spliceGlb(model, graft());
    } catch (error) {
      if (!(error instanceof ModelError)) throw error;
    }
  };

  it("in a file's bytes, it is read or refused with a ModelError", async () => {
    const good = readFileSync(new URL("../skin_bind_pose.glb", bad));
    const change = fc.tuple(fc.nat(good.length - 1), fc.nat(255));
    await fc.assert(
      fc.asyncProperty(fc.array(change, { minLength: 1, maxLength: 4 }), async (changes) => {
        const bytes = new Uint8Array(good);
        for (const [at, value] of changes) bytes[at] = value;
        await survives(bytes);
      }),
      { seed: 1, numRuns: 1000 },
    );
  });

  it("in its JSON's values, it is read or refused with a ModelError", async () => {
    const good = readFileSync(new URL("../skin_bind_pose.glb", bad));
    const text = new TextDecoder().decode(good.subarray(20, 20 + good.readUInt32LE(12)));
    const values = [...text.matchAll(/(?<=[:[,] ?)(-?[\d.]+|"[^"]*"(?!:)|\{|\[)/g)];
    const wild = fc.constantFrom("null", "-1", "1e9", "0.5", "{}", "[]", '"x"', "1e400", "true", "3", "0");
    await fc.assert(
      fc.asyncProperty(fc.nat(values.length - 1), wild, async (which, value) => {
        const { index, 0: old } = values[which];
        const opens = old === "{" || old === "[";
        // A list or object is renamed away rather than cut, so that the text stays JSON.
        const changed = opens
          ? `${text.slice(0, index)}${old === "{" ? '{"x":1,' : "[null,"}${text.slice(index + 1)}`
          : text.slice(0, index) + value + text.slice(index + old.length);
        await survives(glbOf(changed, good.subarray(28 + text.length)));
      }),
      { seed: 2, numRuns: 1000 },
    );
  });

  it("a sound model comes through both", async () => {
    const glb = glbOf({ asset, buffers: [{ byteLength: 72 }] }, bytesOf(TETRAHEDRON, FACES));
    await survives(glb);
    expect(await complaint(glb)).toBe("nothing");
  });
});
