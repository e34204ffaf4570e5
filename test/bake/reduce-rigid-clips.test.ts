import RAPIER from "@dimforge/rapier3d-compat";
import { type Animation, Document, type Node, NodeIO } from "@gltf-transform/core";
import { ALL_EXTENSIONS } from "@gltf-transform/extensions";
import { AnimationMixer, type Object3D, type SkinnedMesh, Vector3 } from "three";
import { GLTFLoader } from "three/examples/jsm/loaders/GLTFLoader.js";
import { beforeAll, describe, expect, it } from "vitest";
import { type ReducedClip, reduceRigidClips } from "../../src/bake/reduce-rigid-clips.js";

const io = new NodeIO().registerExtensions(ALL_EXTENSIONS);

/** A box of these half edges, its centre at `center` in the node's frame. */
function boxNode(document: Document, half: number[], center: number[]): Node {
  const buffer = document.getRoot().listBuffers()[0] ?? document.createBuffer();
  const corners = [-1, 1].flatMap((x) =>
    [-1, 1].flatMap((y) => [-1, 1].map((z) => [x, y, z].map((side, i) => center[i] + side * half[i]))),
  );
  const positions = document
    .createAccessor()
    .setType("VEC3")
    .setArray(Float32Array.from(corners.flat()))
    .setBuffer(buffer);
  const primitive = document.createPrimitive().setAttribute("POSITION", positions).setMode(0);
  const mesh = document.createMesh("box").addPrimitive(primitive);
  const node = document.createNode("box").setMesh(mesh);
  document.createScene("scene").addChild(node);
  return node;
}

type Path = "translation" | "rotation" | "scale";

function addChannel(
  document: Document,
  clip: Animation,
  node: Node,
  path: Path,
  times: number[],
  values: number[],
  interpolation: "LINEAR" | "STEP" = "LINEAR",
): void {
  const buffer = document.getRoot().listBuffers()[0];
  const accessor = (array: number[], type: "SCALAR" | "VEC3" | "VEC4") =>
    document.createAccessor().setType(type).setArray(Float32Array.from(array)).setBuffer(buffer);
  const sampler = document
    .createAnimationSampler()
    .setInterpolation(interpolation)
    .setInput(accessor(times, "SCALAR"))
    .setOutput(accessor(values, path === "rotation" ? "VEC4" : "VEC3"));
  clip
    .addSampler(sampler)
    .addChannel(
      document.createAnimationChannel().setTargetNode(node).setTargetPath(path).setSampler(sampler),
    );
}

/** A box that a general rigid-body engine throws onto a floor, recorded 240 times a second from 0.5 s on. */
async function recordedBox(): Promise<Document> {
  await RAPIER.init();
  const world = new RAPIER.World({ x: 0, y: -9.80665, z: 0 });
  world.timestep = 1 / 240;
  world.createCollider(RAPIER.ColliderDesc.cuboid(10, 0.1, 10).setTranslation(0, -0.1, 0));
  const body = world.createRigidBody(
    RAPIER.RigidBodyDesc.dynamic()
      .setTranslation(0, 1, 0)
      .setLinvel(1, 3, 0.5)
      .setAngvel({ x: 2, y: 9, z: 4 }),
  );
  world.createCollider(RAPIER.ColliderDesc.cuboid(0.05, 0.15, 0.1).setRestitution(0.5), body);
  const times: number[] = [];
  const translations: number[] = [];
  const rotations: number[] = [];
  for (let i = 0; i < 480; i++) {
    const { x, y, z } = body.translation();
    const q = body.rotation();
    times.push(0.5 + i / 240);
    translations.push(x, y, z);
    rotations.push(q.x, q.y, q.z, q.w);
    world.step();
  }
  const document = new Document();
  const node = boxNode(document, [0.05, 0.15, 0.1], [0, 0, 0]);
  const clip = document.createAnimation("drop");
  addChannel(document, clip, node, "translation", times, translations);
  addChannel(document, clip, node, "rotation", times, rotations);
  return document;
}

/** Greatest way between where three.js shows the vertices of two files' nodes, at times all over a clip. */
async function apart(before: Uint8Array, after: Uint8Array, clip: string): Promise<number> {
  const open = async (glb: Uint8Array) => {
    const { scene, animations } = await new GLTFLoader().parseAsync(glb.slice().buffer, "");
    const mixer = new AnimationMixer(scene);
    const action = mixer.clipAction(animations.find(({ name }) => name === clip)!);
    action.play();
    return { scene, mixer, duration: action.getClip().duration };
  };
  const [a, b] = [await open(before), await open(after)];
  expect(b.duration).toBe(a.duration);
  let greatest = 0;
  for (let i = 0; i < 3000; i++) {
    const t = (((i + 0.5) * 0.6180339887498949) % 1) * a.duration;
    for (const { mixer, scene } of [a, b]) {
      mixer.setTime(t);
      scene.updateMatrixWorld(true);
    }
    const places = [a.scene, b.scene].map(vertices);
    places[0].forEach((p, k) => {
      greatest = Math.max(greatest, p.distanceTo(places[1][k]));
    });
  }
  return greatest;
}

function vertices(scene: Object3D): Vector3[] {
  const found: Vector3[] = [];
  scene.traverse((object) => {
    // biome-ignore lint/suspicious/noExplicitAny: a mesh or points
    const positions = (object as any).geometry?.getAttribute("position");
    const step = Math.max(1, Math.floor((positions?.count ?? 0) / 12));
    for (let i = 0; i < (positions?.count ?? 0); i += step) {
      const place = new Vector3().fromBufferAttribute(positions, i);
      if ("isSkinnedMesh" in object) (object as SkinnedMesh).applyBoneTransform(i, place);
      found.push(place.applyMatrix4(object.matrixWorld));
    }
  });
  return found;
}

const copy = async (document: Document) => io.readBinary(await io.writeBinary(document));

async function reduce(document: Document, options: Parameters<typeof reduceRigidClips>[0]) {
  const before = await io.writeBinary(document);
  const reports: ReducedClip[] = [];
  const reduced = await io.readBinary(before);
  await reduced.transform(reduceRigidClips({ ...options, onClip: (report) => reports.push(report) }));
  return { before, after: await io.writeBinary(reduced), reports, reduced };
}

describe("a clip recorded from a rigid-body engine", () => {
  let document: Document;
  beforeAll(async () => {
    document = await recordedBox();
  });

  it.each([
    ["linear", 0.001],
    ["cubic", 0.001],
    ["smallest", 0.005],
  ] as const)(
    "is cut into %s keys within %s m of what it was, bounces and all",
    async (keys, toleranceMetres) => {
      const { before, after, reports } = await reduce(document, { toleranceMetres, keys });
      const [{ left, error, bytes }] = reports;
      expect(left).toBeUndefined();
      expect(error).toBeLessThanOrEqual(toleranceMetres);
      expect(bytes.after).toBeLessThan(0.6 * bytes.before);
      // 1e-6: three computes the recorded keys' slerp from float32 quaternions it does not make unit.
      expect(await apart(before, after, "drop")).toBeLessThanOrEqual(error + 1e-6);
    },
  );

  it("is left alone, and says why, where it cannot be proved or be smaller", async () => {
    const change = async (alter: (document: Document, clip: Animation, node: Node) => void) => {
      const other = await copy(document);
      const root = other.getRoot();
      alter(other, root.listAnimations()[0], root.listNodes().find((node) => node.getName() === "box")!);
      const { reports, before, after } = await reduce(other, { toleranceMetres: 0.001 });
      // every other byte too
      if (reports.every(({ left }) => left !== undefined)) expect(after).toEqual(before);
      return reports.map(({ left }) => left);
    };
    expect(
      await change((d, clip, node) => addChannel(d, clip, node, "scale", [0, 1], [1, 1, 1, 2, 2, 2])),
    ).toEqual([expect.stringMatching(/scale/)]);
    expect(await change((_, clip) => clip.listSamplers()[0].setInterpolation("STEP"))).toEqual([
      expect.stringMatching(/STEP/),
    ]);
    expect(await change((_, __, node) => node.setMesh(null))).toEqual([expect.stringMatching(/geometry/)]);
    const parents = await change((d, clip, node) => {
      const parent = d.createNode("parent").addChild(node);
      d.getRoot().listScenes()[0].addChild(parent);
      addChannel(d, clip, parent, "translation", [0, 1], [0, 0, 0, 1, 0, 0]);
    });
    expect(parents).toEqual([expect.stringMatching(/above/), expect.stringMatching(/below/)]);
    expect((await reduce(document, { toleranceMetres: 1e-8 })).reports[0].left).toMatch(/float32/);
  });

  it("counts the scale of what is above it", async () => {
    const other = await copy(document);
    const root = other.getRoot();
    const node = root.listNodes()[0];
    const parent = other.createNode("parent").setScale([10, 10, 10]).addChild(node);
    root.listScenes()[0].addChild(parent);
    const { before, after, reports } = await reduce(other, { toleranceMetres: 0.005 });
    expect(reports[0].left).toBeUndefined();
    expect(reports[0].error).toBeLessThanOrEqual(0.005);
    expect(await apart(before, after, "drop")).toBeLessThanOrEqual(reports[0].error + 1e-5);
  });
});

describe("one channel alone", () => {
  it.each(["translation", "rotation"] as const)("%s is cut by itself", async (path) => {
    const document = await recordedBox();
    const clip = document.getRoot().listAnimations()[0];
    for (const channel of clip.listChannels()) if (channel.getTargetPath() !== path) channel.dispose();
    const { before, after, reports } = await reduce(document, { toleranceMetres: 0.001 });
    expect(reports[0].left).toBeUndefined();
    expect(await apart(before, after, "drop")).toBeLessThanOrEqual(reports[0].error + 1e-6);
  });
});

describe("what exporters write of rigid pieces", () => {
  it("is cut all the same: a scale that stands still", async () => {
    const document = await recordedBox();
    const [clip] = document.getRoot().listAnimations();
    const [node] = document.getRoot().listNodes();
    node.setScale([1.5, 1.5, 1.5]);
    addChannel(document, clip, node, "scale", [0, 1, 2], [1.5, 1.5, 1.5, 1.50001, 1.5, 1.5, 1.5, 1.5, 1.5]);
    const { before, after, reports } = await reduce(document, { toleranceMetres: 0.001 });
    expect(reports[0].left).toBeUndefined();
    expect(await apart(before, after, "drop")).toBeLessThanOrEqual(reports[0].error + 1e-6);
  });

  it("is cut within the tolerance where two joints share a skin's vertices", async () => {
    const document = await recordedBox();
    const [clip] = document.getRoot().listAnimations();
    const [joint] = document.getRoot().listNodes();
    const [scene] = document.getRoot().listScenes();
    const mesh = joint.getMesh()!;
    joint.setMesh(null);
    const other = document.createNode("other").setTranslation([0, 0.3, 0]);
    const times = Array.from({ length: 240 }, (_, i) => i / 100);
    const turn = times.flatMap((t) => [Math.sin(4 * t), 0, 0, Math.cos(4 * t)]);
    addChannel(document, clip, other, "rotation", times, turn);
    const [buffer] = document.getRoot().listBuffers();
    const accessor = (type: "VEC4" | "MAT4", array: Float32Array | Uint16Array) =>
      document.createAccessor().setType(type).setArray(array).setBuffer(buffer);
    const lift = (y: number) => [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, y, 0, 1];
    const skin = document
      .createSkin()
      .addJoint(joint)
      .addJoint(other)
      .setInverseBindMatrices(accessor("MAT4", Float32Array.from([...lift(0), ...lift(-0.3)])));
    // Corner by corner more of the second joint.
    mesh
      .listPrimitives()[0]
      .setMode(4)
      .setAttribute(
        "JOINTS_0",
        accessor(
          "VEC4",
          new Uint16Array(32).map((_, i) => (i % 4 === 1 ? 1 : 0)),
        ),
      )
      .setAttribute(
        "WEIGHTS_0",
        accessor(
          "VEC4",
          Float32Array.from({ length: 32 }, (_, i) => [7 - (i >> 2), i >> 2, 0, 0][i % 4] / 7),
        ),
      );
    scene.addChild(other).addChild(document.createNode("shown").setMesh(mesh).setSkin(skin));
    const { before, after, reports } = await reduce(document, { toleranceMetres: 0.001 });
    expect(reports.map(({ left }) => left)).toEqual([undefined, undefined]);
    const shown = await apart(before, after, "drop");
    expect(shown).toBeGreaterThan(1e-4);
    expect(shown).toBeLessThanOrEqual(Math.max(...reports.map(({ error }) => error)) + 1e-6);
  });
});
