import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import { readModelFile } from "../../src/node/model-files.js";
import { recordOf } from "../../src/record/record-of.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import type { FlownClip } from "../bake/baked.js";
import { requests } from "./requests.js";

/** What is expected is what the request itself says: the design of this program, no outside source. */
async function baked(request: keyof typeof requests) {
  const text = requests[request];
  const file = parseThrowFile("request.throws.yaml", text);
  const done = await bake(file, (path) => readModelFile(fileURLToPath(new URL(path, import.meta.url)), path));
  const clips = (await recordOf(file, text, done)).clips as FlownClip[];
  return { clips, first: clips[0], done };
}

const turned = ([x, y, z, w]: readonly number[], [a, b, c]: readonly number[]) => {
  // v + 2u×(u×v + wv), written out
  const t = [2 * (y * c - z * b), 2 * (z * a - x * c), 2 * (x * b - y * a)];
  return [
    a + w * t[0] + y * t[2] - z * t[1],
    b + w * t[1] + z * t[0] - x * t[2],
    c + w * t[2] + x * t[1] - y * t[0],
  ];
};

describe("a request as users make it", () => {
  it("the spike leaves along its flight and meets the mark with its tip", async () => {
    const { clips, done } = await baked(
      "a spike that sticks in the mast point first, straight along its flight at release",
    );
    const { points, centerOfMass } = done.props.get("spike")!.prop;
    for (const { release, miss } of clips) {
      const tip = points.tip.position.map((x, i) => x - centerOfMass[i]);
      const along = turned(release.rotation, tip);
      const cosine =
        along.reduce((sum, x, i) => sum + x * release.velocity[i], 0) /
        (Math.hypot(...along) * Math.hypot(...release.velocity));
      expect(cosine).toBeCloseTo(1, 9);
      expect(miss.position).toBeLessThan(1e-9);
    }
  });

  it("the token starts heads up, tails up, heads up", async () => {
    const { clips } = await baked("a token that shows heads in odd takes and tails in even ones");
    expect(clips.map((clip) => clip.draws["release.facing.0.1"])).toEqual([
      "up",
      "down",
      "up",
      "down",
      "up",
      "down",
    ]);
  });

  it("the pole of 200 centimetres is two metres long", async () => {
    const { done } = await baked("a prop modelled in centimetres");
    const { size, mass } = done.props.get("pole")!.prop;
    expect(size[1]).toBeCloseTo(2, 12);
    // volume of a cylinder, π r² l
    expect(mass).toBeCloseTo(650 * Math.PI * 0.03 * 0.03 * 2, 9);
  });

  it("the token starts where it stands", async () => {
    const { first, done } = await baked(
      "a prop that stands away from the origin in its model, thrown from where it stands",
    );
    done.props.get("token")!.prop.centerOfMass.forEach((x, i) => {
      expect(first.release.centerOfMass[i]).toBeCloseTo(x, 12);
    });
  });

  it("24 frames are a second", async () => {
    const { clips } = await baked("a clip of exactly 24 frames at 24 frames a second");
    expect(clips.map((clip) => clip.duration)).toEqual([1, 1, 1]);
  });

  it("the grip leaves as the hand moved", async () => {
    const { first, done } = await baked("the launch velocity of a hand that was recorded, held at the grip");
    const { points, centerOfMass } = done.props.get("spanner")!.prop;
    const arm = turned(
      first.release.rotation,
      points.grip.position.map((x, i) => x - centerOfMass[i]),
    );
    const [wx, wy, wz] = first.release.angularVelocity;
    // the velocity of a point of a rigid body, v + ω × r
    const grip = [wy * arm[2] - wz * arm[1], wz * arm[0] - wx * arm[2], wx * arm[1] - wy * arm[0]].map(
      (x, i) => x + first.release.velocity[i],
    );
    [0.3, 3.5, 2.8].forEach((x, i) => {
      expect(grip[i]).toBeCloseTo(x, 9);
    });
  });

  it("the oar's balance point passes at 2.6 m where it is abreast of the rail", async () => {
    const { clips } = await baked("over the rail and no higher than it has to be: through a point above it");
    for (const { release } of clips) {
      // x = x0 + v t, y = y0 + v t − g t²/2
      const t = (2 - release.centerOfMass[2]) / release.velocity[2];
      expect(release.centerOfMass[1] + release.velocity[1] * t - (9.80665 * t * t) / 2).toBeCloseTo(2.6, 9);
    }
  });

  it("backspin turns the other way", async () => {
    const { clips } = await baked("the same throw with backspin instead of topspin");
    const [top, back] = clips.map((clip) => clip.release.angularVelocity[0]);
    expect(top).toBeGreaterThan(0); // thrown along +z: left is +x
    expect(back).toBeCloseTo(-top, 9);
  });

  it("the hang takes 1.5 s and rises 2 m", async () => {
    const { first } = await baked(
      "a stylised hang: as high as two metres, a second and a half, however weak gravity has to be",
    );
    expect(first.duration).toBe(1.5);
    expect(first.apex.rise).toBeCloseTo(2, 12);
    // rise and fall of equal heights: g = 8 h / T²
    expect(first.release.velocity[1] * 2).toBeCloseTo(((8 * 2) / (1.5 * 1.5)) * 1.5, 9);
  });

  it("the engine gets its own numbers back", async () => {
    const { first } = await baked("numbers as an engine has them: Z up, left-handed, centimetres");
    expect(first.release.centerOfMass).toEqual([0, 0, 120]);
    [300, 20, 100].forEach((x, i) => {
      expect(first.arrival.centerOfMass[i]).toBeCloseTo(x, 9);
    });
  });

  it("no two of the fifty are alike", async () => {
    const { clips } = await baked("fifty tokens scattered from one hand, no two alike");
    for (const { nearest } of clips.slice(1)) expect(nearest!.distance).toBeGreaterThan(0.02);
  });

  it("the lob takes longer than the bullet, both leave at 7 m/s", async () => {
    const { clips } = await baked("a lob and a bullet to the same hand at the same speed");
    const [low, high] = clips;
    expect(high.duration).toBeGreaterThan(1.2 * low.duration);
    for (const { release } of clips) expect(Math.hypot(...release.velocity)).toBeCloseTo(7, 9);
  });
});
