/** Rulers in metres below a picture and to its left. */

import type { Vec3 } from "../math/vec3.js";
import { FONT_SIZE } from "./look.js";
import type { TextBox } from "./place-labels.js";
import type { Bounds, Point } from "./plane.js";
import { element, numeral, pathData, textAt } from "./svg.js";
import { textWidth } from "./text-size.js";
import type { View } from "./view.js";

export interface Rulers {
  /** SVG elements. */
  body: string[];
  /** Of all its texts. */
  boxes: TextBox[];
  /** x y x y… px, of its lines. */
  lines: number[][];
  /** Where they end, px. */
  bottom: number;
}

const STEPS = [
  0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50, 100, 200, 500, 1000,
];
/** Least room between two figures beside and above each other, px. */
const ROOM = 46;
const ROOM_UP = 32;
const TICK = 5;
/** From the picture to a ruler, px. */
const GAP = 10;

export interface RuledPicture {
  /** m */
  bounds: Bounds;
  toPage(place: Point | Vec3): Point;
  /** px a metre */
  scale: number;
  /** Where distances are counted from, view's axes. */
  zero: Vec3;
  view: View;
}

export function rulers({ bounds, toPage, scale, zero, view }: RuledPicture): Rulers {
  const stepOf = (room: number) => STEPS.find((size) => size * scale >= room) ?? STEPS[STEPS.length - 1];
  const [step, stepUp] = [stepOf(ROOM), stepOf(ROOM_UP)];
  const [left, top] = toPage([bounds.left, bounds.high]);
  const [right, bottom] = toPage([bounds.right, bounds.low]);
  const [x, y] = [left - GAP, bottom + GAP];
  const upright = view.name === "side" ? 0 : zero[1];
  const lines: number[][] = [
    [left, y, right, y],
    [x, top, x, bottom],
  ];
  const texts: RulerText[] = [];
  for (const value of ticks(bounds.left - zero[0], bounds.right - zero[0], step)) {
    const [at] = toPage([value + zero[0], 0]);
    lines.push([at, y, at, y + TICK]);
    const text = figure(value, step);
    texts.push({ text, x: at, base: y + TICK + SIZE, anchor: "middle" });
  }
  for (const value of ticks(bounds.low - upright, bounds.high - upright, stepUp)) {
    const [, at] = toPage([0, value + upright]);
    lines.push([x - TICK, at, x, at]);
    const text = figure(value, stepUp);
    texts.push({ text, x: x - TICK - 3, base: at + DROP, anchor: "end" });
  }
  const below = y + TICK + 2.3 * SIZE;
  texts.push({ text: "metres from the release, along the throw", x: left, base: below, anchor: "start" });
  const side = view.name === "side" ? "height, m" : "to the left, m";
  texts.push({ text: side, x: 2, base: top - GAP, anchor: "start" });
  return {
    body: [
      element("path", { class: "rule", d: pathData(lines, { decimals: 1 }) }),
      ...texts.map(({ text, x, base, anchor }) =>
        textAt(x, base, text, { class: "small", "text-anchor": anchor }),
      ),
    ],
    lines: lines.slice(0, 2),
    boxes: texts.map(boxOf),
    bottom: below + 0.4 * SIZE,
  };
}

const SIZE = FONT_SIZE.small;
/** From the middle of a figure to its baseline, px. */
const DROP = 0.36 * SIZE;

interface RulerText {
  text: string;
  x: number;
  base: number;
  anchor: "start" | "middle" | "end";
}

function boxOf({ text, x, base, anchor }: RulerText): TextBox {
  const width = textWidth(text, SIZE);
  const left = anchor === "start" ? x : anchor === "end" ? x - width : x - width / 2;
  return { left, right: left + width, top: base - SIZE, bottom: base + 0.25 * SIZE };
}

function* ticks(low: number, high: number, step: number): Generator<number> {
  for (let i = Math.ceil(low / step); i * step <= high; i++) yield i * step;
}

const figure = (value: number, step: number): string => numeral(value, step < 0.01 ? 3 : step < 0.1 ? 2 : 1);
