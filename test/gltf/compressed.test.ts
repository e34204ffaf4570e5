import { readFileSync } from "node:fs";
import fc from "fast-check";
import { MeshoptEncoder } from "meshoptimizer/encoder";
import { describe, expect, it } from "vitest";
import { splitGlb } from "../../src/gltf/glb.js";
import { ModelError } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { spliceGlb } from "../../src/gltf/splice.js";
import { readSurfaces } from "../../src/gltf/surfaces.js";
import { DECODERS } from "../../src/node/draco.js";
import { dracoGlb, lossyMeshoptGlb, meshoptGlb, open } from "./compressed.js";
import { bytesOf, FACES, glbOf, graft, TETRAHEDRON, tetrahedron } from "./models.js";
import { volume } from "./volume.js";

const file = (name: string) =>
  new Uint8Array(readFileSync(new URL(`../data/props/${name}.glb`, import.meta.url)));
const read = (glb: Uint8Array) => readModel("m.glb", glb, undefined, DECODERS);
const volumeOf = async (glb: Uint8Array) => volume((await readSurfaces(await read(glb))).surfaces);

/** The same model with its JSON changed. */
// biome-ignore lint/suspicious/noExplicitAny: JSON changed freely
function changed(glb: Uint8Array, change: (json: any) => void): Uint8Array {
  const { json, binary } = splitGlb("m", glb);
  const parsed = JSON.parse(new TextDecoder().decode(json));
  change(parsed);
  return glbOf(parsed, binary);
}

async function complaint(glb: Uint8Array): Promise<string> {
  try {
    await readSurfaces(await read(glb));
  } catch (error) {
    expect(error).toBeInstanceOf(ModelError);
    return (error as ModelError).message;
  }
  return "nothing";
}

describe("EXT_meshopt_compression", () => {
  it.each(["club", "ellipsoid", "quantised_i16", "skin_bind_pose", "cavity"])(
    "%s holds the same, packed",
    async (name) => {
      const packed = await meshoptGlb(await open(file(name)));
      expect(new TextDecoder().decode(packed)).toContain("EXT_meshopt_compression");
      // Attributes and indices are kept to the bit (the extension's specification: only filters lose anything).
      expect(Math.abs((await volumeOf(packed)) / (await volumeOf(file(name))) - 1)).toBeLessThan(1e-14);
    },
  );

  it.each(["spanner", "token"])(
    "%s, whose normals stay packed in a buffer without content, too",
    async (name) => {
      const glb = new Uint8Array(readFileSync(new URL(`../../assets/props/${name}.glb`, import.meta.url)));
      const packed = await meshoptGlb(await open(glb));
      expect(Math.abs((await volumeOf(packed)) / (await volumeOf(glb)) - 1)).toBeLessThan(1e-14);
    },
  );

  // Volume and area: test/data/props.json. 14 bits of an extent of 0.5 m at most, rounded to the nearest step.
  it("club, quantised and filtered, holds the same within its rounding", async () => {
    const packed = await lossyMeshoptGlb(await open(file("club")));
    expect(new TextDecoder().decode(packed)).toMatch(
      /KHR_mesh_quantization.*EXT_meshopt_compression|EXT_meshopt_compression.*KHR_mesh_quantization/s,
    );
    const moved = (Math.sqrt(3) / 2) * (0.5 / (2 ** 14 - 1));
    expect(Math.abs((await volumeOf(packed)) - 0.0015235177307995546)).toBeLessThan(
      0.11031648059097822 * moved,
    );
  });

  it("undoes a filter, and reads plain sequences of indices", async () => {
    // Halves and quarters have few digits: they come through the exponential filter exactly.
    const filtered = MeshoptEncoder.encodeFilterExp(TETRAHEDRON, 4, 12, 15);
    const positions = MeshoptEncoder.encodeVertexBuffer(filtered, 4, 12);
    const indices = MeshoptEncoder.encodeIndexSequence(bytesOf(FACES), 12, 2);
    const how = {
      buffer: 0,
      byteOffset: 0,
      byteLength: positions.length,
      byteStride: 12,
      count: 4,
      mode: "ATTRIBUTES",
      filter: "EXPONENTIAL",
    };
    const sequence = {
      buffer: 0,
      byteOffset: positions.length,
      byteLength: indices.length,
      byteStride: 2,
      count: 12,
      mode: "INDICES",
    };
    let glb = new Uint8Array();
    tetrahedron((json) => {
      json.bufferViews[0] = {
        buffer: 1,
        byteLength: 48,
        byteStride: 12,
        extensions: { EXT_meshopt_compression: how },
      };
      json.bufferViews[1] = {
        buffer: 1,
        byteOffset: 48,
        byteLength: 24,
        extensions: { EXT_meshopt_compression: sequence },
      };
      json.buffers = [
        { byteLength: positions.length + indices.length },
        { byteLength: 72, extensions: { EXT_meshopt_compression: { fallback: true } } },
      ];
      glb = new Uint8Array(glbOf(json, bytesOf(positions, indices)));
    });
    // A sixth of the product of its three edges.
    expect(await volumeOf(glb)).toBe((0.5 * 0.75 * 1) / 6);
  });

  it("whose first buffer has no content takes no clips: a GLB's first buffer has one", async () => {
    const model = await readModel(
      "m.gltf",
      new TextEncoder().encode(
        JSON.stringify({
          asset: { version: "2.0" },
          buffers: [{ byteLength: 4, extensions: { EXT_meshopt_compression: { fallback: true } } }],
        }),
      ),
    );
    expect(() => spliceGlb(model, graft())).toThrow("buffers[0] only keeps the place of compressed data");
  });

  it("is read under its successor's name too", async () => {
    const renamed = changed(file("meshopt_lossless"), (json) => {
      const text = JSON.stringify(json).replaceAll("EXT_meshopt", "KHR_meshopt");
      Object.assign(json, JSON.parse(text));
    });
    expect(await volumeOf(renamed)).toBe(await volumeOf(file("meshopt_lossless")));
  });

  it("leaves the compressed bytes as they are when clips go in", async () => {
    const packed = file("meshopt_lossless");
    const spliced = spliceGlb(await read(packed), graft());
    const before = splitGlb("m", packed).binary!;
    const after = splitGlb("m", spliced).binary!;
    expect(after.subarray(0, before.length)).toEqual(before);
    expect(await volumeOf(spliced)).toBe(await volumeOf(packed));
  });

  // The extension's specification, "Specifying compressed views".
  // biome-ignore lint/suspicious/noExplicitAny: JSON changed freely
  const faults: [string, (view: any, json: any) => void, string][] = [
    ["a mode unknown", (v) => (v.mode = "POINTS"), 'mode is "POINTS"'],
    ["a filter unknown", (v) => (v.filter = "constructor"), 'filter is "constructor"'],
    ["a filter of another size", (v) => (v.filter = "QUATERNION"), "filter is QUATERNION; it does not go"],
    ["a stride that is no multiple of 4", (v) => (v.byteStride = 13), "byteStride is 13"],
    ["a stride of 4 GB", (v) => (v.byteStride = 2 ** 32), "byteStride is 4294967296"],
    ["another count", (v) => (v.count = 4609), "has 4609 elements"],
    [
      "triangles with two corners",
      (_, json) => {
        json.bufferViews[1].extensions.EXT_meshopt_compression.count -= 1;
      },
      "count is 27647; triangles have three corners each",
    ],
    ["a range beyond its buffer", (v) => (v.byteLength = 60_000), "ends at byte 60000"],
    ["a buffer without content", (v) => (v.buffer = 1), "buffer is 1; that buffer has no content"],
    [
      "4 GB stated",
      (v, json) => {
        v.count = 2 ** 32 / 12;
        v.count -= v.count % 4;
        json.bufferViews[0].byteLength = 12 * v.count;
        json.bufferViews[1].byteOffset = 0;
        json.buffers[1].byteLength = 12 * v.count;
      },
      "at most 134217728 are read",
    ],
    [
      "a plain view of what has no content",
      (_, json) => delete json.bufferViews[0].extensions,
      "bufferViews[0] is in buffers[1]; only compressed views may",
    ],
    ["data of another kind", (v) => (v.byteOffset = 7), "of bufferViews[0] cannot be decoded"],
  ];
  it.each(faults)("with %s is refused", async (_, fault, message) => {
    const glb = changed(file("meshopt_lossless"), (json) => {
      fault(json.bufferViews[0].extensions.EXT_meshopt_compression, json);
    });
    expect(await complaint(glb)).toContain(message);
  });
});

describe("KHR_draco_mesh_compression", () => {
  // Volumes and areas: test/data/props.json. Rounding to b bits moves a coordinate by half a step of extent/(2^b − 1), a point by √3
  // times that, and so changes the volume by the area times that at most, to first order.
  it.each([
    ["club", "EDGEBREAKER", 0.0015235177307995546, 0.11031648059097822, 0.5],
    ["club", "SEQUENTIAL", 0.0015235177307995546, 0.11031648059097822, 0.5],
    ["ellipsoid", "EDGEBREAKER", 0.025078433912027, 0.4882363407966409, 0.6],
    ["ellipsoid", "SEQUENTIAL", 0.025078433912027, 0.4882363407966409, 0.6],
  ] as const)("%s, %s, holds the same within its rounding", async (name, method, held, area, extent) => {
    for (const bits of [16, 11]) {
      const packed = await dracoGlb(await open(file(name)), method, bits);
      expect(new TextDecoder().decode(packed)).toContain("KHR_draco_mesh_compression");
      const moved = (Math.sqrt(3) / 2) * (extent / (2 ** bits - 1));
      expect(Math.abs((await volumeOf(packed)) - held)).toBeLessThan(1.001 * area * moved);
    }
  });

  it("holds integers, normalised or not", async () => {
    const packed = await dracoGlb(await open(file("quantised_i16")), "SEQUENTIAL", 16);
    expect(new TextDecoder().decode(packed)).toContain("KHR_draco_mesh_compression");
    // Volume: test/data/props.json. Integers are kept.
    expect((await volumeOf(packed)) / 0.0625).toBeCloseTo(1, 12);
    const normalised = changed(packed, (json) => {
      json.accessors[json.meshes[0].primitives[0].attributes.POSITION].normalized = true;
    });
    // 32767 is 1 (glTF 2.0, 3.11).
    expect(((await volumeOf(normalised)) * 32767 ** 3) / 0.0625).toBeCloseTo(1, 12);
  });

  it("holds joints and weights", async () => {
    const packed = await dracoGlb(await open(file("skin_bind_pose")), "SEQUENTIAL", 16);
    expect(new TextDecoder().decode(packed)).toMatch(/"KHR_draco[^}]*"JOINTS_0"/);
    // Volume: test/data/props.json; 16 bits leave some 1e-5 of it.
    expect((await volumeOf(packed)) / 0.0390625).toBeCloseTo(1, 4);
  });

  it("leaves the compressed bytes as they are when clips go in", async () => {
    const packed = await dracoGlb(await open(file("club")), "EDGEBREAKER", 14);
    const spliced = spliceGlb(await read(packed), graft());
    const before = splitGlb("m", packed).binary!;
    expect(splitGlb("m", spliced).binary!.subarray(0, before.length)).toEqual(before);
    expect(await volumeOf(spliced)).toBe(await volumeOf(packed));
  });

  it("is refused without a decoder, with what to hand over", async () => {
    const model = await readModel("m.glb", await dracoGlb(await open(file("club")), "EDGEBREAKER", 14));
    await expect(readSurfaces(model)).rejects.toThrow(/no decoder was handed over; .*createDecoderModule/);
  });

  // biome-ignore lint/suspicious/noExplicitAny: JSON changed freely
  const faults: [string, (draco: any, json: any) => void, string][] = [
    ["an attribute it has not", (d) => (d.attributes.POSITION = 5), "it has no VEC3 numbered 5 for POSITION"],
    ["an attribute the primitive has not", (d) => (d.attributes.COLOR_0 = 0), "has COLOR_0"],
    ["a view that is none", (d) => (d.bufferView = 9), "bufferView is 9"],
    ["data cut off", (d, json) => (json.bufferViews[d.bufferView].byteLength = 100), "cannot be decoded"],
  ];
  it.each(faults)("with %s is refused", async (_, fault, message) => {
    const packed = await dracoGlb(await open(file("club")), "EDGEBREAKER", 14);
    const glb = changed(packed, (json) => {
      fault(json.meshes[0].primitives[0].extensions.KHR_draco_mesh_compression, json);
    });
    expect(await complaint(glb)).toContain(message);
  });
});

describe("damaged compressed data", async () => {
  const packed = {
    EXT_meshopt_compression: file("meshopt_lossless"),
    "KHR_draco_mesh_compression, edgebreaker": await dracoGlb(await open(file("club")), "EDGEBREAKER", 14),
    "KHR_draco_mesh_compression, sequential": await dracoGlb(await open(file("club")), "SEQUENTIAL", 14),
  };
  it.each(Object.entries(packed))("%s: read or refused with a ModelError", async (_, glb) => {
    const { binary } = splitGlb("m", glb);
    const start = binary!.byteOffset - glb.byteOffset;
    const damage = fc.record({
      at: fc.double({ min: 0, max: 1, noNaN: true }),
      head: fc.boolean(),
      byte: fc.nat(255),
    });
    let refused = 0;
    await fc.assert(
      fc.asyncProperty(fc.array(damage, { minLength: 1, maxLength: 4 }), async (damages) => {
        const broken = glb.slice();
        // Heads, where the counts are, more often than chance would.
        for (const { at, head, byte } of damages)
          broken[start + Math.floor(at * ((head ? 40 : binary!.length) - 1))] = byte;
        if ((await complaint(broken)) !== "nothing") refused++;
      }),
      { seed: 4, numRuns: 150 },
    );
    expect(refused).toBeGreaterThan(20);
  });
});
