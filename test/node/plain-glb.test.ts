import { readFileSync } from "node:fs";
import { NodeIO } from "@gltf-transform/core";
import { describe, expect, it } from "vitest";
import { splitGlb } from "../../src/gltf/glb.js";
import { plainGlb } from "../../src/node/plain-glb.js";
import { dracoGlb, lossyMeshoptGlb, meshoptGlb, open } from "../gltf/compressed.js";

const SPANNER = new URL("../../assets/props/spanner.glb", import.meta.url);
const spanner = () => new Uint8Array(readFileSync(SPANNER));

const jsonOf = (glb: Uint8Array) => JSON.parse(new TextDecoder().decode(splitGlb("", glb).json));
/** Places of the first mesh's vertices, in their order, as any reader without decoders sees them. */
async function placesOf(glb: Uint8Array): Promise<number[]> {
  const document = await new NodeIO().readBinary(glb);
  const [mesh] = document.getRoot().listMeshes();
  const position = mesh.listPrimitives()[0].getAttribute("POSITION");
  return Array.from(
    { length: position?.getCount() ?? 0 },
    (_, i) => position?.getElement(i, []) ?? [],
  ).flat();
}
const extent = (places: readonly number[], axis: number): number => {
  const along = places.filter((_, i) => i % 3 === axis);
  return Math.max(...along) - Math.min(...along);
};

describe("a model for the page", () => {
  it("is the same bytes where nothing is compressed", async () => {
    const glb = spanner();
    expect(await plainGlb(glb)).toBe(glb);
  });

  it.each([
    ["meshopt", async () => meshoptGlb(await open(spanner()))],
    ["Draco", async () => dracoGlb(await open(spanner()), "EDGEBREAKER", 14)],
  ])("is unpacked from %s, and no reader needs a decoder", async (_, packed) => {
    const plain = await plainGlb(await packed());
    expect(jsonOf(plain).extensionsRequired ?? []).toEqual([]);
    const [before, after] = [await placesOf(spanner()), await placesOf(plain)];
    for (const axis of [0, 1, 2]) expect(extent(after, axis)).toBeCloseTo(extent(before, axis), 4);
    expect(
      jsonOf(plain)
        .nodes.map((node: { name: string }) => node.name)
        .sort(),
    ).toEqual(
      jsonOf(spanner())
        .nodes.map((node: { name: string }) => node.name)
        .sort(),
    );
  });

  it("is unpacked under the extension's ratified name too", async () => {
    const packed = await lossyMeshoptGlb(await open(spanner()));
    const { json, ...chunks } = splitGlb("", packed);
    const text = new TextDecoder().decode(json).replaceAll("EXT_meshopt", "KHR_meshopt");
    const { joinGlb } = await import("../../src/gltf/glb.js");
    const plain = await plainGlb(joinGlb({ ...chunks, json: new TextEncoder().encode(text) }));
    expect(JSON.stringify(jsonOf(plain))).not.toContain("meshopt");
  });

  it("stays as it is where it cannot be unpacked", async () => {
    const packed = await meshoptGlb(await open(spanner()));
    const broken = packed.slice();
    broken.fill(255, packed.length - 4000);
    expect(await plainGlb(broken)).toBe(broken);
  });
});
