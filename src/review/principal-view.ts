/** A prop seen along one of its principal axes: outline, two axes, and places that have names. */

import { type Quat, rotate } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import type { AxisNames } from "../prop/principal.js";
import type { Drawing } from "./drawing.js";
import { labelMarkup } from "./label-markup.js";
import { FONT_SIZE } from "./look.js";
import type { Outline } from "./outline.js";
import { type Label, placeLabels, pointsAlong } from "./place-labels.js";
import { boxAbout, merged, type Spot, sign } from "./spots.js";
import { element, pathData, textAt } from "./svg.js";
import { textWidth } from "./text-size.js";

type AxisName = keyof AxisNames;

/** A picture's axes: to the right and up; and along which it looks. */
export interface Side {
  along: AxisName;
  right: AxisName;
  up: AxisName;
}

/** px: room round an outline for axes and texts, and between its title and it. */
export const ROOM = 44;
/** px, of a title. */
export const LEAST_WIDE = 150;
const TITLE = 22;
/** By which an axis stands out of the outline, px. */
const AXIS = 20;

export interface Picture extends Side {
  rotation: Quat;
  outline: Outline;
  low: readonly [number, number];
  high: readonly [number, number];
}

export interface PlacedView extends Drawing {
  /** Of the centre of mass, px. */
  centre: readonly [number, number];
}

export function drawView(picture: Picture, spots: readonly Spot[], scale: number): PlacedView {
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
      ...placed.map(labelMarkup),
    ].join("\n"),
  };
}

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
