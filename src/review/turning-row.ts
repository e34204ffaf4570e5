/** The poses of a flight in place, side by side, with one axis picked out. */

import { multiply, rotate } from "../math/quat.js";
import { addScaled, type Vec3 } from "../math/vec3.js";
import type { Drawing } from "./drawing.js";
import type { Exposure } from "./exposures.js";
import { fixed } from "./figures.js";
import { FONT_SIZE } from "./look.js";
import { outlineOf } from "./outline.js";
import type { Picked } from "./picked-axis.js";
import type { SheetProp } from "./sheet-input.js";
import { element, pathData, textAt } from "./svg.js";
import type { View } from "./view.js";

export interface TurningRowInput {
  prop: SheetProp;
  exposures: readonly Exposure[];
  /** Numbers of those that the arc shows too. */
  onArc?: ReadonlySet<number>;
  view: View;
  /** None: it does not turn. */
  picked?: Picked;
  /** px */
  width: number;
}

export interface TurningRow extends Drawing {
  /** px a metre. */
  scale: number;
}

/** px; a pose is drawn no larger, and a cell is no narrower. */
const LARGEST = 104;
const NARROWEST = 58;
/** Times the prop's reach: the picked axis's long end, its short end, the arm square to it. */
const ROD = 1.12;
const TAIL = 0.45;
const ARM = 0.78;
const DETAIL = 0.35;
const LINES = 3;
/** One axis needs no dashes to be told from others. */
const SOLID = "stroke-dasharray:none";
/** For the names of the figures, px. */
const GUTTER = 40;

export function turningRow({ prop, exposures, onArc, view, picked, width }: TurningRowInput): TurningRow {
  const columns = columnsFor(exposures.length, width - GUTTER);
  const cell = (width - GUTTER) / columns;
  const room = Math.min(cell - 6, LARGEST);
  const scale = room / (2 * ROD * prop.reach);
  const rows = Math.ceil(exposures.length / columns);
  const tall = room + LINES * LINE + 12;
  const body = exposures.map((exposure, i) => {
    const x = GUTTER + cell * (0.5 + (i % columns));
    const y = tall * Math.floor(i / columns) + room / 2 + 2;
    return (
      pose(prop, exposure, view, picked, scale, x, y) +
      caption(exposure, x, y + room / 2, onArc?.has(exposure.number) ?? true)
    );
  });
  const heads = Array.from({ length: rows }, (_, row) =>
    ["no.", "time", "turns"]
      .map((head, n) => textAt(0, tall * row + room + 6 + (n + 1) * LINE, head, { class: "small" }))
      .join(""),
  );
  return { width, height: rows * tall, body: [...heads, ...body].join("\n"), scale };
}

const LINE = FONT_SIZE.small * 1.2;

/** Rows as even as can be. */
function columnsFor(count: number, width: number): number {
  const most = Math.floor(width / NARROWEST);
  const rows = Math.ceil(count / most);
  return Math.max(Math.ceil(count / rows), Math.ceil(width / (1.5 * LARGEST)));
}

function pose(
  prop: SheetProp,
  { rotation }: Exposure,
  view: View,
  picked: Picked | undefined,
  scale: number,
  x: number,
  y: number,
): string {
  const turned = multiply(view.rotation, rotation);
  const { rings } = outlineOf(prop.solid, turned, DETAIL / scale);
  const at = ([u, v]: Vec3): [number, number] => [x + scale * u, y - scale * v];
  const outline = element("path", {
    class: "body",
    d: pathData(rings, { closed: true, map: [scale, 0, 0, -scale, x, y], decimals: 1 }),
  });
  if (!picked) return outline;
  const { axis, across, name } = picked;
  const rod = rotate(turned, axis);
  const arm = rotate(turned, across);
  const origin: Vec3 = [0, 0, 0];
  const [head, tail] = [addScaled(origin, rod, ROD * prop.reach), addScaled(origin, rod, -TAIL * prop.reach)];
  const tip = addScaled(origin, arm, ARM * prop.reach);
  const look = name === "any" ? "long" : name;
  return [
    outline,
    armSign(at(origin), at(tip), arm[2] >= 0),
    rodSign(look, at(tail), at(head), rod[2] >= 0),
  ].join("");
}

/** A full dot is on the viewer's side, a ring beyond. */
function armSign(from: readonly number[], [x, y]: readonly number[], isNear: boolean): string {
  return (
    element("path", { class: "sight", d: pathData([[...from, x, y]], { decimals: 1 }) }) +
    (isNear
      ? element("circle", { class: "spot", cx: x, cy: y, r: 3.2 })
      : element("circle", { class: "sight", cx: x, cy: y, r: 2.6 }))
  );
}

/** An arrow; of one that points at the viewer or away only its point or its feathers are seen, as physics writes it. */
function rodSign(
  look: string,
  [u, v]: readonly number[],
  [x, y]: readonly number[],
  isNear: boolean,
): string {
  const [dx, dy] = [x - u, y - v];
  const size = Math.sqrt(dx * dx + dy * dy);
  if (size < 9) {
    const [cx, cy] = [x, y];
    const middle = isNear
      ? element("circle", { class: `${look}-dot`, cx, cy, r: 2.2 })
      : element("path", {
          class: look,
          style: SOLID,
          d: pathData(
            [
              [cx - 3, cy - 3, cx + 3, cy + 3],
              [cx - 3, cy + 3, cx + 3, cy - 3],
            ],
            { decimals: 1 },
          ),
        });
    return element("circle", { class: look, style: SOLID, cx, cy, r: 5 }) + middle;
  }
  const [ax, ay] = [dx / size, dy / size];
  const wing = (side: number): number[] => [x - 7 * ax + 3.6 * side * ay, y - 7 * ay - 3.6 * side * ax];
  const point = pathData([[...wing(1), x, y, ...wing(-1)]], { closed: true, decimals: 1 });
  return (
    element("path", {
      class: look,
      style: SOLID,
      d: pathData([[u, v, x - 5 * ax, y - 5 * ay]], { decimals: 1 }),
    }) +
    element(
      "path",
      isNear
        ? { class: `${look}-dot`, d: point }
        : { class: look, style: "stroke-dasharray:none;stroke-width:1.2px", d: point },
    )
  );
}

function caption({ number, t, turns }: Exposure, x: number, y: number, isOnArc: boolean): string {
  const line = (n: number, text: string, attributes: Record<string, string>) =>
    textAt(x, y + 4 + n * LINE, text, { "text-anchor": "middle", ...attributes });
  return [
    line(1, String(number), { class: isOnArc ? "number" : "small" }),
    line(2, `${fixed(t, 2)} s`, { class: "small" }),
    line(3, fixed(turns, 2), { class: "small" }),
  ].join("");
}
