/** A prop seen along its three principal axes, in one true scale. */

import { fromMatrix, type Quat, rotate } from "../math/quat.js";
import { length, negate, subtract, type Vec3 } from "../math/vec3.js";
import type { AxisNames } from "../prop/principal.js";
import type { Prop } from "../prop/prop.js";
import type { Drawing } from "./drawing.js";
import { FONT_SIZE } from "./look.js";
import { type Outline, outlineOf, type Solid } from "./outline.js";
import { type Label, type PlacedLabel, placeLabels, type TextBox } from "./place-labels.js";
import { element, pathData, textAt } from "./svg.js";
import { textWidth } from "./text-size.js";

type AxisName = keyof AxisNames;

/** A picture's axes: to the right and up; and along which it looks. */
interface Side {
  along: AxisName;
  right: AxisName;
  up: AxisName;
}

/** The second stands below the first, which has the same axis to the right; the third beside it, with the same axis upwards. */
const SIDES: readonly [Side, Side, Side] = [
  { along: "short", right: "long", up: "middle" },
  { along: "middle", right: "long", up: "short" },
  { along: "long", right: "short", up: "middle" },
];

/** px: room round an outline for axes and texts, between a picture's title and it, and from one picture to the next. */
const ROOM = 44;
const TITLE = 22;
const GAP = 18;
/** By which an axis stands out of the outline, px. */
const AXIS = 20;
const DETAIL = 0.3;
/** Of a drawing's height: what all three may take. */
const MOST_HIGH = 430;
const LEAST_WIDE = 150;
/** Of the reach: what lies further off is told of in words, not drawn. */
const FAR = 2.5;
/** Half of a mark's size, px. */
const MARK = 5;
/** px: nearer marks are one. */
const SAME = 2.5;

/** A place of the prop that has a name. */
interface Spot {
  name: string;
  /** About the centre of mass, model's axes, m. */
  place: Vec3;
  kind: "balance" | "origin" | "point";
}

interface Picture extends Side {
  rotation: Quat;
  outline: Outline;
  low: readonly [number, number];
  high: readonly [number, number];
}

export function principalViews(prop: Prop, solid: Solid, width: number): Drawing & { scale: number } {
  const spots = spotsOf(prop);
  const near = spots.filter(({ place }) => length(place) <= FAR * prop.reach);
  const rough = SIDES.map((side) => picture(side, prop, solid, near, prop.reach / 200));
  const scale = scaleFor(rough, width);
  const pictures = SIDES.map((side) => picture(side, prop, solid, near, DETAIL / scale));
  const [first, second, third] = pictures.map((shown) => draw(shown, near, scale));
  const top = Math.max(first.height, third.height);
  // The first and the second one's centres of mass stand above each other, the first and the third one's at one height.
  const middle = Math.max(first.centre[0], second.centre[0]);
  const level = Math.max(first.centre[1], third.centre[1]);
  const leftWidth = middle + Math.max(first.width - first.centre[0], second.width - second.centre[0]);
  const placed = [
    moved(first, middle - first.centre[0], level - first.centre[1]),
    moved(third, leftWidth + GAP, level - third.centre[1]),
    moved(second, middle - second.centre[0], top + Math.abs(first.centre[1] - third.centre[1]) + GAP),
  ];
  return {
    width,
    height: top + Math.abs(first.centre[1] - third.centre[1]) + GAP + second.height,
    body: placed.join("\n"),
    scale,
  };
}

/** What is too far off to be drawn. */
export const spotsBeyond = (prop: Prop): { name: string; distance: number }[] =>
  spotsOf(prop)
    .map(({ name, place }) => ({ name, distance: length(place) }))
    .filter(({ distance }) => distance > FAR * prop.reach);

const spotsOf = ({ centerOfMass, points }: Prop): Spot[] => [
  { name: "centre of mass", place: [0, 0, 0], kind: "balance" },
  { name: "model’s origin", place: negate(centerOfMass), kind: "origin" },
  ...Object.entries(points).map(
    ([name, { position }]): Spot => ({ name, place: subtract(position, centerOfMass), kind: "point" }),
  ),
];

function picture(side: Side, { names }: Prop, solid: Solid, spots: readonly Spot[], detail: number): Picture {
  const right = names[side.right];
  const up = names[side.up];
  const towards: Vec3 = [
    right[1] * up[2] - right[2] * up[1],
    right[2] * up[0] - right[0] * up[2],
    right[0] * up[1] - right[1] * up[0],
  ];
  const rotation = fromMatrix([right, up, towards]);
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

interface Placed extends Drawing {
  /** Of the centre of mass, px. */
  centre: readonly [number, number];
}

function draw(picture: Picture, spots: readonly Spot[], scale: number): Placed {
  const { low, high, along, right, up, rotation, outline } = picture;
  const title = `along the ${along} axis`;
  const needed = Math.max(LEAST_WIDE, textWidth(title, FONT_SIZE.label) + 8);
  const inner = scale * (high[0] - low[0]) + 2 * ROOM;
  const side = ROOM + Math.max(0, (needed - inner) / 2);
  const width = scale * (high[0] - low[0]) + 2 * side;
  const centre: [number, number] = [side - scale * low[0], TITLE + ROOM + scale * high[1]];
  const height = TITLE + 2 * ROOM + scale * (high[1] - low[1]);
  const toPage = (place: Vec3): [number, number] => {
    const [x, y] = rotate(rotation, place);
    return [centre[0] + scale * x, centre[1] - scale * y];
  };
  const axes = [
    {
      name: right,
      ends: [centre[0] + scale * low[0] - AXIS, centre[1], centre[0] + scale * high[0] + AXIS, centre[1]],
    },
    {
      name: up,
      ends: [centre[0], centre[1] - scale * low[1] + AXIS, centre[0], centre[1] - scale * high[1] - AXIS],
    },
  ];
  const lines = [
    ...axes.map(({ ends }) => ends),
    ...outline.rings.map((ring) => [
      ...Array.from(ring, (value, i) => centre[i % 2] + (i % 2 ? -scale : scale) * value),
      centre[0] + scale * ring[0],
      centre[1] - scale * ring[1],
    ]),
  ];
  const labels = [
    ...axes.map(
      ({ name, ends }, i): Label => ({
        text: name,
        kind: `${name}-text`,
        size: FONT_SIZE.label,
        x: ends[2],
        y: ends[3],
        gap: 5,
        prefer: i === 0 ? [2, 1, 6] : [0, 4, 2],
        isNeeded: true,
      }),
    ),
    ...merged(spots, toPage).map(
      ({ text, at: [x, y] }): Label => ({
        text,
        kind: "label",
        size: FONT_SIZE.label,
        x,
        y,
        gap: 12,
        prefer: [1, 7, 3, 5],
        isNeeded: true,
      }),
    ),
  ];
  const frame = { left: 0, top: TITLE, right: width, bottom: height };
  const marks = spots.map(({ place }) => boxAbout(toPage(place)));
  const placed = placeLabels(labels, frame, lines.flatMap(pointsAlong), marks);
  return {
    width,
    height,
    centre,
    body: [
      textAt(0, 12, title, { class: "faint" }),
      element("path", {
        class: "body",
        d: pathData(outline.rings, {
          closed: true,
          map: [scale, 0, 0, -scale, centre[0], centre[1]],
          decimals: 1,
        }),
      }),
      ...axes.map(({ name, ends }) => axisLine(name, ends)),
      ...spots.toReversed().map(({ kind, place }) => sign(kind, toPage(place))),
      ...placed.map(written),
    ].join("\n"),
  };
}

/** Points of a line of straight pieces, so near to each other that no text stands between them. */
function pointsAlong(line: readonly number[]): number[] {
  const points: number[] = [];
  for (let i = 0; i + 3 < line.length; i += 2) {
    const [x, y, toX, toY] = line.slice(i, i + 4);
    const steps = Math.ceil(Math.max(Math.abs(toX - x), Math.abs(toY - y)) / 4) + 1;
    for (let k = 0; k < steps; k++) points.push(x + ((toX - x) * k) / steps, y + ((toY - y) * k) / steps);
  }
  return points;
}

const boxAbout = ([x, y]: readonly [number, number]): TextBox => ({
  left: x - MARK,
  top: y - MARK,
  right: x + MARK,
  bottom: y + MARK,
});

/** A line with a head at its end. */
function axisLine(name: AxisName, [x, y, toX, toY]: readonly number[]): string {
  const long = Math.max(Math.abs(toX - x), Math.abs(toY - y));
  const [ux, uy] = [(toX - x) / long, (toY - y) / long];
  const head = [
    toX,
    toY,
    toX - 7 * ux - 3 * uy,
    toY - 7 * uy + 3 * ux,
    toX - 7 * ux + 3 * uy,
    toY - 7 * uy - 3 * ux,
  ];
  return [
    element("path", { class: name, d: pathData([[x, y, toX - 4 * ux, toY - 4 * uy]], { decimals: 1 }) }),
    element("path", { class: `${name}-dot`, d: pathData([head], { closed: true, decimals: 1 }) }),
  ].join("\n");
}

function sign(kind: Spot["kind"], [x, y]: readonly [number, number]): string {
  if (kind === "point") return element("circle", { class: "spot", cx: x, cy: y, r: 3 });
  if (kind === "origin")
    return element("path", {
      class: "sight",
      d: pathData([
        [x - 6, y - 6, x + 6, y + 6],
        [x - 6, y + 6, x + 6, y - 6],
      ]),
    });
  // The usual sign of a centre of mass: a disc of two full and two empty quarters.
  const quarter = (sx: number, sy: number) =>
    `M${[x, y].map((v) => v.toFixed(1)).join(" ")}h${5 * sx}a5 5 0 0 ${sx * sy > 0 ? 1 : 0} ${-5 * sx} ${5 * sy}z`;
  return [
    element("circle", { class: "spot", cx: x, cy: y, r: 6 }),
    element("path", { class: "paper", d: `${quarter(1, 1)}${quarter(-1, -1)}` }),
  ].join("\n");
}

/** One text for all spots that lie on each other. */
function merged(
  spots: readonly Spot[],
  toPage: (place: Vec3) => [number, number],
): { text: string; at: [number, number] }[] {
  const groups: { text: string; at: [number, number] }[] = [];
  for (const { name, place } of spots) {
    const at = toPage(place);
    const same = groups.find((g) => Math.abs(g.at[0] - at[0]) < SAME && Math.abs(g.at[1] - at[1]) < SAME);
    if (same) same.text += `, ${name}`;
    else groups.push({ text: name, at });
  }
  return groups;
}

function written({ text, kind, at, baseline, anchor, lead, x, y }: PlacedLabel): string {
  const label = textAt(at, baseline, text, {
    class: kind,
    "text-anchor": anchor === "start" ? undefined : anchor,
  });
  if (!lead) return label;
  return `${element("path", { class: "lead", d: pathData([[x, y, ...lead]], { decimals: 1 }) })}\n${label}`;
}

const moved = ({ body }: Drawing, x: number, y: number): string =>
  element("g", { transform: `translate(${Math.round(x)} ${Math.round(y)})` }, `\n${body}\n`);
