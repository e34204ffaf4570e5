import { Matrix4, Quaternion, Vector3 } from "three";
import { GLTFLoader } from "three/examples/jsm/loaders/GLTFLoader.js";
import { describe, expect, it } from "vitest";
import { movedNode } from "../../src/gltf/moved-node.js";
import { readModel } from "../../src/gltf/read.js";
import { spliceGlb } from "../../src/gltf/splice.js";
import { readSurfaces } from "../../src/gltf/surfaces.js";
import { RequestError } from "../../src/math/request-error.js";
import { tetrahedron } from "./models.js";

// biome-ignore lint/suspicious/noExplicitAny: JSON changed freely
type Change = (json: any) => void;

/** root › arm › hand (the node meant) › finger, and a bystander. */
const nodes = () => [
  {
    name: "root",
    children: [1, 4],
    translation: [1, 2, 3],
    rotation: [0.6, 0, 0, 0.8],
    scale: [0.5, 0.5, 0.5],
  },
  { name: "arm", children: [2], matrix: [0, 4, 0, 0, -4, 0, 0, 0, 0, 0, 4, 0, 5, 6, 7, 1] },
  {
    name: "hand",
    children: [3],
    mesh: 0,
    translation: [1, 0, 2],
    rotation: [0, 0.28, 0, 0.96],
    scale: [1, 2, 3],
  },
  { name: "finger", mesh: 0 },
  { name: "bystander", mesh: 0 },
];
const glb = (change: Change = () => {}) =>
  tetrahedron((json) => {
    json.nodes = nodes();
    change(json);
  });
const model = (change?: Change) => readModel("m", glb(change));

describe("a node that can be moved", () => {
  it("stands where three.js shows it, its parents taken together", async () => {
    const { parent, local, position, rotation, index } = movedNode(await model(), "hand");
    const { scene } = await new GLTFLoader().parseAsync(glb().slice().buffer, "");
    scene.updateMatrixWorld(true);
    const hand = scene.getObjectByName("hand")!;
    const [at, turn, size] = [new Vector3(), new Quaternion(), new Vector3()];
    hand.parent!.matrixWorld.decompose(at, turn, size);
    expect(index).toBe(2);
    const close = (found: readonly number[], wanted: number[]) =>
      wanted.forEach((value, i) => {
        expect(found[i]).toBeCloseTo(value, 12);
      });
    close(parent.translation, at.toArray());
    close(parent.rotation, turn.toArray());
    close([parent.scale, parent.scale, parent.scale], size.toArray());
    const whole = new Matrix4().compose(
      new Vector3(...local.translation),
      new Quaternion(...local.rotation),
      new Vector3(...local.scale),
    );
    close(whole.toArray(), hand.matrix.toArray());
    close(position, new Vector3().applyMatrix4(hand.matrixWorld).toArray());
    // The node's axes: where its unevenly scaled unit vectors point.
    const axes = new Matrix4().makeRotationFromQuaternion(new Quaternion(...rotation));
    for (const unit of [new Vector3(1, 0, 0), new Vector3(0, 1, 0), new Vector3(0, 0, 1)])
      close(
        unit.clone().applyMatrix4(axes).toArray(),
        unit.clone().transformDirection(hand.matrixWorld).toArray(),
      );
  });

  it("shows its triangles and those below alone, in the scene's frame", async () => {
    const whole = await readSurfaces(await model());
    const below = await readSurfaces(await model(), 2);
    expect(below.surfaces).toEqual(whole.surfaces.filter(({ nodeName }) => nodeName !== "bystander"));
    expect(below.surfaces).toHaveLength(2);
  });

  it("may be a root, and hold a skinned mesh with all its joints", async () => {
    const { parent } = movedNode(await model(), "root");
    expect(parent).toEqual({ translation: [0, 0, 0], rotation: [0, 0, 0, 1], scale: 1 });
    const skinned = await model((json) => {
      json.skins = [{ joints: [2, 3] }];
      json.nodes[3].skin = 0;
    });
    expect(movedNode(skinned, "hand").index).toBe(2);
  });
});

describe("a node that cannot be moved rigidly says why", () => {
  const moving = {
    channels: [{ sampler: 0, target: { node: 1, path: "rotation" } }],
    samplers: [{ input: 1, output: 1 }],
  };
  it.each<[string, Change, string, string?]>([
    ["it is not there", () => {}, '"hnad" is no node of the default scene; nearest is "hand"', "hnad"],
    [
      "it stands outside the default scene",
      (j) => (j.scenes[0].nodes = [j.nodes.push({ name: "other" }) - 1]),
      '"hand" is no node of the default scene; nearest is "other"',
      "hand",
    ],
    [
      "nothing has a name",
      (j) => j.nodes.map((n: { name?: string }) => delete n.name),
      "no named nodes",
      "hand",
    ],
    ["two have the name", (j) => (j.nodes[4].name = "hand"), '"hand" is the name of 2 nodes (2, 4)'],
    [
      "parents scaled unevenly",
      (j) => (j.nodes[0].scale = [0.5, 0.5, 0.6]),
      "has parents that mirror it or scale it unevenly",
    ],
    ["parents mirrored", (j) => (j.nodes[0].scale = [-0.5, 0.5, 0.5]), "has parents that mirror it"],
    [
      "parents turned inside out",
      (j) => (j.nodes[0].scale = [-0.5, -0.5, -0.5]),
      "has parents that mirror it",
    ],
    ["parents scaled to nothing", (j) => (j.nodes[0].scale = [0, 0, 0]), "has parents that mirror it"],
    [
      "a parent animated",
      (j) => (j.animations = [moving]),
      'has the parent "arm", which the model\'s own clips move',
    ],
    ["mirrored itself", (j) => (j.nodes[2].scale = [1, -2, 3]), "is mirrored, which some players get wrong"],
    [
      "sheared itself",
      (j) => {
        j.nodes[2] = {
          name: "hand",
          mesh: 0,
          children: [3],
          matrix: [1, 0, 0, 0, 0.5, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1],
        };
      },
      "has a transform that is sheared or flat",
    ],
    [
      "a skinned mesh below with joints elsewhere",
      (j) => {
        j.skins = [{ joints: [3, 1] }];
        j.nodes[3].skin = 0;
      },
      'holds the skinned mesh "finger", but not all of its joints',
    ],
    [
      "it is a joint of a mesh elsewhere",
      (j) => {
        j.skins = [{ joints: [0, 3] }];
        j.nodes[4].skin = 0;
      },
      'moves joints of the skinned mesh "bystander", which is not below it',
    ],
  ])("%s", async (_, change, message, name = "hand") => {
    const read = await model(change);
    let error: unknown;
    try {
      movedNode(read, name);
    } catch (found) {
      error = found;
    }
    expect(error).toBeInstanceOf(RequestError);
    expect((error as RequestError).path).toEqual(["node"]);
    expect(`${(error as RequestError).fault}; ${(error as RequestError).remedy}`).toContain(message);
  });

  it("its own and lower nodes may have clips of their own, and two parents undo each other's scale", async () => {
    const fine = await model((json) => {
      json.animations = [2, 3, 4].map((node) => ({
        ...moving,
        channels: [{ ...moving.channels[0], target: { node, path: "scale" } }],
      }));
      json.nodes[0] = { ...json.nodes[0], rotation: [0, 0, 0, 1], scale: [1, 2, 4] };
      json.nodes[1] = { name: "arm", children: [2], scale: [4, 2, 1] };
    });
    expect(movedNode(fine, "hand").parent.scale).toBeCloseTo(4, 14);
  });
});

describe("a new rest pose", () => {
  const rest = { node: 2, translation: [9, 8, 7], rotation: [0, 1, 0, 0] } as const;

  it("changes what it states of a node, to the letter nothing else", async () => {
    const read = await model();
    const { json } = await readModel("out", spliceGlb(read, { nodes: [], clips: [], rests: [{ ...rest }] }));
    const expected = structuredClone(read.json);
    Object.assign(expected.nodes![2], { translation: [9, 8, 7], rotation: [0, 1, 0, 0] });
    expected.asset.generator = "tossbake";
    expect(json).toEqual(expected);
  });

  it("takes the place of a matrix, whose scale stays", async () => {
    const read = await model();
    const { json } = await readModel(
      "out",
      spliceGlb(read, { nodes: [], clips: [], rests: [{ ...rest, node: 1 }] }),
    );
    expect(json.nodes![1]).toEqual({
      name: "arm",
      children: [2],
      ...rest,
      node: undefined,
      scale: [4, 4, 4],
    });
  });
});
