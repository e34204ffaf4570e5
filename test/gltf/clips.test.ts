import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type ReadClip, readClips } from "../../src/gltf/clips.js";
import { ModelError } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { lossyMeshoptGlb, open } from "./compressed.js";
import { bytesOf, FACES, glbOf, TETRAHEDRON, tetrahedron } from "./models.js";
import { OWN_BYTES, OWN_TEXT } from "./own.js";

/** A tetrahedron that a clip slides from 0 to (1, 2, 3) in a second; `change` breaks it. */
// biome-ignore lint/suspicious/noExplicitAny: the tests break it in every way that types would forbid
function sliding(change: (json: any) => void = () => {}, keys = [0, 1], values = [0, 0, 0, 1, 2, 3]) {
  const json = {
    asset: { version: "2.0" },
    scenes: [{ nodes: [0] }],
    nodes: [{ name: "solid", mesh: 0 }],
    meshes: [{ primitives: [{ attributes: { POSITION: 0 }, indices: 1 }] }],
    animations: [
      {
        name: "slide",
        channels: [{ sampler: 0, target: { node: 0, path: "translation" } }],
        samplers: [{ input: 2, output: 3 }],
      },
    ],
    accessors: [
      { bufferView: 0, componentType: 5126, count: 4, type: "VEC3" },
      { bufferView: 1, componentType: 5123, count: 12, type: "SCALAR" },
      { bufferView: 2, componentType: 5126, count: keys.length, type: "SCALAR" },
      { bufferView: 3, componentType: 5126, count: Math.floor(values.length / 3), type: "VEC3" },
    ],
    bufferViews: [
      { buffer: 0, byteLength: 48 },
      { buffer: 0, byteOffset: 48, byteLength: 24 },
      { buffer: 0, byteOffset: 72, byteLength: 4 * keys.length },
      { buffer: 0, byteOffset: 72 + 4 * keys.length, byteLength: 4 * values.length },
    ],
    buffers: [{ byteLength: 72 + 4 * (keys.length + values.length) }],
  };
  change(json);
  const bytes = bytesOf(TETRAHEDRON, FACES, new Float32Array(keys), new Float32Array(values));
  return glbOf(json, bytes);
}

const clipsOf = async (glb: Uint8Array): Promise<ReadClip[]> => readClips(await readModel("s.glb", glb));

/** The message of a model that is refused. */
async function refusal(glb: Uint8Array): Promise<string> {
  try {
    await clipsOf(glb);
  } catch (error) {
    if (error instanceof ModelError) return error.message;
    throw error;
  }
  return "it is read";
}

describe("the animations of a model", () => {
  it("are read with their names, times and values", async () => {
    expect(await clipsOf(sliding())).toEqual([
      {
        name: "slide",
        channels: [
          {
            ...{ node: 0, path: "translation", interpolation: "LINEAR" },
            ...{ times: new Float32Array([0, 1]), values: new Float32Array([0, 0, 0, 1, 2, 3]) },
          },
        ],
        pointers: [],
      },
    ]);
    const own = await readModel("own.glb", glbOf(OWN_TEXT, OWN_BYTES));
    const [{ name, channels }] = await readClips(own);
    expect([name, ...channels[0].values]).toEqual(["sway", 0, 0, 0, 0, 0.5, 0]);
  });

  it("are none where there are none", async () => {
    expect(await clipsOf(sliding((json) => delete json.animations))).toEqual([]);
  });

  it("leave out channels without a node, and name what they animate by pointer", async () => {
    const [nodeless] = await clipsOf(
      sliding((json) => {
        json.animations[0].channels[0].target = { path: "translation" };
      }),
    );
    expect(nodeless).toMatchObject({ channels: [], pointers: [] });
    const target = (pointer: string) => ({
      path: "pointer",
      extensions: { KHR_animation_pointer: { pointer } },
    });
    const [pointing] = await clipsOf(
      sliding((json) => {
        json.animations[0].channels = [
          { sampler: 0, target: target("/nodes/0/scale") },
          { sampler: 0, target: target("/materials/0/emissiveFactor") },
        ];
      }),
    );
    expect(pointing).toMatchObject({ channels: [], pointers: ["/nodes/0/scale"] });
  });
});

describe("keys that nothing could play are refused, with place and value", () => {
  const CASES: [string, Uint8Array, RegExp][] = [
    [
      "a time that is no number",
      sliding(() => {}, [0, Number.NaN]),
      /samplers\[0\]\.input has the time NaN s \(key 1\)/,
    ],
    ["a time without end", sliding(() => {}, [0, Number.POSITIVE_INFINITY]), /has the time Infinity s/],
    ["a time before 0", sliding(() => {}, [-0.5, 1]), /has the time -0\.5 s \(key 0\)/],
    ["times that fall", sliding(() => {}, [1, 0.25]), /has 0\.25 s after 1 s \(key 1\); times must rise/],
    ["times that stay", sliding(() => {}, [1, 1]), /has 1 s after 1 s/],
    [
      "a value that is no number",
      sliding(() => {}, [0, 1], [0, 0, 0, 0, Number.NaN, 0]),
      /output has a number that is NaN \(key 1\)/,
    ],
    [
      "too few values",
      sliding(() => {}, [0, 1], [0, 0, 0]),
      /output has 1 entries; it must have 1 for each of its 2 times/,
    ],
    [
      "a spline without tangents",
      sliding((json) => {
        json.animations[0].samplers[0].interpolation = "CUBICSPLINE";
      }),
      /output has 2 entries; it must have 3 for each of its 2 times/,
    ],
    [
      "an unknown interpolation",
      sliding((json) => {
        json.animations[0].samplers[0].interpolation = "toString";
      }),
      /interpolation is "toString"; it must be one of LINEAR, STEP, CUBICSPLINE/,
    ],
    [
      "an unknown path",
      sliding((json) => {
        json.animations[0].channels[0].target.path = "constructor";
      }),
      /channels\[0\]\.target\.path is "constructor"/,
    ],
    [
      "a rotation of three numbers",
      sliding((json) => {
        json.animations[0].channels[0].target.path = "rotation";
      }),
      /output has the type VEC3; rotation needs VEC4/,
    ],
    [
      "a rotation of no length",
      sliding(
        (json) => {
          json.animations[0].channels[0].target.path = "rotation";
          Object.assign(json.accessors[3], { type: "VEC4", count: 2 });
        },
        [0, 1],
        [0, 0, 0, 1, 0, 0, 0, 0],
      ),
      /has a rotation of length 0 \(key 1\)/,
    ],
    [
      "times that are no floats",
      sliding((json) => {
        json.accessors[2].componentType = 5125;
      }),
      /input has the type SCALAR of 5125; it must be SCALAR of floats/,
    ],
    [
      "an accessor that is not there",
      sliding((json) => {
        json.animations[0].samplers[0].output = 9;
      }),
      /animations\[0\]\.samplers\[0\]\.output/,
    ],
    [
      "a sampler without times",
      sliding((json) => {
        delete json.animations[0].samplers[0].input;
      }),
      /animations\[0\]\.samplers\[0\]\.input/,
    ],
    [
      "a sampler that is not there",
      sliding((json) => {
        json.animations[0].channels[0].sampler = 1;
      }),
      /animations\[0\]\.channels\[0\]\.sampler/,
    ],
  ];
  for (const [title, glb, message] of CASES)
    it(title, async () => {
      expect(await refusal(glb)).toMatch(message);
    });
});

describe("a model that says less than it should, or stranger things", () => {
  it("has no clips where an animation has neither channels nor samplers", async () => {
    const model = await readModel(
      "m.glb",
      sliding((json) => {
        json.animations = [{ name: "nothing" }];
      }),
    );
    expect(await readClips(model)).toEqual([
      { name: "nothing", channels: [], pointers: [], extras: undefined },
    ]);
  });

  it("is read for its clips where its mesh is compressed", async () => {
    const club = readFileSync(new URL("../data/props/club.glb", import.meta.url));
    const model = await readModel("m.glb", await lossyMeshoptGlb(await open(club)));
    expect(await readClips(model)).toEqual([]);
  });

  it("is refused by a word that cannot be made text", async () => {
    const model = await readModel(
      "m.glb",
      sliding((json) => {
        json.animations[0].samplers[0].interpolation = { toString: 1 };
      }),
    );
    await expect(readClips(model)).rejects.toThrow(
      "m.glb: animations[0].samplers[0].interpolation is an object; it must be one of LINEAR, STEP, CUBICSPLINE",
    );
    const odd = tetrahedron((json) => {
      json.asset.version = { toString: 1 };
    });
    await expect(readModel("m.glb", odd)).rejects.toThrow(
      "m.glb: asset.version is an object; glTF 2.0 is read",
    );
  });
});
