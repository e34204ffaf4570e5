import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { hostFrame } from "../../src/bake/host.js";
import { angleBetween, fromAxisAngle, rotate } from "../../src/math/quat.js";
import { cross, distance, length, type Vec3 } from "../../src/math/vec3.js";
import type { Host } from "../../src/throwfile/types.js";
import { between, direction, orientation } from "../aim/arbitrary.js";
import { baked, clipsOf, jsonOf } from "./baked.js";

/** All 48 ways of naming axes, half of them mirrored. */
const hosts = (): fc.Arbitrary<Host> =>
  fc
    .tuple(
      fc.shuffledSubarray(["x", "y", "z"], { minLength: 3 }),
      fc.array(fc.constantFrom("", "-"), { minLength: 3, maxLength: 3 }),
      fc.constantFrom(1, 0.01, 0.0254, 3),
    )
    .map(([letters, signs, unit]) => ({
      axes: letters.map((letter, i) => signs[i] + letter) as unknown as Host["axes"],
      unit,
    }));
const vectors = () => fc.tuple(between(-5, 5), between(-5, 5), between(-5, 5));
const near = (a: Vec3, b: Vec3) => expect(distance(a, b)).toBeLessThan(1e-12 * (1 + length(b)));

describe("an engine whose X, Y, Z are glTF's z, -x, y in centimetres: forward, right and up, left-handed", () => {
  const { fromWorld, toWorld } = hostFrame({ axes: ["z", "-x", "y"], unit: 0.01 });
  // worked by hand from glTF 2.0, 3.4: +Y up, +Z forward, -X right

  it("has a place 3 m ahead, 2 m up and 1 m to the left at [300, -100, 200]", () => {
    near(fromWorld.vector([1, 2, 3]), [300, -100, 200]);
    near(toWorld.vector([300, -100, 200]), [1, 2, 3]);
    expect(fromWorld.length(1.5)).toBe(150);
  });

  it("turns angular velocities the other way, as a mirror does", () => {
    // about up from forward to left in glTF is from X to -Y there, which about Z is negative
    near(fromWorld.angular([0, 3, 0]), [0, 0, -3]);
    const q = fromWorld.rotation(fromAxisAngle([0, 1, 0], 0.5));
    expect(angleBetween(q, fromAxisAngle([0, 0, 1], -0.5))).toBeLessThan(1e-15);
  });
});

describe("in every engine's coordinates", () => {
  it("there and back again is the same", () => {
    fc.assert(
      fc.property(hosts(), vectors(), orientation(), (host, v, q) => {
        const { fromWorld, toWorld } = hostFrame(host);
        near(toWorld.vector(fromWorld.vector(v)), v);
        near(toWorld.angular(fromWorld.angular(v)), v);
        expect(toWorld.length(fromWorld.length(2.5))).toBeCloseTo(2.5, 12);
        expect(angleBetween(toWorld.rotation(fromWorld.rotation(q)), q)).toBeLessThan(1e-14);
      }),
      { seed: 1 },
    );
  });

  it("to turn and then convert is to convert and then turn", () => {
    fc.assert(
      fc.property(hosts(), vectors(), orientation(), (host, v, q) => {
        const { fromWorld } = hostFrame(host);
        near(fromWorld.vector(rotate(q, v)), rotate(fromWorld.rotation(q), fromWorld.vector(v)));
      }),
      { seed: 2 },
    );
  });

  it("a point of a turning body moves with ω × r, and the body turns about ω", () => {
    fc.assert(
      fc.property(hosts(), vectors(), direction(), between(0.1, 3), (host, r, axis, rate) => {
        const { fromWorld } = hostFrame(host);
        const omega: Vec3 = [axis[0] * rate, axis[1] * rate, axis[2] * rate];
        near(fromWorld.vector(cross(omega, r)), cross(fromWorld.angular(omega), fromWorld.vector(r)));
        const turned = fromWorld.rotation(fromAxisAngle(omega, rate));
        expect(angleBetween(turned, fromAxisAngle(fromWorld.angular(omega), rate))).toBeLessThan(1e-14);
      }),
      { seed: 3 },
    );
  });

  it("without a host the numbers are glTF's", () => {
    const { fromWorld } = hostFrame();
    near(fromWorld.vector([1, 2, 3]), [1, 2, 3]);
    near(fromWorld.angular([1, 2, 3]), [1, 2, 3]);
  });
});

// One throw, once in glTF's numbers and once in those of an engine with X = z, Y = -x, Z = y and a unit of a quarter of a metre, so that
// every number is exact in both: [a, b, c] there is [-b, c, a] / 4 here.
const PROPS = `
props:
  mallet: { shape: { cone: { radius: 0.05, length: 0.3 } }, points: { grip: [0, -0.125, 0.03125] } }
`;
const GLTF = `${PROPS}
throws:
  aimed:
    prop: mallet
    takes: 3
    gravity: 8
    release: { at: [0.25, 1.5, 0], point: grip, facing: [[y, [0.5, 0, 1]], [z, [0, 1, 0]]], scatter: 10 }
    arrive: { at: [{ each: [0.5, 0.75, 1] }, 1, 3] }
    arc: { through: [0.25, 2, 1.5] }
    spin: { axis: left, turns: 1, wobble: 4 }
  fast:
    like: aimed
    gravity: null
    release: { facing: { rotation: [0.5, -0.5, 0.25, 1] } }
    arc: { through: null, speed: 8, branch: high }
  high:
    like: fast
    release: { facing: any }
    arc: { speed: null, branch: null, apex: 1.25 }
  slipped:
    prop: mallet
    release: { at: [0, 1, 0], point: grip, velocity: [0.5, 2, 4], angularVelocity: [1, -2, 3] }
    arrive: { after: 0.75 }
  headed:
    prop: mallet
    release: { at: [0, 1, 0], point: grip }
    arrive: { after: 0.75 }
    arc: { heading: 30, speed: 5, elevation: 40 }
    spin: { axis: ahead, rate: 2 }
`;
const ENGINE = `host: { axes: [z, -x, y], unit: 0.25 }
${PROPS}
throws:
  aimed:
    prop: mallet
    takes: 3
    gravity: 32
    release: { at: [0, -1, 6], point: grip, facing: [[y, [4, -2, 0]], [z, [0, 0, 4]]], scatter: 10 }
    arrive: { at: [12, { each: [-2, -3, -4] }, 4] }
    arc: { through: [6, -1, 8] }
    spin: { axis: left, turns: 1, wobble: 4 }
  fast:
    like: aimed
    gravity: null
    release: { facing: { rotation: [-0.25, 0.5, 0.5, 1] } }
    arc: { through: null, speed: 32, branch: high }
  high:
    like: fast
    release: { facing: any }
    arc: { speed: null, branch: null, apex: 5 }
  slipped:
    prop: mallet
    release: { at: [0, 0, 4], point: grip, velocity: [16, -2, 8], angularVelocity: [-3, 1, 2] }
    arrive: { after: 0.75 }
  headed:
    prop: mallet
    release: { at: [0, 0, 4], point: grip }
    arrive: { after: 0.75 }
    arc: { heading: 30, speed: 20, elevation: 40 }
    spin: { axis: ahead, rate: 2 }
`;

describe("a throw written in an engine's numbers", () => {
  const both = async () => [await baked(GLTF), await baked(ENGINE)];

  it("is the same glTF but for what the extras tell the engine", async () => {
    const [gltf, engine] = await both();
    for (const name of ["aimed", "fast", "high", "slipped", "headed"]) {
      const [a, b] = [clipsOf(gltf.glb(name)), clipsOf(engine.glb(name))];
      expect(Object.keys(a)).toEqual(Object.keys(b));
      for (const clip of Object.keys(a)) {
        expect(b[clip].translation).toEqual(a[clip].translation);
        expect(b[clip].rotation).toEqual(a[clip].rotation);
        expect(b[clip].extras.cues).toEqual(a[clip].extras.cues);
        expect(b[clip].extras.release).not.toEqual(a[clip].extras.release);
      }
      expect(jsonOf(engine.glb(name)).nodes).toEqual(jsonOf(gltf.glb(name)).nodes);
    }
  });

  it("is recorded in the engine's numbers, but for metres of tolerance and of the prop itself", async () => {
    const [gltf, engine] = await both();
    expect(engine.record.props).toEqual(gltf.record.props);
    gltf.record.clips.forEach((clip, i) => {
      const there = engine.record.clips[i];
      expect(there.apex.rise).toBeCloseTo(4 * clip.apex.rise, 12);
      expect([there.error, there.tolerance, there.turns]).toEqual([clip.error, clip.tolerance, clip.turns]);
      for (const end of ["release", "arrival"] as const) {
        const to = ([x, y, z]: Vec3): Vec3 => [4 * z, -4 * x, 4 * y];
        near(there[end].centerOfMass, to(clip[end].centerOfMass));
        near(there[end].velocity, to(clip[end].velocity));
        // a mirrored system: the axis converts, the sense turns round
        const [x, y, z] = clip[end].angularVelocity;
        near(there[end].angularVelocity, [-z, x, -y]);
        const [a, b, c, w] = clip[end].rotation;
        expect(angleBetween(there[end].rotation, [-c, a, -b, w])).toBeLessThan(1e-14);
      }
    });
  });
});
