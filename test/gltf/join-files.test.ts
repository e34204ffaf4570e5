import { readFileSync } from "node:fs";
import { Document, type Node, NodeIO, type Texture } from "@gltf-transform/core";
import {
  ALL_EXTENSIONS,
  EXTMeshGPUInstancing,
  KHRLightsPunctual,
  KHRMaterialsClearcoat,
  KHRMaterialsVariants,
} from "@gltf-transform/extensions";
// @ts-expect-error it comes without types
import draco3d from "draco3dgltf";
// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { MeshoptDecoder } from "meshoptimizer/decoder";
import { describe, expect, it } from "vitest";
import type { Model } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { type Graft, spliceAllGlb, spliceGlb } from "../../src/gltf/splice.js";
import { dracoGlb, meshoptGlb, open } from "./compressed.js";

const io = new NodeIO().registerExtensions(ALL_EXTENSIONS).registerDependencies({
  "draco3d.decoder": await draco3d.createDecoderModule(),
  "meshopt.decoder": MeshoptDecoder,
});
const prop = (name: string) => readFileSync(new URL(`../data/props/${name}.glb`, import.meta.url));

/** Two textures, variants, lights, instances, a skin, a camera, a second scene: all that has numbers to be moved. */
function busyDocument(salt: number): Document {
  const document = new Document();
  const buffer = document.createBuffer();
  const array = (type: "VEC2" | "VEC3" | "VEC4" | "MAT4" | "SCALAR", values: Float32Array | Uint16Array) =>
    document.createAccessor().setType(type).setArray(values).setBuffer(buffer);
  const corners = Float32Array.from([0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1], (c) => c * salt);
  const image = (byte: number) =>
    document
      .createTexture(`image ${salt} ${byte}`)
      .setMimeType("image/png")
      .setImage(Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10, salt, byte]));
  const coat = document.createExtension(KHRMaterialsClearcoat).createClearcoat();
  const plain = document.createMaterial(`plain ${salt}`).setBaseColorTexture(image(1));
  const coated = document
    .createMaterial(`coated ${salt}`)
    .setNormalTexture(image(2))
    .setExtension("KHR_materials_clearcoat", coat.setClearcoatTexture(image(3)));
  const variants = document.createExtension(KHRMaterialsVariants);
  const list = variants.createMappingList().addMapping(
    variants
      .createMapping()
      .addVariant(variants.createVariant(`night ${salt}`))
      .setMaterial(coated),
  );
  const primitive = document
    .createPrimitive()
    .setAttribute("POSITION", array("VEC3", corners))
    .setAttribute("JOINTS_0", array("VEC4", new Uint16Array(16)))
    .setAttribute(
      "WEIGHTS_0",
      array(
        "VEC4",
        new Float32Array(16).map((_, i) => (i % 4 === 0 ? 1 : 0)),
      ),
    )
    .setAttribute("TEXCOORD_0", array("VEC2", Float32Array.from([0, 0, 1, 0, 0, 1, 1, 1])))
    .setIndices(array("SCALAR", Uint16Array.from([0, 2, 1, 0, 1, 3, 1, 2, 3, 0, 3, 2])))
    .setMaterial(plain)
    .setExtension("KHR_materials_variants", list);
  const joint = document.createNode(`joint ${salt}`);
  const skin = document
    .createSkin(`skin ${salt}`)
    .addJoint(joint)
    .setInverseBindMatrices(
      array("MAT4", Float32Array.from([1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, salt, 1])),
    );
  const mesh = document.createMesh(`mesh ${salt}`).addPrimitive(primitive);
  const batch = document
    .createExtension(EXTMeshGPUInstancing)
    .createInstancedMesh()
    .setAttribute("TRANSLATION", array("VEC3", Float32Array.from([0, 0, 0, salt, 0, 0])));
  const light = document.createExtension(KHRLightsPunctual).createLight(`light ${salt}`).setIntensity(salt);
  const nodes = [
    document.createNode(`skinned ${salt}`).setMesh(mesh).setSkin(skin),
    joint,
    document.createNode(`many ${salt}`).setMesh(mesh).setExtension("EXT_mesh_gpu_instancing", batch),
    document.createNode(`lit ${salt}`).setExtension("KHR_lights_punctual", light),
    document.createNode(`seen ${salt}`).setCamera(document.createCamera(`camera ${salt}`).setZNear(salt)),
  ];
  const scene = document.createScene(`scene ${salt}`);
  for (const node of nodes) scene.addChild(node);
  document.getRoot().setDefaultScene(scene);
  document.createScene(`spare ${salt}`).addChild(document.createNode(`spare ${salt}`));
  const sampler = document
    .createAnimationSampler()
    .setInput(array("SCALAR", Float32Array.from([0, 1])))
    .setOutput(array("VEC3", Float32Array.from([0, 0, 0, salt, salt, salt])));
  document
    .createAnimation(`own ${salt}`)
    .addSampler(sampler)
    .addChannel(
      document.createAnimationChannel().setTargetNode(joint).setTargetPath("translation").setSampler(sampler),
    );
  return document;
}

const graft = (name: string): Graft => ({
  nodes: [{ name, holdsScene: true }],
  clips: [
    {
      name: `${name}_01`,
      channels: [
        {
          target: { added: 0 },
          path: "translation",
          interpolation: "LINEAR",
          times: Float32Array.of(0, 1),
          values: Float32Array.of(0, 0, 0, name.length, 0, 0),
        },
      ],
    },
  ],
});

const pictured = (texture: Texture | null) => texture && [texture.getName(), ...texture.getImage()!];

/** What a general library reads of a node: everything it shows, by content. */
function told(node: Node): unknown {
  // biome-ignore lint/suspicious/noExplicitAny: extensions by their own interfaces
  const extension = (owner: any, name: string): any => owner.getExtension(name);
  const instances = extension(node, "EXT_mesh_gpu_instancing");
  const light = extension(node, "KHR_lights_punctual");
  return {
    name: node.getName(),
    children: node.listChildren().map((child) => child.getName()),
    matrix: node.getWorldMatrix(),
    camera: node.getCamera()?.getName(),
    light: light && [light.getName(), light.getIntensity()],
    instances: instances && [...instances.getAttribute("TRANSLATION").getArray()],
    skin: node.getSkin() && [
      node.getSkin()!.getName(),
      node
        .getSkin()!
        .listJoints()
        .map((joint) => joint.getName()),
      [...node.getSkin()!.getInverseBindMatrices()!.getArray()!],
    ],
    mesh: node
      .getMesh()
      ?.listPrimitives()
      .map((primitive) => ({
        indices: primitive.getIndices() && [...primitive.getIndices()!.getArray()!],
        attributes: primitive
          .listSemantics()
          .map((semantic) => [semantic, ...primitive.getAttribute(semantic)!.getArray()!]),
        material: primitive.getMaterial()?.getName(),
        base: pictured(primitive.getMaterial()?.getBaseColorTexture() ?? null),
        variants: extension(primitive, "KHR_materials_variants")
          ?.listMappings()
          // biome-ignore lint/suspicious/noExplicitAny: as above
          .map((mapping: any) => {
            const material = mapping.getMaterial();
            return [
              // biome-ignore lint/suspicious/noExplicitAny: as above
              mapping.listVariants().map((variant: any) => variant.getName()),
              material.getName(),
              pictured(material.getNormalTexture()),
              pictured(extension(material, "KHR_materials_clearcoat").getClearcoatTexture()),
            ];
          }),
      })),
  };
}

async function read(glb: Uint8Array) {
  const root = (await io.readBinary(glb)).getRoot();
  return {
    nodes: root.listNodes().map(told),
    clips: root.listAnimations().map((clip) => ({
      name: clip.getName(),
      channels: clip
        .listChannels()
        .map((channel) => [
          channel.getTargetNode()?.getName(),
          channel.getTargetPath(),
          ...channel.getSampler()!.getInput()!.getArray()!,
          ...channel.getSampler()!.getOutput()!.getArray()!,
        ]),
    })),
    roots: root
      .getDefaultScene()!
      .listChildren()
      .map((node) => node.getName()),
    scenes: root.listScenes().map((scene) => scene.getName()),
  };
}

async function parts(): Promise<[Model, Graft][]> {
  const glbs = {
    lamp: await io.writeBinary(busyDocument(2)),
    club: await meshoptGlb(await open(prop("club"))),
    buoy: await dracoGlb(await open(prop("club")), "EDGEBREAKER", 14),
    sign: await io.writeBinary(busyDocument(3)),
  };
  return Promise.all(
    Object.entries(glbs).map(
      async ([name, glb]): Promise<[Model, Graft]> => [await readModel(name, glb), graft(name)],
    ),
  );
}

describe("models in one file", () => {
  it("are each what they are alone, to a general library, one behind the other", async () => {
    const all = await parts();
    const joined = await read(spliceAllGlb(all));
    const alone = await Promise.all(all.map(([model, own]) => read(spliceGlb(model, own))));
    expect(joined.nodes).toEqual(alone.flatMap(({ nodes }) => nodes));
    expect(joined.clips).toEqual(alone.flatMap(({ clips }) => clips));
    expect(joined.roots).toEqual(["lamp", "club", "buoy", "sign"]);
    // the other models' default scenes are in the first's
    expect(joined.scenes).toEqual(["scene 2", "spare 2", "spare 3"]);
  });

  it("in any order are valid glTF", async () => {
    const all = await parts();
    for (const some of [all, all.toReversed(), [all[1], all[0]], [all[2], all[1]]]) {
      const { issues } = await validateBytes(spliceAllGlb(some), { maxIssues: 0 });
      const serious = issues.messages.filter(({ severity }: { severity: number }) => severity < 1);
      expect(serious.map(({ code }: { code: string }) => code)).toEqual([]);
    }
  });

  it("leave the first's text as it was, but for what grew", async () => {
    const all = await parts();
    const alone = new TextDecoder().decode(spliceGlb(...all[0]));
    const joined = new TextDecoder().decode(spliceAllGlb(all));
    const material = alone.slice(alone.indexOf('"materials"'), alone.indexOf('"coated 2"'));
    expect(material.length).toBeGreaterThan(50);
    expect(joined).toContain(material);
  });

  it("are refused where an extension may hold numbers that are not known, by its name", async () => {
    const [first, second] = await parts();
    const json = { ...second[0].json, extensionsUsed: ["KHR_animation_pointer"] };
    const odd: Model = { ...second[0], json, text: JSON.stringify(json) };
    expect(() => spliceAllGlb([first, [odd, second[1]]])).toThrow(/club: uses KHR_animation_pointer/);
  });
});
