// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { describe, expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import { readModel } from "../../src/gltf/read.js";
import { recordOf } from "../../src/record/record-of.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { jsonOf } from "./baked.js";

const text = (bake: string) => `
bake: ${bake}
props:
  stick: { shape: { box: [0.04, 0.3, 0.05] } }
  puck: { shape: { disc: { radius: 0.05, thickness: 0.02 } } }
throws:
  lob: { prop: stick, takes: 2, arrive: { at: [2, 1, 0.4], after: 0.8 }, spin: { axis: middle, turns: 1..2 } }
  flip: { prop: stick, arrive: { at: [1, 0, 0], after: 0.5 }, spin: { axis: short, turns: 1 } }
`;
const names = (files: { name: string }[]) => files.map(({ name }) => name);

async function baked(settings: string, source = text(settings)) {
  const file = parseThrowFile("some folder/quay.throws.yaml", source);
  const made = await bake(file, () => Promise.reject(new Error("no models here")));
  return { made, record: await recordOf(file, source, made) };
}

const clipNames = (json: { animations: { name: string }[] }) => names(json.animations);

describe("files", () => {
  it("per-throw: every throw's takes together", async () => {
    const { made, record } = await baked("{}");
    expect(names(made.files)).toEqual(["lob.glb", "flip.glb"]);
    expect(clipNames(jsonOf(made.files[0].content))).toEqual(["lob_01", "lob_02"]);
    expect(record.clips.map(({ file }) => file)).toEqual(["lob.glb", "lob.glb", "flip.glb"]);
  });

  it("per-take: each clip its own, resting at its first key", async () => {
    const { made, record } = await baked("{ files: per-take }");
    expect(names(made.files)).toEqual(["lob_01.glb", "lob_02.glb", "flip_01.glb"]);
    expect(record.clips.map(({ file }) => file)).toEqual(names(made.files));
    made.files.forEach(({ content }, i) => {
      const json = jsonOf(content);
      expect(clipNames(json)).toEqual([record.clips[i].name]);
      const { rotation } = record.clips[i].release;
      const rest = json.nodes[json.scenes[json.scene].nodes[0]].rotation;
      // float32 of the first key
      rotation.forEach((c, k) => {
        expect(Math.abs(rest[k] - c)).toBeLessThan(1e-7);
      });
    });
  });

  it("together: one, named after the throw file", async () => {
    const { made, record } = await baked("{ files: together }");
    expect(names(made.files)).toEqual(["quay.glb"]);
    expect(clipNames(jsonOf(made.files[0].content))).toEqual(["lob_01", "lob_02", "flip_01"]);
    expect(new Set(record.clips.map(({ file }) => file))).toEqual(new Set(["quay.glb"]));
  });

  it("together: a bake of some throws alone is refused", async () => {
    const file = parseThrowFile("quay.throws.yaml", text("{ files: together }"));
    await expect(bake(file, () => Promise.reject(), { only: ["lob"] })).rejects.toThrow(
      /only: one file holds the clips/,
    );
  });

  it.each(["glb", "gltf"])(
    "together, in a .%s: props side by side, each moved by its own clips",
    async (container) => {
      const two = text(`{ files: together, container: ${container} }`).replace(
        "flip: { prop: stick",
        "flip: { prop: puck",
      );
      const { made, record } = await baked("", two);
      expect(new Set(record.clips.map(({ file }) => file))).toEqual(new Set([`quay.${container}`]));
      const content = new Map(made.files.map((file) => [file.name, file.content]));
      const { json } = await readModel(
        "quay",
        content.get(`quay.${container}`)!,
        async (uri) => content.get(uri)!,
      );
      expect(json.scenes![json.scene!].nodes!.map((node) => json.nodes![node].name)).toEqual([
        "stick",
        "puck",
      ]);
      const moved = json.animations!.map(({ name, channels }) => [
        name,
        ...new Set(channels.map(({ target }) => json.nodes![target.node!].name)),
      ]);
      expect(moved).toEqual([
        ["lob_01", "stick"],
        ["lob_02", "stick"],
        ["flip_01", "puck"],
      ]);
      const report = await validateBytes(content.get(`quay.${container}`)!, {
        externalResourceFunction: async (uri: string) => content.get(uri)!,
      });
      expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual(
        [],
      );
    },
  );
});

describe("container: gltf", () => {
  it("is a .bin and a .gltf that reads back as the same model as the .glb", async () => {
    const { made } = await baked("{ container: gltf }");
    expect(names(made.files)).toEqual(["lob.bin", "lob.gltf", "flip.bin", "flip.gltf"]);
    const { made: glb } = await baked("{}");
    const binary = await readModel("lob.glb", glb.files[0].content);
    const content = new Map(made.files.map((file) => [file.name, file.content]));
    const asked: string[] = [];
    const gltf = await readModel("lob.gltf", content.get("lob.gltf")!, async (uri) => {
      asked.push(uri);
      return content.get(uri)!;
    });
    expect(asked).toEqual(["lob.bin"]);
    expect(gltf.buffers[0]).toEqual(binary.buffers[0].subarray(0, gltf.buffers[0].length));
    const { uri, ...buffer } = gltf.json.buffers![0];
    expect(uri).toBe("lob.bin");
    expect({ ...gltf.json, buffers: [buffer] }).toEqual(binary.json);
    const report = await validateBytes(content.get("lob.gltf")!, {
      externalResourceFunction: async (name: string) => content.get(name)!,
    });
    expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual([]);
  });
});

describe("mesh: false", () => {
  it.each(["{ mesh: false }", "{ mesh: false, layout: two-node, keys: cubic, container: gltf }"])(
    "%s leaves nodes and clips alone, with the same keys",
    async (settings) => {
      const { made, record } = await baked(settings);
      const { record: whole } = await baked(settings.replace("mesh: false", "mesh: true"));
      expect(record.clips).toEqual(whole.clips);
      const content = new Map(made.files.map((file) => [file.name, file.content]));
      const [name, file] = [...content].find(([name]) => /^lob\.gl/.test(name))!;
      const model = await readModel(name, file, async (uri) => content.get(uri)!);
      expect(Object.keys(model.json).sort()).toEqual(
        ["accessors", "animations", "asset", "bufferViews", "buffers", "nodes", "scene", "scenes"].sort(),
      );
      expect(model.json.nodes![model.json.scenes![0].nodes![0]].name).toBe("stick");
      const report = await validateBytes(file, {
        externalResourceFunction: async (uri: string) => content.get(uri)!,
      });
      expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual(
        [],
      );
    },
  );

  it("keeps the nodes of a model whose own node is the prop, by their indices", async () => {
    const { readFileSync } = await import("node:fs");
    const club = readFileSync(new URL("../data/props/club.glb", import.meta.url));
    const node = jsonOf(club).nodes.findIndex(({ mesh }: { mesh?: number }) => mesh !== undefined);
    const { name } = jsonOf(club).nodes[node];
    const file = parseThrowFile(
      "a.yaml",
      `{ bake: { mesh: false }, props: { club: { model: club.glb, node: "${name}" } }, throws: { lob: { prop: club, arrive: { at: [2, 1, 0.4], after: 1 } } } }`,
    );
    const made = await bake(file, async () => ({ model: await readModel("club.glb", club), sha256: "" }));
    const json = jsonOf(made.files[0].content);
    expect(names(json.nodes)).toEqual(names(jsonOf(club).nodes));
    expect(json.animations[0].channels[0].target.node).toBe(node);
    expect(json.meshes).toBeUndefined();
  });
});
