import { describe, expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import { recordOf } from "../../src/record/record-of.js";
import { pageData, shownFile } from "../../src/review/page-data.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";

const text = (takes: string, settings = "") => `seed: page
bake: { ${settings} }
props: { lid: { shape: { disc: { radius: 0.1, thickness: 0.01 } } } }
throws:
  skim:
    prop: lid
    takes: ${takes}
    release: { at: [0, 1, 0] }
    arrive: { at: [0.5, 0.8, 4], after: 0.6..0.7 }
    spin: { axis: short, rate: 2 ± 0.2, wobble: { pick: [3, 5] } }
`;
const noModels = () => Promise.reject(new Error("no model is named"));

async function dataOf(source: string) {
  const file = parseThrowFile("yard/page.throws.yaml", source);
  const shown = shownFile(file);
  const baked = await bake(shown, noModels);
  return { data: pageData(file, baked, await recordOf(shown, source, baked)), baked };
}

describe("what the page is told", () => {
  it("has one .glb for each throw, and records that name the files of the throw file's own", async () => {
    const { data, baked } = await dataOf(text("2", "files: per-take, container: gltf, mesh: false"));
    expect(baked.files.map(({ name }) => name)).toEqual(["skim.glb"]);
    const [{ takes }] = data.throws;
    expect(takes.map(({ file, clip }) => [file, clip])).toEqual([
      ["skim.glb", "skim_01"],
      ["skim.glb", "skim_02"],
    ]);
    expect(takes.map(({ record }) => record.file)).toEqual(["skim_01.gltf", "skim_02.gltf"]);
  });

  it("says the spin as it is written", async () => {
    const { data } = await dataOf(text("1"));
    expect(data.throws[0].spin).toEqual({ axis: "short", rate: "2 ± 0.2", wobble: "any of 3, 5" });
  });

  it("is the same of a take whichever takes are shown", async () => {
    const [few, one] = [await dataOf(text("3")), await dataOf(text("[3]"))];
    expect(one.data.throws[0].takes[0].motion).toEqual(few.data.throws[0].takes[2].motion);
  });

  it("has the first 500 of very many takes, and says so", async () => {
    const { data } = await dataOf(text("600"));
    const [{ takes, unheld }] = data.throws;
    expect(takes).toHaveLength(500);
    expect(unheld).toEqual([
      { name: "skim_501 and those after it", reason: "a page shows the first 500 takes of a throw" },
    ]);
  });
});
