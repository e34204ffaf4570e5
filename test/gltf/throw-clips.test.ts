import { Document, WebIO } from "@gltf-transform/core";
import { describe, expect, it } from "vitest";
import { ModelError } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { spliceGlb } from "../../src/gltf/splice.js";
import { throwClips } from "../../src/gltf/throw-clips.js";
import { graft, tetrahedron } from "./models.js";

/** What a document plays: clip by clip, each channel's target, path, interpolation, times and values. */
const clipsOf = (document: Document) =>
  document
    .getRoot()
    .listAnimations()
    .map((animation) => ({
      name: animation.getName(),
      extras: animation.getExtras(),
      channels: animation.listChannels().map((channel) => ({
        node: channel.getTargetNode()!.getName(),
        path: channel.getTargetPath(),
        interpolation: channel.getSampler()!.getInterpolation(),
        times: [...channel.getSampler()!.getInput()!.getArray()!],
        values: [...channel.getSampler()!.getOutput()!.getArray()!],
      })),
    }));

const scenesOf = (document: Document) =>
  document
    .getRoot()
    .listScenes()
    .map((scene) =>
      scene
        .listChildren()
        .map((node) => [node.getName(), node.listChildren().map((child) => child.getName())]),
    );

const twoScenes = tetrahedron((json) => {
  json.nodes.push({ name: "post" });
  json.scenes = [{ nodes: [0, 1] }, { nodes: [1] }];
});

describe("throwClips", () => {
  it("makes of a document what the splice makes of its file", async () => {
    const io = new WebIO();
    const spliced = await io.readBinary(spliceGlb(await readModel("m", twoScenes), graft()));
    const document = await io.readBinary(twoScenes);
    await document.transform(throwClips(graft()));
    const written = await io.readBinary(await io.writeBinary(document));
    expect(clipsOf(written)).toEqual(clipsOf(spliced));
    expect(clipsOf(written)).toHaveLength(2);
    expect(scenesOf(written)).toEqual(scenesOf(spliced));
    expect(scenesOf(written)).toEqual([[["spanner", ["solid", "post"]]], [["spanner", ["solid", "post"]]]]);
    expect((await io.writeJSON(document)).json.asset.generator).toBe("tossbake");
    expect(written.getRoot().listAccessors()).toHaveLength(spliced.getRoot().listAccessors().length);
  });

  it("builds a scene in an empty document", async () => {
    const document = new Document();
    await document.transform(throwClips(graft()));
    expect(scenesOf(document)).toEqual([[["spanner", []]]]);
    const bytes = await new WebIO().writeBinary(document);
    expect(clipsOf(await new WebIO().readBinary(bytes))).toEqual(clipsOf(document));
  });

  it("moves a node of the document's own", async () => {
    const document = await new WebIO().readBinary(tetrahedron());
    const moved = graft();
    moved.nodes = [];
    for (const { channels } of moved.clips) for (const channel of channels) channel.target = { node: 0 };
    await document.transform(throwClips(moved));
    expect(clipsOf(document)[0].channels.map(({ node }) => node)).toEqual(["solid", "solid"]);
    expect(scenesOf(document)).toEqual([[["solid", []]]]);
  });

  it("takes int16 rotations, and copies of the arrays it is given", async () => {
    const document = new Document();
    const packed = graft();
    const turn = new Int16Array([0, 0, 0, 32767, 0, 23170, 0, 23170, 0, 32767, 0, 0]);
    packed.clips[0].channels[1].values = turn;
    await document.transform(throwClips(packed));
    turn.fill(1);
    const output = document.getRoot().listAnimations()[0].listSamplers()[1].getOutput()!;
    // 32767 stands for 1 (glTF 2.0, 3.11).
    expect(output.getElement(0, [])).toEqual([0, 0, 0, 1]);
  });

  it("refuses a clip whose name is taken", async () => {
    const document = new Document();
    document.createAnimation("lob_01");
    await expect(document.transform(throwClips(graft()))).rejects.toThrow(ModelError);
  });
});
