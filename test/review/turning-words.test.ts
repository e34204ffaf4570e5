// What a turning is called is common practice of jugglers and mechanics, no source; which way it goes round follows from the right-hand rule.
import { describe, expect, test } from "vitest";
import { motionOf, type TakeMotion } from "../../src/bake/take-motion.js";
import type { Launch } from "../../src/flight/launch.js";
import { fromAxisAngle, type Quat } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { type Prop, weigh } from "../../src/prop/prop.js";
import type { Shape } from "../../src/prop/shape.js";
import { stretchesOf } from "../../src/review/course.js";
import { turningOf } from "../../src/review/picked-axis.js";
import { turningPhrase } from "../../src/review/turning-words.js";

const AHEAD: Vec3 = [0, 0, 1];
const BOARD: Shape = { box: [0.3, 0.02, 0.1] };
const DISC: Shape = { disc: { radius: 0.1, thickness: 0.005 } };
const PIN: Shape = { cylinder: { radius: 0.01, length: 0.3 } };

/** A second of flight along +Z; the model's rotation at the start, and its angular velocity there in the world, turns a second. */
async function phrase(shape: Shape, facing: Quat, turning: Vec3): Promise<string> {
  const prop = await weigh("thing", shape, {});
  const { axes, moments } = prop.principal;
  const orientation = product(facing, axes);
  const launch: Launch = {
    centerOfMass: [0, 1, 0],
    velocity: [0, 1, 6],
    gravity: [0, -9.80665, 0],
    orientation,
    spin: turnedBack(orientation, turning.map((rate) => rate * 2 * Math.PI) as unknown as Vec3),
    moments,
    duration: 1,
  };
  return turningPhraseOf(prop, launch);
}

function turningPhraseOf(prop: Prop, launch: Launch): string {
  const centre = { point: "centerOfMass", offset: [0, 0, 0] as const };
  const take: TakeMotion = {
    name: "thing_1",
    throw: "thing",
    take: 1,
    prop: "thing",
    duration: 1,
    parts: [
      {
        throw: "thing",
        start: 0,
        launch,
        turnsAlone: false,
        apex: 0.1,
        turns: [],
        release: centre,
        arrival: centre,
        boxes: [],
      },
    ],
  };
  const sheetTake = { name: "thing_1", take, motion: motionOf(take, prop.principal.axes) };
  const [stretch] = stretchesOf(sheetTake);
  // its surface is not looked at
  const shown = {
    name: "thing",
    axes: prop.principal.axes,
    centerOfMass: prop.centerOfMass,
    reach: prop.reach,
  };
  const turning = turningOf({ ...shown, solid: undefined as never }, sheetTake, stretch);
  return turningPhrase(turning, stretch.turns, AHEAD, launch.velocity);
}

// Hamilton's products, written out here
const product = (a: Quat, b: Quat): Quat => [
  a[3] * b[0] + a[0] * b[3] + a[1] * b[2] - a[2] * b[1],
  a[3] * b[1] - a[0] * b[2] + a[1] * b[3] + a[2] * b[0],
  a[3] * b[2] + a[0] * b[1] - a[1] * b[0] + a[2] * b[3],
  a[3] * b[3] - a[0] * b[0] - a[1] * b[1] - a[2] * b[2],
];
function turnedBack(q: Quat, v: Vec3): Vec3 {
  const back: Quat = [-q[0], -q[1], -q[2], q[3]];
  const [x, y, z] = product(product(back, [...v, 0]), q);
  return [x, y, z];
}

const AS_MODELLED: Quat = [0, 0, 0, 1];
const UPRIGHT = fromAxisAngle([1, 0, 0], Math.PI / 2);

describe("what a turning is called", () => {
  test.each<[string, Shape, Quat, Vec3, string]>([
    [
      "a board turned flat",
      BOARD,
      AS_MODELLED,
      [0, 2, 0],
      "spins flat, anticlockwise seen from above, 2\u00a0turns about its short axis, steadily",
    ],
    [
      "the other way round",
      BOARD,
      AS_MODELLED,
      [0, -2, 0],
      "spins flat, clockwise seen from above, 2\u00a0turns about its short axis, steadily",
    ],
    [
      "a pin with topspin",
      PIN,
      UPRIGHT,
      [1.5, 0, 0],
      "turns end over end forwards, 1.5\u00a0turns about its middle axis, steadily",
    ],
    [
      "a pin with backspin",
      PIN,
      UPRIGHT,
      [-1.5, 0, 0],
      "turns end over end backwards, 1.5\u00a0turns about its middle axis, steadily",
    ],
    [
      "a pin about its length, point first",
      PIN,
      UPRIGHT,
      [0, 0, 3],
      "spins like a drill, 3\u00a0turns about its long axis, steadily",
    ],
    [
      "a disc flipped",
      DISC,
      AS_MODELLED,
      [-4, 0, 0],
      "flips over and over backwards, 4\u00a0turns, steadily",
    ],
    ["nothing", DISC, AS_MODELLED, [0, 0, 0], "does not turn"],
    [
      "a quarter turn",
      BOARD,
      AS_MODELLED,
      [0, 0.25, 0],
      "spins flat, anticlockwise seen from above, 90° about its short axis, steadily",
    ],
  ])("%s", async (_, shape, facing, turning, expected) => {
    expect(await phrase(shape, facing, turning)).toBe(expected);
  });

  test("a disc spun a little aslant wobbles by that angle", async () => {
    // angular velocity 10° off the axis: of a thin disc, whose moments are 1 : 2 (Beer & Johnston, Vector Mechanics), the momentum is atan(tan 10° / 2) = 5.04° off
    const tilt = (10 * Math.PI) / 180;
    const said = await phrase(DISC, AS_MODELLED, [3 * Math.sin(tilt), 3 * Math.cos(tilt), 0]);
    expect(said).toMatch(/^spins flat.*, with a wobble of up to 5°$/);
  });

  test("a board spun about its middle axis, but for a little, tumbles", async () => {
    expect(await phrase(BOARD, AS_MODELLED, [0.02, 0.02, 3])).toMatch(
      /^tumbles.* about its middle axis, which turns over on the way$/,
    );
  });
});
