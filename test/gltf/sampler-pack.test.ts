import { describe, expect, it } from "vitest";
import { SamplerPack } from "../../src/gltf/sampler-pack.js";

const clip = (name: string, end: number) => {
  const times = Float32Array.of(0, end / 2, end);
  return {
    name,
    channels: (["translation", "rotation"] as const).map((path) => ({
      target: { added: 0 },
      path,
      interpolation: "LINEAR" as const,
      times,
      values: new Float32Array(path === "rotation" ? 12 : 9).fill(path.length + end),
    })),
  };
};

describe("the JSON of clips", () => {
  it("states bounds as the shortest number of the same float32", () => {
    const pack = new SamplerPack(0, 0);
    pack.animation(clip("a", 0.94), () => 0);
    // glTF 2.0, 3.6.2.5: bounds are of the accessor's own type, so 0.94 is float32's 0.9399999976158142 (IEEE 754).
    expect(JSON.stringify(pack.accessors[0].max)).toBe("[0.94]");
    expect(Math.fround(pack.accessors[0].max![0])).toBe(Math.fround(0.94));
  });

  it("says nothing of linear interpolation, which is what readers take, and shares times", () => {
    const pack = new SamplerPack(0, 0);
    const made = ["a", "b"].map((name) => pack.animation(clip(name, 0.94), () => 0));
    // glTF 2.0, 5.6: animation.sampler.interpolation is LINEAR by default.
    expect(made[0].samplers).toEqual([
      { input: 0, output: 1 },
      { input: 0, output: 2 },
    ]);
    expect(made[1].samplers).toEqual(made[0].samplers);
    expect(pack.accessors).toHaveLength(3);
  });
});
