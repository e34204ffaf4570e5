/** A prop seen along its three principal axes, in one true scale. */

import { fromMatrix, rotate } from "../math/quat.js";
import { cross } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import { at, type Drawing } from "./drawing.js";
import { outlineOf, type Solid } from "./outline.js";
import { drawView, LEAST_WIDE, type Picture, ROOM, type Side } from "./principal-view.js";
import { type Spot, spotsNear } from "./spots.js";

/** The second stands below the first, which has the same axis to the right; the third beside it, with the same axis upwards. */
const SIDES: readonly [Side, Side, Side] = [
  { along: "short", right: "long", up: "middle" },
  { along: "middle", right: "long", up: "short" },
  { along: "long", right: "short", up: "middle" },
];

/** px, from one picture to the next. */
const GAP = 18;
/** px: an outline leaves the true one by no more. */
const DETAIL = 0.3;
/** Of a drawing's height: what all three may take. */
const MOST_HIGH = 430;

export function principalViews(prop: Prop, solid: Solid, width: number): Drawing & { scale: number } {
  const near = spotsNear(prop);
  const rough = SIDES.map((side) => picture(side, prop, solid, near, prop.reach / 200));
  const scale = scaleFor(rough, width);
  const pictures = SIDES.map((side) => picture(side, prop, solid, near, DETAIL / scale));
  const [first, second, third] = pictures.map((shown) => drawView(shown, near, scale));
  const top = Math.max(first.height, third.height);
  // The first and the second one's centres of mass stand above each other, the first and the third one's at one height.
  const middle = Math.max(first.centre[0], second.centre[0]);
  const level = Math.max(first.centre[1], third.centre[1]);
  const leftWidth = middle + Math.max(first.width - first.centre[0], second.width - second.centre[0]);
  const placed = [
    at(middle - first.centre[0], level - first.centre[1], first),
    at(leftWidth + GAP, level - third.centre[1], third),
    at(middle - second.centre[0], top + Math.abs(first.centre[1] - third.centre[1]) + GAP, second),
  ];
  return {
    width,
    height: top + Math.abs(first.centre[1] - third.centre[1]) + GAP + second.height,
    body: placed.join("\n"),
    scale,
  };
}

function picture(side: Side, { names }: Prop, solid: Solid, spots: readonly Spot[], detail: number): Picture {
  const right = names[side.right];
  const up = names[side.up];
  const rotation = fromMatrix([right, up, cross(right, up)]);
  const outline = outlineOf(solid, rotation, detail);
  const seen = spots.map(({ place }) => rotate(rotation, place));
  const low: [number, number] = [0, 0];
  const high: [number, number] = [0, 0];
  for (const axis of [0, 1]) {
    const values = seen.map((place) => place[axis]);
    for (const ring of outline.rings) for (let i = axis; i < ring.length; i += 2) values.push(ring[i]);
    for (const value of values) {
      low[axis] = Math.min(low[axis], value);
      high[axis] = Math.max(high[axis], value);
    }
  }
  return { ...side, rotation, outline, low, high };
}

/** px a metre, so that the pictures fit beside and above each other. */
function scaleFor([first, second, third]: readonly Picture[], width: number): number {
  const wide = ({ low, high }: Picture) => high[0] - low[0];
  const tall = ({ low, high }: Picture) => high[1] - low[1];
  const free = width - 4 * ROOM - GAP;
  const beside = Math.max(wide(first), wide(second)) + wide(third);
  // A picture is no narrower than its title.
  const alone = width - 2 * ROOM - GAP - LEAST_WIDE;
  const high = MOST_HIGH - 4 * ROOM;
  return Math.min(
    free / beside,
    alone / Math.max(wide(first), wide(second)),
    high / (Math.max(tall(first), tall(third)) + tall(second)),
  );
}
