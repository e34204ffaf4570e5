// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { type Matrix4, Vector3 } from "three";
import { GLTFLoader } from "three/examples/jsm/loaders/GLTFLoader.js";
import { beforeAll, describe, expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import { modelRotation } from "../../src/bake/motion.js";
import { toleranceOf } from "../../src/bake/take.js";
import { readModel } from "../../src/gltf/read.js";
import { rotate } from "../../src/math/quat.js";
import { add, distance, scale, subtract, type Vec3 } from "../../src/math/vec3.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { TETRAHEDRON, tetrahedron } from "../gltf/models.js";
import { babylon } from "./babylon.js";
import { three } from "./three.js";

/** A prop in a stand: under a turned root in centimetres and a matrix, with a scale of its own and a sheared part below it. */
const model = tetrahedron((json) => {
  json.nodes = [
    {
      name: "root",
      children: [1, 4],
      translation: [0.4, -1, 2],
      rotation: [0.6, 0, 0, 0.8],
      scale: [0.01, 0.01, 0.01],
    },
    // A quarter turn about z, twice the size.
    { name: "stand", children: [2], matrix: [0, 2, 0, 0, -2, 0, 0, 0, 0, 0, 2, 0, 5, 6, 7, 1] },
    {
      name: "prop",
      mesh: 0,
      children: [3],
      translation: [10, 20, -5],
      rotation: [0, 0.28, 0, 0.96],
      scale: [9, 7, 8],
    },
    { name: "part", mesh: 0, translation: [2, 0, 0], rotation: [0, 0, 0.6, 0.8] },
    { name: "stays", mesh: 0 },
  ];
});

const throwFile = (factor: number, takes: number) =>
  parseThrowFile(
    "stand.throws.yaml",
    `props: { lamp: { model: stand.glb, node: prop, scale: ${factor}, density: { default: 500 } } }
throws:
  toss:
    prop: lamp
    takes: ${takes}
    release: { at: [0, 1.4, 0], facing: [[long, up], [short, ahead]] }
    arrive: { at: [3, 1, 0.5], after: 0.8..1.1 }
    spin: { axis: middle, turns: 1.5, wobble: 10 }
`,
  );

const moments = Array.from({ length: 40 }, (_, i) => ((i + 0.5) * 0.6180339887498949) % 1);

describe.each([
  [1, 2],
  [2.5, 1],
  [2.5, 2],
])("a node of a model scaled by %d, %d clips", (factor, takes) => {
  let baked: Awaited<ReturnType<typeof bake>>;
  /** The node's own frame → scene, at rest and unscaled: three's word. */
  let rest: Matrix4;

  beforeAll(async () => {
    const source = async () => ({ model: await readModel("stand.glb", model), sha256: "" });
    baked = await bake(throwFile(factor, takes), source);
    const { scene } = await new GLTFLoader().parseAsync(model.slice().buffer, "");
    scene.updateMatrixWorld(true);
    rest = scene.getObjectByName("prop")!.matrixWorld;
  });

  it("is valid, and only that node moves", async () => {
    const { content } = baked.files[0];
    const report = await validateBytes(new Uint8Array(content));
    expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual([]);
    const { json } = await readModel("baked", content);
    expect(json.nodes).toHaveLength(5);
    expect(json.scenes).toEqual([{ nodes: [0] }]);
    expect(json.animations!.flatMap(({ channels }) => channels.map(({ target }) => target.node))).toEqual(
      Array(2 * takes).fill(2),
    );
    [9, 7, 8].forEach((own, i) => {
      expect(json.nodes![2].scale![i]).toBeCloseTo(factor * own, 14);
    });
  });

  it("weighs what is below the node alone", () => {
    // Twice the tetrahedron (a sixth of 0.5·0.75·1), by all scales: 9·7·8 · (2 · 0.01)³ · factor³.
    const { volume } = baked.props.get("lamp")!.prop;
    expect(volume / (2 * 0.0625 * 504 * 8e-6 * factor ** 3)).toBeCloseTo(1, 6);
  });

  it.each([three, babylon])(
    "$name shows every take within its stated error of the true flight",
    async (player) => {
      const opened = await player.open(baked.files[0].content);
      const { prop } = baked.props.get("lamp")!;
      for (const { name, take, track } of baked.throws[0].takes) {
        const { flight } = take;
        const played = opened.play(name, "prop");
        let greatest = 0;
        let excess = Number.NEGATIVE_INFINITY;
        for (const moment of moments) {
          const t = moment * Math.fround(flight.duration) * (1 - 2 ** -20);
          const shown = played.seek(t);
          for (let i = 0; i < TETRAHEDRON.length; i += 3) {
            const local: Vec3 = [TETRAHEDRON[i], TETRAHEDRON[i + 1], TETRAHEDRON[i + 2]];
            const atRest = scale(new Vector3(...local).applyMatrix4(rest).toArray() as Vec3, factor);
            const arm = rotate(modelRotation(flight, prop, t), subtract(atRest, prop.centerOfMass));
            const place = add(flight.centerOfMass(t), arm);
            greatest = Math.max(greatest, ...place.map(Math.abs));
            excess = Math.max(excess, distance(shown(local), place) - track.error);
          }
        }
        played.end();
        const used = track.error / toleranceOf(throwFile(factor, takes), prop);
        expect(used).toBeLessThanOrEqual(1);
        // Few keys: the tolerance is used.
        expect(used).toBeGreaterThan(0.8);
        // A player computes in float32 (IEEE 754): each of three matrices on the way may add as much.
        expect(excess, name).toBeLessThanOrEqual(3 * 2 ** -23 * greatest);
      }
    },
  );

  it("rests at the first key where there is one clip, as modelled where there are more", async () => {
    const { scene } = await new GLTFLoader().parseAsync(baked.files[0].content.slice().buffer, "");
    scene.updateMatrixWorld(true);
    const shown = new Vector3(0, 0, 1).applyMatrix4(scene.getObjectByName("prop")!.matrixWorld).toArray();
    const { prop } = baked.props.get("lamp")!;
    const { flight } = baked.throws[0].takes[0].take;
    const atRest = scale(new Vector3(0, 0, 1).applyMatrix4(rest).toArray() as Vec3, factor);
    const wanted =
      takes > 1
        ? atRest
        : add(
            flight.centerOfMass(0),
            rotate(modelRotation(flight, prop, 0), subtract(atRest, prop.centerOfMass)),
          );
    expect(distance(shown as Vec3, wanted)).toBeLessThan(takes > 1 ? 1e-12 : 0.001);
  });
});
