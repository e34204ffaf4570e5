import { describe, expect, it } from "vitest";
import type { AimedArrival } from "../../src/aim/arrival.js";
import type { LoadedProp } from "../../src/bake/props.js";
import { throwWays } from "../../src/bake/ways.js";
import type { Flight } from "../../src/flight/flight.js";
import { firstTouch } from "../../src/flight/touch.js";
import { angleBetween, conjugate, multiply, type Quat, rotate } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";
import type { Prop } from "../../src/prop/prop.js";
import { propSupport } from "../../src/prop/support.js";
import type { ClipRecord } from "../../src/record/clip-record.js";
import { ThrowFileError } from "../../src/throwfile/errors.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { baked } from "./baked.js";

const G = 9.80665;
const throwing = (keys: string, top = "") => `
${top}
props:
  crate: { shape: { box: [0.3, 0.4, 0.6] }, points: { corner: [0.15, 0.2, 0.3] } }
  can: { shape: { cylinder: { radius: 0.1, length: 0.3 } } }
  quoit: { shape: { ring: { radius: 0.15, thickness: 0.03 } } }
  coin: { shape: { disc: { radius: 0.1, thickness: 0.01 } } }
  ball: { shape: { sphere: 0.1 } }
throws:
  drop:
${keys.replace(/^/gm, "    ")}
`;
const clips = async (keys: string, top = "") => (await baked(throwing(keys, top))).record.clips;

/** Heights of a box's corners, by hand. */
const corners = ({ arrival }: ClipRecord, [x, y, z]: Vec3): number[] =>
  [-1, 1].flatMap((i) =>
    [-1, 1].flatMap((j) =>
      [-1, 1].map(
        (k) =>
          (arrival.centerOfMass as Vec3)[1] +
          rotate(arrival.rotation as Quat, [(i * x) / 2, (j * y) / 2, (k * z) / 2])[1],
      ),
    ),
  );

/** The least height of a corner of the crate at a thousand moments. */
function lowestCorner(flight: Flight, { principal }: Prop): number {
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i <= 1000; i++) {
    const t = (flight.duration * i) / 1000;
    const rotation = multiply(flight.orientation(t), conjugate(principal.axes));
    const state = { arrival: { centerOfMass: flight.centerOfMass(t), rotation } };
    least = Math.min(least, ...corners(state as unknown as ClipRecord, [0.3, 0.4, 0.6]));
  }
  return least;
}

const THROW =
  "release: { at: [0, 1.2, 0], facing: any }\narc: { heading: -20..20, speed: 3..5, elevation: 20..60 }";

describe("a prop that is to rest on the floor", () => {
  it("lands flat on a side: four corners of the crate on it, the others a whole edge above", async () => {
    const found = await clips(
      `prop: crate\ntakes: 24\n${THROW}\narrive: { floor: 0.1, facing: rest }\nspin: { axis: any, rate: 0.3..1 }`,
    );
    expect(found).toHaveLength(24);
    const stood = new Set<string>();
    for (const clip of found) {
      const heights = corners(clip, [0.3, 0.4, 0.6]).sort((a, b) => a - b);
      for (const height of heights.slice(0, 4)) expect(Math.abs(height - 0.1)).toBeLessThan(1e-9);
      const tall = heights[7] - 0.1;
      const edge = [0.3, 0.4, 0.6].find((size) => Math.abs(size - tall) < 1e-9);
      expect(edge).toBeDefined();
      stood.add(`${edge}`);
      expect(clip.miss.position).toBeLessThan(1e-9);
      expect(clip.miss.angle).toBeLessThan(1e-9);
    }
    expect(stood.size).toBeGreaterThan(1);
  });

  it.each([
    ["can", 0.15],
    ["quoit", 0.015],
    ["coin", 0.005],
  ])("%s comes down on one of its two ends, half its height below its middle", async (prop, half) => {
    const found = await clips(
      `prop: ${prop}\ntakes: 12\n${THROW}\narrive: { floor: 0, facing: rest }\nspin: { axis: y, rate: 1..2 }`,
    );
    const ups = found.map(({ arrival }) => rotate(arrival.rotation as Quat, [0, 1, 0])[1]);
    for (const up of ups) expect(Math.abs(up)).toBeCloseTo(1, 12);
    expect(new Set(ups.map(Math.sign)).size).toBe(2);
    for (const { arrival } of found) expect((arrival.centerOfMass as Vec3)[1]).toBeCloseTo(half, 9);
  });

  it("takes as long as its centre of mass needs to fall to half its height", async () => {
    const [clip] = await clips(
      "prop: coin\nrelease: { at: [0, 1, 0], velocity: [0, 2, 1] }\narrive: { floor: 0, facing: rest }\nspin: { axis: z, rate: 1 }",
    );
    // 1 + 2 t − g t²/2 = 0.005 (quadratic formula)
    expect(clip.duration).toBeCloseTo((2 + Math.sqrt(4 + 2 * G * 0.995)) / G, 12);
  });

  it("has to have a side for it", async () => {
    expect(
      await refusal(
        "prop: ball\nrelease: { at: [0, 1, 0], velocity: [0, 2, 1] }\narrive: { floor: 0, facing: rest }",
      ),
    ).toMatch(/throws\.drop\.arrive\.facing: .*"ball" has no flat side to rest on/);
  });
});

describe("a pose at a first touch", () => {
  it("is there when the first point touches, and none before: 100 throws, poses, points and hands", async () => {
    const facings = [
      "any",
      "release",
      "[[x, up], [z, ahead]]",
      "[[corner, down]]",
      "[[y, flight], [x, left]]",
      "[[z, flight]]",
      "{ rotation: [1, 2, 3, 4] }",
      "rest",
    ];
    let count = 0;
    for (const [i, facing] of facings.entries())
      for (const hand of ["point: centerOfMass", "point: corner"]) {
        const launch =
          i % 2 === 0
            ? "arc: { heading: -20..20, speed: 3..5, elevation: 20..60 }"
            : "arc: { heading: 0, apex: 0.3..0.6, elevation: 50..70 }";
        const text = throwing(
          `prop: crate\ntakes: 7\nrelease: { at: [0, 1.4, 0], facing: any, ${hand} }\n${launch}\narrive: { floor: 0.05, facing: ${facing}${facing === "rest" ? "" : ", scatter: 0..5"} }\nspin: { axis: any, rate: 0.2..1 }`,
        );
        const { bake } = await baked(text);
        const { prop } = bake.props.get("crate") as LoadedProp;
        for (const { take } of bake.throws[0].takes) {
          count++;
          const support = propSupport(prop, { box: [0.3, 0.4, 0.6] });
          const body = { support, axes: prop.principal.axes, reach: prop.reach, flight: take.flight };
          const touch = firstTouch(body, { normal: [0, 1, 0], offset: 0.05 });
          expect(Math.abs((touch ?? take.flight.duration) - take.flight.duration)).toBeLessThan(1e-9);
          expect(Math.abs(take.gap as number)).toBeLessThan(1e-9);
          expect(lowestCorner(take.flight, prop)).toBeGreaterThan(0.05 - 1e-9);
          const { turn, missAngle } = take.aimed as AimedArrival;
          expect(missAngle).toBeLessThan(1e-9);
          expect(angleBetween(turn.end, take.flight.orientation(take.flight.duration))).toBeLessThan(1e-9);
        }
      }
    expect(count).toBeGreaterThan(100);
  });

  it("is got on the next way where the one nearest the wish would touch with an edge before, and that is told", async () => {
    const { bake } = await baked(
      throwing(
        "prop: crate\ntakes: 20\nvary: chance\nrelease: { at: [0, 1, 0], facing: any }\narc: { heading: 0, speed: 3, elevation: 30 }\narrive: { floor: 0, facing: [[y, up], [z, ahead]] }\nspin: { axis: any, rate: 3 }",
      ),
    );
    const { prop } = bake.props.get("crate") as LoadedProp;
    const told = bake.throws[0].takes.map(({ take }) => {
      expect(take.candidate).toBe(1);
      expect(lowestCorner(take.flight, prop)).toBeGreaterThan(-1e-9);
      return (take.aimed as AimedArrival).warnings.some((text) => /an edge would touch/.test(text));
    });
    expect(new Set(told).size).toBe(2);
  });

  it("goes with a hand's own velocity off the centre of mass", async () => {
    const found = await clips(
      "prop: crate\ntakes: 4\nrelease: { at: [0, 1.5, 0], point: corner, velocity: [1, 2..3, 3], facing: any }\narrive: { floor: 0, facing: [[y, up], [z, flight]] }\nspin: { axis: x, rate: 0.5 }",
    );
    for (const clip of found) {
      const heights = corners(clip, [0.3, 0.4, 0.6]).sort((a, b) => a - b);
      for (const height of heights.slice(0, 4)) expect(Math.abs(height)).toBeLessThan(1e-9);
    }
  });

  it("counts in the host's unit and along glTF's up", async () => {
    const [clip] = await clips(
      "prop: coin\nrelease: { at: [0, -100, 0], velocity: [100, -200, 0] }\narrive: { floor: 0, facing: rest }\nspin: { axis: z, rate: 1 }",
      "host: { axes: [z, -y, x], unit: 0.01 }",
    );
    expect(clip.duration).toBeCloseTo((2 + Math.sqrt(4 + 2 * G * 0.995)) / G, 12);
  });

  it.each([
    [
      "where an edge would touch before",
      "prop: crate\nrelease: { at: [0, 0.9, 0], velocity: [0, 0.2, 1], facing: [[x, up]] }\narrive: { floor: 0.6, facing: [[y, up], [z, ahead]] }\nspin: { axis: x, rate: 9 }",
      /throws\.drop\.arrive\.facing: an edge would touch the floor [\d.e-]+ s before .*; needs a slower/,
    ],
    [
      "where it never stands so high",
      "prop: crate\nrelease: { at: [0, 1, 0], velocity: [0, 1, 1] }\narrive: { floor: 1, facing: [[z, up]] }",
      /throws\.drop\.arrive\.floor: in the pose of arrive\.facing the prop never stands so high: it lacks 0\.249 m/,
    ],
    [
      "where nothing brings it down",
      "prop: crate\ngravity: 0\nrelease: { at: [0, 1, 0], velocity: [0, 1, 1] }\narrive: { floor: 0, facing: [[z, up]] }",
      /arrive\.floor: the prop never comes down to the floor/,
    ],
    [
      "with a count of turns",
      "prop: crate\nrelease: { at: [0, 1, 0], velocity: [0, 1, 1] }\narrive: { floor: 0, facing: [[z, up]] }\nspin: { turns: 1 }",
      /use spin\.rate/,
    ],
    [
      "to rest where there is no floor",
      "prop: crate\nrelease: { at: [0, 1, 0], velocity: [0, 1, 1] }\narrive: { after: 1, facing: rest }",
      /rest needs a floor/,
    ],
    [
      "to rest scattered",
      "prop: crate\nrelease: { at: [0, 1, 0], velocity: [0, 1, 1] }\narrive: { floor: 0, facing: rest, scatter: 3 }",
      /what rests is not scattered/,
    ],
  ])("is refused %s", async (_, keys, message) => {
    expect(await refusal(keys)).toMatch(message);
  });
});

it("the ways to a pose on a floor come with a rate to write, which gets them", async () => {
  const text = (spin: string) =>
    throwing(
      `prop: crate\nrelease: { at: [0, 1.2, 0], velocity: [0, 3, 2], facing: [[z, up]] }\narrive: { floor: 0, facing: [[y, up], [x, ahead]] }\nspin: ${spin}`,
    );
  const source = () => Promise.reject(new Error("no model here"));
  const [{ ways }] = await throwWays(parseThrowFile("t", text("{ axis: x, rate: 1 }")), source, "drop");
  const others = ways.filter(({ spin, taken }) => spin && !taken);
  expect(others.length).toBeGreaterThan(2);
  for (const { spin, turns } of others) {
    expect(spin).not.toHaveProperty("turns");
    const [clip] = (await baked(text(JSON.stringify(spin)))).record.clips;
    expect(clip.turns).toBeCloseTo(turns, 6);
  }
});

async function refusal(keys: string): Promise<string> {
  const error = await baked(throwing(keys)).catch((thrown) => thrown);
  expect(error).toBeInstanceOf(ThrowFileError);
  return (error as ThrowFileError).message;
}
