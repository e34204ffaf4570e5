import { describe, expect, it } from "vitest";
import { readModel } from "../../src/gltf/read.js";
import { angleBetween, rotate } from "../../src/math/quat.js";
import { add, distance, subtract, type Vec3 } from "../../src/math/vec3.js";
import { type ClipMotion, clipMotions, type LeftClip } from "../../src/review/clip-motion.js";
import { baked } from "../bake/baked.js";
import { bakeDemo } from "../players/demo.js";
import { three } from "../players/three.js";
import { Foreign, type ForeignKeys, HALF, NONE, QUARTER } from "./foreign.js";

async function motionsOf(glb: Uint8Array): Promise<Map<string, ClipMotion | LeftClip>> {
  const motions = await clipMotions(await readModel("foreign.glb", glb));
  return new Map(motions.map((motion) => [motion.name, motion]));
}

function drawn(motion: ClipMotion | LeftClip | undefined): ClipMotion {
  if (!motion || "reason" in motion) throw new Error(`passed over: ${motion?.reason}`);
  return motion;
}

const reasonOf = (motion: ClipMotion | LeftClip | undefined) =>
  motion && "reason" in motion ? motion.reason : "it is drawn";

/** Where a point of the piece is, m in the piece's own frame. */
function place({ motion, body }: ClipMotion, t: number, point: Vec3): Vec3 {
  const arm = subtract(point, body.prop.centerOfMass);
  return add(motion.centerOfMass(t), rotate(motion.rotation(t), arm));
}

const POINTS: Vec3[] = [
  [0, 0, 0],
  [0.3, 0, 0],
  [0, 0.2, 0],
  [0.1, -0.4, 0.5],
];
const SHARES = [0, 0.13, 0.31, 0.5, 0.77, 0.9];

/** A box in a node that stands turned, moved and twice as large in another. */
function inStand(...keys: ForeignKeys[]) {
  const foreign = new Foreign();
  const stand = foreign.node("stand").setTranslation([1, 2, 3]).setRotation([0.36, 0.48, 0, 0.8]);
  const thing = foreign.box(foreign.node("thing", stand.setScale([2, 2, 2])), [0, 0, 0], [0.2, 0.4, 0.1]);
  foreign.clip("go", [thing, ...keys]);
  return foreign;
}

const times = [0, 0.4, 1];
const SLIDE: ForeignKeys = { path: "translation", times, values: [0, 0, 0, 0, 1, 0, 2, 1, 0.5] };
const TURN: ForeignKeys = { path: "rotation", times, values: [...NONE, ...QUARTER, ...HALF] };
const SPLINED: ForeignKeys = {
  ...{ path: "rotation", times, interpolation: "CUBICSPLINE" },
  values: [
    0,
    0,
    0,
    0,
    ...NONE,
    1,
    0,
    0,
    0,
    0,
    0,
    0,
    0,
    ...QUARTER,
    0,
    1,
    0,
    0,
    0,
    0,
    0,
    0,
    ...HALF,
    0,
    0,
    0,
    0,
  ],
};
const SWUNG: ForeignKeys = {
  ...{ path: "translation", times, interpolation: "CUBICSPLINE" },
  values: [0, 0, 0, 0, 0, 0, 1, 0, 3, 2, 0, 0, 0, 1, 0, 0, 1, 0, 0, -2, 0, 2, 1, 0.5, 0, 0, 0],
};

// what three.js shows is the outside source here: its matrices of the node, to float32; it leaves rotations of 16 bits as long as they come
const KINDS: [string, ForeignKeys[]][] = [
  ["linear keys", [SLIDE, TURN]],
  [
    "steps",
    [
      { ...SLIDE, interpolation: "STEP" },
      { ...TURN, interpolation: "STEP" },
    ],
  ],
  ["cubic splines", [SWUNG, SPLINED]],
  ["a translation alone", [SLIDE]],
  ["a rotation alone", [TURN]],
  ["rotations of 16 bits", [SLIDE, { ...TURN, int16: true }]],
  ["sparse keys", [{ ...SLIDE, sparse: true }, TURN]],
  ["channels of unlike times", [SLIDE, { ...TURN, times: [0.2, 0.5, 0.8] }]],
];

describe("the motion of a clip that another program wrote", () => {
  for (const [kind, keys] of KINDS)
    it(`is as three.js plays it: ${kind}`, async () => {
      const glb = await inStand(...keys).glb();
      const clip = drawn((await motionsOf(glb)).get("go"));
      const played = (await three.open(glb)).play("go", "thing", false);
      for (const share of SHARES) {
        const shown = played.seek(clip.start + share * clip.motion.duration);
        // the piece is as large as it is in the scene: twice
        for (const [x, y, z] of POINTS)
          expect(
            distance(place(clip, share * clip.motion.duration, [2 * x, 2 * y, 2 * z]), shown([x, y, z])),
          ).toBeLessThan(kind.includes("16") ? 2e-5 : 2e-6);
      }
    });

  it("has the centre of mass of what moves, which is that of its box, twice as large", async () => {
    const { body } = drawn((await motionsOf(await inStand(SLIDE).glb())).get("go"));
    expect(distance(body.prop.centerOfMass, [0.2, 0.4, 0.1])).toBeLessThan(1e-7);
    // half the diagonal of 0.4 × 0.8 × 0.2 m
    expect(body.prop.reach).toBeCloseTo(Math.hypot(0.2, 0.4, 0.1), 6);
    expect(body.prop.name).toBe("thing");
  });

  it("begins with the first key", async () => {
    const later = [2.5, 3, 4];
    const glb = await inStand({ ...SLIDE, times: later }, { ...TURN, times: later }).glb();
    const clip = drawn((await motionsOf(glb)).get("go"));
    expect([clip.start, clip.motion.duration]).toEqual([2.5, 1.5]);
    const shown = (await three.open(glb)).play("go", "thing", false).seek(3.2);
    expect(distance(place(clip, 0.7, [0.2, 0, 0]), shown([0.1, 0, 0]))).toBeLessThan(2e-6);
  });

  it("is that of two nodes where one holds nothing but the other", async () => {
    const foreign = new Foreign();
    const outer = foreign.node("outer");
    const between = foreign.node("between", outer).setTranslation([0.1, 0, 0]).setRotation([0.6, 0, 0, 0.8]);
    const inner = foreign.box(foreign.node("inner", between), [0, 0, 0], [0.2, 0.4, 0.1]);
    foreign.clip("go", [outer, SLIDE], [inner, TURN]);
    const glb = await foreign.glb();
    const clip = drawn((await motionsOf(glb)).get("go"));
    const played = (await three.open(glb)).play("go", "inner", false);
    for (const t of SHARES) {
      const shown = played.seek(t);
      for (const point of POINTS) expect(distance(place(clip, t, point), shown(point))).toBeLessThan(1e-6);
    }
  });

  it("takes no heed of what stays as it is or shows nothing", async () => {
    const foreign = inStand();
    const [stand, thing] = foreign.document.getRoot().listNodes();
    const camera = foreign.node("camera").setCamera(foreign.document.createCamera());
    foreign.clip(
      "with idle channels",
      [thing, SLIDE, TURN, { path: "scale", times: [0, 1], values: [1, 1, 1, 1, 1, 1] }],
      [stand, { path: "scale", times: [0, 1], values: [2, 2, 2, 2, 2, 2] }],
      [stand, { path: "rotation", times: [0, 1], values: [0.36, 0.48, 0, 0.8, -0.36, -0.48, 0, -0.8] }],
      [camera, SLIDE],
    );
    const { motion } = drawn((await motionsOf(await foreign.glb())).get("with idle channels"));
    // slid by (2, 1, 0.5) and turned half round z about a centre at (0.1, 0.2, 0.05), all in the stand
    const moved = rotate([0.36, 0.48, 0, 0.8], [2 * (2 - 0.1), 2 * (1 - 0.2), 2 * (0.5 + 0.05)]);
    expect(distance(motion.centerOfMass(1), add([1, 2, 3], moved))).toBeLessThan(1e-6);
  });
});

describe("a clip that moves no one rigid piece is passed over, with the reason", () => {
  it("where it scales, or morphs", async () => {
    const foreign = inStand(SLIDE, { path: "scale", times: [0, 1], values: [1, 1, 1, 2, 2, 2] });
    expect(reasonOf((await motionsOf(await foreign.glb())).get("go"))).toBe('it scales "thing"');
    const morphing = inStand();
    const [, thing] = morphing.document.getRoot().listNodes();
    const [primitive] = thing.getMesh()!.listPrimitives();
    primitive.addTarget(
      morphing.document.createPrimitiveTarget().setAttribute("POSITION", primitive.getAttribute("POSITION")),
    );
    morphing.clip("melt", [thing, { path: "weights", times: [0, 1], values: [0, 1] }]);
    morphing.clip("slide", [thing, SLIDE, { path: "weights", times: [0, 1], values: [0, 0] }]);
    const motions = await motionsOf(await morphing.glb());
    expect(reasonOf(motions.get("melt"))).toBe('it morphs "thing"');
    expect(reasonOf(motions.get("slide"))).toBe("it is drawn");
  });

  it("where it moves a joint of a skin, but not where all of the skin moves", async () => {
    const foreign = new Foreign();
    const figure = foreign.node("figure");
    const arm = foreign.node("arm", figure);
    const body = foreign.box(foreign.node("body", figure), [0, 0, 0], [1, 1, 1]);
    body.setSkin(foreign.document.createSkin().addJoint(arm));
    foreign.clip("wave", [arm, TURN]);
    foreign.clip("flung", [figure, SLIDE, TURN]);
    const motions = await motionsOf(await foreign.glb());
    expect(reasonOf(motions.get("wave"))).toBe('it moves a part of the skinned "body"');
    expect(reasonOf(motions.get("flung"))).toBe("it is drawn");
  });

  it("where several pieces move, beside or within each other", async () => {
    const foreign = new Foreign();
    const left = foreign.box(foreign.node("left"), [0, 0, 0], [1, 1, 1]);
    const right = foreign.box(foreign.node("right"), [0, 0, 0], [1, 1, 1]);
    const lid = foreign.box(foreign.node("lid", left), [0, 1, 0], [1, 1.1, 1]);
    foreign.clip("both", [left, SLIDE], [right, SLIDE]);
    foreign.clip("opened", [left, SLIDE], [lid, TURN]);
    foreign.clip("lid", [lid, TURN]);
    foreign.clip("box and lid", [left, SLIDE]);
    const motions = await motionsOf(await foreign.glb());
    expect(reasonOf(motions.get("both"))).toBe(
      'it moves 2 nodes that are not one rigid piece ("left", "right")',
    );
    expect(reasonOf(motions.get("opened"))).toBe(
      'it moves 2 nodes that are not one rigid piece ("left", "lid")',
    );
    expect(reasonOf(motions.get("lid"))).toBe("it is drawn");
    expect(reasonOf(motions.get("box and lid"))).toBe("it is drawn");
  });

  it("where nothing is seen to move", async () => {
    const foreign = inStand();
    const [stand, thing] = foreign.document.getRoot().listNodes();
    const camera = foreign.node("camera").setCamera(foreign.document.createCamera());
    foreign.clip("pan", [camera, TURN]);
    foreign.clip("rest", [thing, { path: "rotation", times: [0, 1], values: [...NONE, ...NONE] }]);
    foreign.clip("posed", [stand, { path: "rotation", times: [0.5], values: QUARTER }]);
    const dust = foreign.box(foreign.node("dust"), [0, 0, 0], [1, 1, 1]);
    // points
    dust.getMesh()!.listPrimitives()[0].setMode(0).setIndices(null);
    foreign.clip("blown", [dust, SLIDE]);
    const motions = await motionsOf(await foreign.glb());
    expect(reasonOf(motions.get("pan"))).toBe("it moves nothing that has geometry");
    expect(reasonOf(motions.get("rest"))).toBe("it moves nothing that has geometry");
    expect(reasonOf(motions.get("posed"))).toBe("all its keys are at one time");
    expect(reasonOf(motions.get("blown"))).toBe("what it moves has no triangles to weigh");
  });

  it("where what is above is mirrored or drawn out", async () => {
    for (const scale of [
      [1, 1, 2],
      [-1, 1, 1],
    ] as [number, number, number][]) {
      const foreign = inStand(SLIDE);
      foreign.document.getRoot().listNodes()[0].setScale(scale);
      expect(reasonOf((await motionsOf(await foreign.glb())).get("go"))).toBe(
        'what is above "thing" scales it unevenly or mirrors it',
      );
    }
  });
});

describe("clips that tossbake baked", () => {
  it("of the demo follow their flights within their tolerance, and their centres of mass", async () => {
    const { files, moments, record, props } = await bakeDemo();
    let clips = 0;
    for (const { name, content } of files) {
      const motions = await motionsOf(content);
      expect(motions.size).toBe(record.clips.filter(({ file }) => file === name).length);
      for (const [clipName, read] of motions) {
        const clip = drawn(read);
        const { duration, prop: propName, tolerance } = record.clips.find(({ name }) => name === clipName)!;
        const { prop } = props.get(propName)!;
        const moment = moments.get(clipName)!;
        expect([clip.start, clip.motion.duration]).toEqual([0, Math.fround(duration)]);
        for (const share of SHARES) {
          const t = share * clip.motion.duration;
          const { flight, time } = moment(t);
          // twice: the centre itself is read of keys that are within the tolerance
          expect(distance(clip.motion.centerOfMass(t), flight.centerOfMass(time))).toBeLessThan(
            2 * tolerance,
          );
          const [x, y, z, w] = prop.principal.axes;
          const turned = flight.orientation(time);
          const back = [-x, -y, -z, w] as const;
          const model = multiplied(turned, back);
          if (!prop.node)
            expect(angleBetween(clip.motion.rotation(t), model) * prop.reach).toBeLessThan(2 * tolerance);
        }
        clips++;
      }
    }
    expect(clips).toBe(record.clips.length);
  }, 60_000);

  it("on two nodes, and turning alone, turn about the true centre of mass, not that of water", async () => {
    const text = (layout: string) => `
seed: layouts
bake: { layout: ${layout} }
props: { stick: { shape: { box: [0.04, 0.3, 0.05] }, weights: [{ at: [0, 0.12, 0], mass: 0.5 }] } }
throws:
  lob:
    prop: stick
    release: { at: [0, 1.4, 0] }
    arrive: { at: [2, 1, 0.4], after: 0.8 }
    spin: { axis: middle, turns: 2.5 }
`;
    for (const layout of ["one-node", "two-node", "turn-only"]) {
      const { glb, bake } = await baked(text(layout));
      const { motion } = drawn((await motionsOf(glb("lob"))).get("lob_01"));
      const { flight } = bake.throws[0].takes[0].take;
      const { prop } = bake.props.get("stick")!;
      // the weight is most of it: 12 cm from where the box alone balances, less 3 cm
      expect(prop.centerOfMass[1]).toBeGreaterThan(0.05);
      for (const t of [0, 0.2, 0.4, 0.799]) {
        const expected = layout === "turn-only" ? prop.centerOfMass : flight.centerOfMass(t);
        expect(distance(motion.centerOfMass(t), expected)).toBeLessThan(0.0015);
      }
    }
  });

  it("in a host's coordinates are weighed as any other's", async () => {
    const text = `
seed: hosted
host: { axes: [z, x, y], unit: 0.01 }
props: { stick: { shape: { box: [0.04, 0.3, 0.05] }, weights: [{ at: [0, 0.12, 0], mass: 0.5 }] } }
throws:
  lob: { prop: stick, release: { at: [0, 0, 140] }, arrive: { at: [40, 200, 100], after: 0.8 }, spin: { axis: middle, turns: 2 } }
`;
    const { body } = drawn((await motionsOf((await baked(text)).glb("lob"))).get("lob_01"));
    // the middle of the box
    expect(distance(body.prop.centerOfMass, [0, 0, 0])).toBeLessThan(1e-6);
  });
});

type Four = readonly [number, number, number, number];
const multiplied = (a: Four, b: Four): Four => [
  a[3] * b[0] + a[0] * b[3] + a[1] * b[2] - a[2] * b[1],
  a[3] * b[1] - a[0] * b[2] + a[1] * b[3] + a[2] * b[0],
  a[3] * b[2] + a[0] * b[1] - a[1] * b[0] + a[2] * b[3],
  a[3] * b[3] - a[0] * b[0] - a[1] * b[1] - a[2] * b[2],
];
