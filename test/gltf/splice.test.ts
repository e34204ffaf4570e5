import { readFileSync } from "node:fs";
import { NullEngine } from "@babylonjs/core/Engines/nullEngine.js";
import "@babylonjs/core/Helpers/sceneHelpers.js";
import { LoadSceneAsync } from "@babylonjs/core/Loading/sceneLoader.js";
import { Logger } from "@babylonjs/core/Misc/logger.js";
import { findNodeAtLocation, parseTree } from "jsonc-parser";
import { AnimationMixer } from "three";
import { GLTFLoader } from "three/examples/jsm/loaders/GLTFLoader.js";
import { describe, expect, it } from "vitest";
import "@babylonjs/loaders/glTF/2.0/index.js";
// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { splitGlb } from "../../src/gltf/glb.js";
import { ModelError } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { spliceGlb } from "../../src/gltf/splice.js";
import { bytesDataUri } from "../../src/gltf/uri.js";
import { bytesOf, FACES, glbOf, graft, TETRAHEDRON, tetrahedron } from "./models.js";
import { OWN_BYTES, OWN_TEXT } from "./own.js";

const props = new URL("../data/props/", import.meta.url);

const jsonOf = (glb: Uint8Array) => JSON.parse(new TextDecoder().decode(splitGlb("", glb).json));

/** Codes of the errors and warnings of the Khronos validator. */
async function faults(glb: Uint8Array): Promise<string[]> {
  const { issues } = await validateBytes(glb, { maxIssues: 0 });
  return issues.messages
    .filter(({ severity }: { severity: number }) => severity < 2)
    .map(({ code }: { code: string }) => code);
}

const spliced = async (bytes: Uint8Array, resolve?: (path: string) => Promise<Uint8Array>) =>
  spliceGlb(await readModel("model", bytes, resolve), graft());

const OTHER_CHUNK = bytesOf(new Uint8Array([4, 0, 0, 0, 0x58, 0x58, 0x58, 0x58, 9, 8, 7, 6]));

describe("what was the user's own", () => {
  it("is in the spliced file to the byte: every piece of binary, and the chunks nobody knows", async () => {
    const result = splitGlb("", await spliced(glbOf(OWN_TEXT, OWN_BYTES, OTHER_CHUNK)));
    expect(result.binary!.subarray(0, OWN_BYTES.length)).toEqual(OWN_BYTES);
    expect(result.others).toEqual(OTHER_CHUNK);
  });

  it("is in its JSON to the letter, but for the generator, the scene's roots and the buffer's size", async () => {
    const text = new TextDecoder().decode(splitGlb("", await spliced(glbOf(OWN_TEXT, OWN_BYTES))).json);
    const before = parseTree(OWN_TEXT)!;
    const after = parseTree(text)!;
    const changed: string[] = [];
    const open = [before];
    for (let node = open.pop(); node; node = open.pop()) {
      if (node.type === "object") open.push(...node.children!.map((member) => member.children![1]));
      else if (node.type === "array") open.push(...node.children!);
      else {
        const path: (string | number)[] = [];
        for (let at = node; at.parent; at = at.parent) {
          if (at.parent.type === "property") path.unshift(at.parent.children![0].value);
          else if (at.parent.type === "array") path.unshift(at.parent.children!.indexOf(at));
        }
        const same = findNodeAtLocation(after, path);
        const literal = OWN_TEXT.slice(node.offset, node.offset + node.length);
        if (!same || text.slice(same.offset, same.offset + same.length) !== literal)
          changed.push(path.join("."));
      }
    }
    expect(changed.sort()).toEqual(["asset.generator", "buffers.0.byteLength", "scenes.0.nodes.0"]);
    expect(Object.keys(jsonOf(glbOf(text)))).toEqual(Object.keys(JSON.parse(OWN_TEXT)));
  });

  it("still plays: its clip moves its node under ours", async () => {
    const json = jsonOf(await spliced(glbOf(OWN_TEXT, OWN_BYTES)));
    expect(json.scenes[0].nodes).toEqual([2]);
    expect(json.nodes[2]).toEqual({ name: "spanner", children: [0] });
    expect(json.animations.map(({ name }: { name: string }) => name)).toEqual(["sway", "lob_01", "lob_02"]);
    expect(json.animations[0]).toEqual(JSON.parse(OWN_TEXT).animations[0]);
  });
});

describe("what is added", () => {
  it("stands in one buffer view without a stride, behind the model's bytes", async () => {
    const json = jsonOf(await spliced(glbOf(OWN_TEXT, OWN_BYTES)));
    expect(json.bufferViews.length).toBe(5);
    // 113 bytes of the user's, then the next multiple of four.
    expect(json.bufferViews[4].byteOffset).toBe(116);
    expect(json.bufferViews[4].byteStride).toBeUndefined();
    expect(json.accessors.slice(4).every(({ bufferView }: { bufferView: number }) => bufferView === 4)).toBe(
      true,
    );
  });

  it("shares equal times between channels and clips", async () => {
    const { animations } = jsonOf(await spliced(tetrahedron()));
    const [first, second] = animations;
    expect(first.samplers[0].input).toBe(first.samplers[1].input);
    expect(second.samplers[0].input).toBe(first.samplers[0].input);
    expect(second.samplers[1].input).not.toBe(first.samplers[0].input);
  });

  it("carries our generator, the clip's extras and the bounds of its times", async () => {
    const json = jsonOf(await spliced(tetrahedron()));
    expect(json.asset.generator).toBe("tossbake");
    expect(json.animations[0].extras).toEqual({ throw: "lob", take: 1 });
    expect(json.accessors[2]).toMatchObject({ count: 3, type: "SCALAR", min: [0], max: [0.5] });
  });

  it("may be int16 rotations", async () => {
    const packed = graft();
    packed.clips.length = 1;
    packed.clips[0].channels[1].values = new Int16Array([0, 0, 0, 32767, 0, 23170, 0, 23170, 0, 32767, 0, 0]);
    const glb = spliceGlb(await readModel("model", tetrahedron()), packed);
    expect(await faults(glb)).toEqual([]);
    expect(jsonOf(glb).accessors.at(-1)).toMatchObject({ componentType: 5122, normalized: true, count: 3 });
  });

  it("may be nodes within nodes, the scene in the innermost", async () => {
    const nested = graft();
    nested.nodes = [
      { name: "outer", translation: [1, 2, 3], children: [1] },
      { name: "inner", rotation: [0, 0, 0, 1], children: [2] },
      { name: "still", translation: [0, 0, 0.5], scale: [2, 2, 2], holdsScene: true },
    ];
    const glb = spliceGlb(await readModel("model", glbOf(OWN_TEXT, OWN_BYTES)), nested);
    expect(jsonOf(glb).nodes.slice(2)).toEqual([
      { name: "outer", translation: [1, 2, 3], children: [3] },
      { name: "inner", rotation: [0, 0, 0, 1], children: [4] },
      { name: "still", translation: [0, 0, 0.5], scale: [2, 2, 2], children: [0] },
    ]);
    expect(jsonOf(glb).scenes[0].nodes).toEqual([2]);
  });

  it("is the same bytes every time", async () => {
    expect(await spliced(glbOf(OWN_TEXT, OWN_BYTES))).toEqual(await spliced(glbOf(OWN_TEXT, OWN_BYTES)));
  });
});

describe("models of every kind become one GLB", () => {
  const text = (change: (json: Record<string, unknown>) => void) => {
    const json = jsonOf(tetrahedron(change));
    return new TextEncoder().encode(JSON.stringify(json));
  };
  const binary = bytesOf(TETRAHEDRON, FACES);
  // The signature of a PNG and its first chunk (PNG specification, 5.2 and 11.2.2): one pixel.
  const png = Uint8Array.from(
    atob("iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg=="),
    (c) => c.charCodeAt(0),
  );

  it("a .gltf with its buffer in a file", async () => {
    const bytes = text((json) => {
      json.buffers = [{ uri: "a%20b/c.bin", byteLength: 72 }];
    });
    const asked: string[] = [];
    const glb = await spliced(bytes, async (path) => {
      asked.push(path);
      return binary;
    });
    expect(asked).toEqual(["a b/c.bin"]);
    expect(jsonOf(glb).buffers).toEqual([{ byteLength: splitGlb("", glb).binary!.length }]);
    expect(splitGlb("", glb).binary!.subarray(0, 72)).toEqual(binary);
    expect(await faults(glb)).toEqual([]);
  });

  it("a .gltf with its buffer in a data: URI, and a second one in a file", async () => {
    const bytes = text((json) => {
      json.buffers = [
        { byteLength: 48, uri: bytesDataUri(binary.subarray(0, 48)) },
        { uri: "second.bin", byteLength: 24 },
      ];
      json.bufferViews = [
        { buffer: 0, byteLength: 48, target: 34962 },
        { buffer: 1, byteLength: 24, target: 34963 },
      ];
    });
    const glb = await spliced(bytes, async () => binary.slice(48));
    expect(jsonOf(glb).buffers[0].uri).toBeUndefined();
    expect(jsonOf(glb).buffers[1].uri).toBe(bytesDataUri(binary.subarray(48)));
    // A GLB has room for one buffer: the validator warns of any other's being in the JSON.
    expect(await faults(glb)).toEqual(["DATA_URI_GLB"]);
    const again = await readModel("again", glb);
    expect(again.buffers[1]).toEqual(binary.slice(48));
  });

  it("a .gltf whose buffer's length is no multiple of four", async () => {
    const bytes = text((json) => {
      json.buffers = [{ uri: "c.bin", byteLength: 73 }];
    });
    const glb = await spliced(bytes, async () => bytesOf(binary, new Uint8Array([7])));
    expect(jsonOf(glb).bufferViews[2].byteOffset).toBe(76);
    expect([...splitGlb("", glb).binary!.subarray(72, 76)]).toEqual([7, 0, 0, 0]);
    expect(await faults(glb)).toEqual([]);
  });

  it("a model with empty lists", async () => {
    const lists = { nodes: [], scenes: [], accessors: [], bufferViews: [], buffers: [], animations: [] };
    const glb = await spliced(
      new TextEncoder().encode(JSON.stringify({ asset: { version: "2.0" }, ...lists })),
    );
    expect(await faults(glb)).toEqual([]);
  });

  it("images in files", async () => {
    const bytes = text((json) => {
      json.buffers = [{ uri: "c.bin", byteLength: 72 }];
      json.images = [{ uri: "skin.png", name: "skin" }];
      json.textures = [{ source: 0 }];
      json.materials = [{ pbrMetallicRoughness: { baseColorTexture: { index: 0 } } }];
    });
    const glb = await spliced(bytes, async (path) => (path === "c.bin" ? binary : png));
    const { images, bufferViews } = jsonOf(glb);
    expect(images).toEqual([{ bufferView: 3, mimeType: "image/png", name: "skin" }]);
    const { byteOffset, byteLength } = bufferViews[3];
    expect(splitGlb("", glb).binary!.subarray(byteOffset, byteOffset + byteLength)).toEqual(png);
    expect(await faults(glb)).toEqual([]);
  });

  it("a model with nothing at all", async () => {
    const glb = await spliced(new TextEncoder().encode('{"asset":{"version":"2.0"}}'));
    expect(await faults(glb)).toEqual([]);
    expect(jsonOf(glb)).toMatchObject({ scene: 0, scenes: [{ nodes: [0] }], nodes: [{ name: "spanner" }] });
  });

  it("a model without a scene keeps its roots under ours", async () => {
    const glb = await spliced(
      tetrahedron((json) => {
        delete json.scene;
        delete json.scenes;
        json.nodes = [{ name: "solid", mesh: 0 }, { children: [0] }, {}];
      }),
    );
    expect(jsonOf(glb).scenes).toEqual([{ nodes: [3] }]);
    expect(jsonOf(glb).nodes[3].children).toEqual([1, 2]);
    expect(await faults(glb)).toEqual([]);
  });

  it("a second scene that shares a root shows ours in its place", async () => {
    const glb = await spliced(
      tetrahedron((json) => {
        json.scenes = [{ nodes: [1] }, { nodes: [0, 1] }];
        json.scene = 1;
        json.nodes.push({ name: "post" });
      }),
    );
    expect(jsonOf(glb).scenes).toEqual([{ nodes: [2] }, { nodes: [2] }]);
    expect(await faults(glb)).toEqual([]);
  });

  it("a node of the model's own with a matrix is told apart, as it must be to move", async () => {
    const moved = graft();
    moved.nodes = [];
    for (const { channels } of moved.clips) for (const channel of channels) channel.target = { node: 0 };
    const matrix = (m: number[]) =>
      tetrahedron((json) => {
        json.nodes[0].matrix = m;
      });
    // A quarter turn about z of axes 2, 3 and 4 long, then moved by (5, 6, 7): columns written down by hand.
    const glb = spliceGlb(
      await readModel("m", matrix([0, 2, 0, 0, -3, 0, 0, 0, 0, 0, 4, 0, 5, 6, 7, 1])),
      moved,
    );
    const node = jsonOf(glb).nodes[0];
    expect(node.translation).toEqual([5, 6, 7]);
    expect(node.scale).toEqual([2, 3, 4]);
    [0, 0, Math.SQRT1_2, Math.SQRT1_2].forEach((value, i) => {
      expect(node.rotation[i]).toBeCloseTo(value, 12);
    });
    expect(await faults(glb)).toEqual([]);
    // Mirrored in y: as a rotation and a scale, half a turn about z with x and z as they were, x turned round.
    const mirrored = spliceGlb(
      await readModel("m", matrix([1, 0, 0, 0, 0, -2, 0, 0, 0, 0, 3, 0, 0, 0, 0, 1])),
      moved,
    );
    expect(jsonOf(mirrored).nodes[0].scale).toEqual([-1, 2, 3]);
    expect(jsonOf(mirrored).nodes[0].rotation.map(Math.abs)).toEqual([0, 0, 1, 0]);
    const sheared = await readModel("m", matrix([1, 0, 0, 0, 1, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1]));
    expect(() => spliceGlb(sheared, moved)).toThrow(ModelError);
  });

  it("a clip whose name the model has already is refused, by name", async () => {
    const named = glbOf(OWN_TEXT.replace('"sway"', '"lob_02"'), OWN_BYTES);
    await expect(spliced(named)).rejects.toThrow('two animations named "lob_02"');
  });
});

describe("players that others wrote", () => {
  const files = [
    "box_offpivot",
    "club",
    "hierarchy_shear",
    "skin_bind_pose",
    "sparse_override",
    "quantised_i16",
  ];
  const models: [string, Uint8Array][] = [
    ["own", glbOf(OWN_TEXT, OWN_BYTES)],
    ...files.map((file): [string, Uint8Array] => [file, readFileSync(new URL(`${file}.glb`, props))]),
  ];

  it.each(models)("%s: the Khronos validator has no more to say than before", async (_, bytes) => {
    const before = await faults(bytes);
    // It advises that skinned meshes be roots, since their nodes' places do not count; their joints, which do, move with ours.
    const after = (await faults(await spliced(bytes))).filter(
      (code) => code !== "NODE_SKINNED_MESH_NON_ROOT",
    );
    expect(after).toEqual(before);
  });

  it.each(models)("%s: three plays the clip", async (_, bytes) => {
    const glb = await spliced(bytes);
    const { scene, animations } = await new GLTFLoader().parseAsync(glb.slice().buffer, "");
    const clip = animations.find(({ name }) => name === "lob_01")!;
    const node = scene.getObjectByName("spanner")!;
    const mixer = new AnimationMixer(scene);
    mixer.clipAction(clip).play();
    mixer.setTime(0.125);
    // Halfway between the first two keys, an eighth of a turn about y (glTF 2.0, Appendix C).
    [0.5, 1.65, 0.05].forEach((value, i) => {
      expect(node.position.toArray()[i]).toBeCloseTo(value, 6);
    });
    [0, Math.sin(Math.PI / 8), 0, Math.cos(Math.PI / 8)].forEach((value, i) => {
      expect(node.quaternion.toArray()[i]).toBeCloseTo(value, 6);
    });
  });

  it("Babylon plays the clip", async () => {
    Logger.LogLevels = Logger.NoneLogLevel;
    const engine = new NullEngine();
    const glb = await spliced(models[0][1]);
    const scene = await LoadSceneAsync(new Uint8Array(glb), engine, { pluginExtension: ".glb" });
    const group = scene.animationGroups.find(({ name }) => name === "lob_01")!;
    scene.animationGroups.forEach((other) => {
      other.stop();
    });
    group.start(false);
    group.goToFrame(group.to / 4);
    scene.createDefaultCamera();
    scene.render();
    const node = scene.getTransformNodeByName("spanner")!;
    [0.5, 1.65, 0.05].forEach((value, i) => {
      expect(node.position.asArray()[i]).toBeCloseTo(value, 6);
    });
    engine.dispose();
  });
});
