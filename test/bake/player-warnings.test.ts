import { describe, expect, it } from "vitest";
import { tetrahedron } from "../gltf/models.js";
import { baked } from "./baked.js";

const text = (
  name: string,
  rate: number,
  prop = "shape: { sphere: 0.1 }",
  settings = "{}",
  propName = "ball",
) => `
bake: ${settings}
props: { ${propName}: { ${prop} } }
throws:
  ${name}: { prop: ${propName}, takes: 2, arrive: { at: [2, 1, 0.4], after: 0.8 }, spin: { axis: x, rate: ${rate} } }
`;

const model = (name: string) => ({
  "a.glb": tetrahedron((json) => {
    json.nodes = [{ name, mesh: 0 }];
  }),
});

const warnings = async (...args: Parameters<typeof baked>) => (await baked(...args)).bake.warnings;

describe("players are warned of", () => {
  it("a spin of more than 180° in 1/30 s, which is 15 turns a second", async () => {
    expect(await warnings(text("spin", 14.9))).toEqual([]);
    const [line, ...others] = await warnings(text("spin", 15.1));
    expect(others).toEqual([]);
    expect(line).toMatch(/^2 takes of spin turn up to 15\.1 times a second/);
  });

  it.each(["my-loop", "Cycle9"])("a clip named %s", async (name) => {
    expect(await warnings(text(name, 1))).toEqual([
      expect.stringMatching(/one importer takes that for a flag/),
    ]);
  });

  it("a node of the model named as the prop's own", async () => {
    const same = text("lob", 1, "model: a.glb", "{}", "crate");
    expect(await warnings(same, model("crate"))).toEqual([
      expect.stringMatching(/^a\.glb has a node "crate" already/),
    ]);
    expect(await warnings(same, model("crate-turning"))).toEqual([]);
    const two = text("lob", 1, "model: a.glb", "{ layout: two-node }", "crate");
    expect(await warnings(two, model("crate-turning"))).toHaveLength(1);
  });

  it.each(["a.b", "a b", "a:b", "a/b", "a[0]"])("a moved node named %s", async (name) => {
    const moved = text("lob", 1, `model: a.glb, node: "${name}"`, "{}", "crate");
    expect(await warnings(moved, model(name))).toEqual([expect.stringMatching(/one loader rewrites it/)]);
    expect(await warnings(moved.replace(`"${name}"`, "plain"), model("plain"))).toEqual([]);
  });
});
