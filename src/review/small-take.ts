/** A take as one of many small pictures: its arc, a few poses in place below it, and its figures. */

import { multiply } from "../math/quat.js";
import { addScaled, type Vec3 } from "../math/vec3.js";
import { pathOf, type Stretch, stretchesOf } from "./course.js";
import { fixed, turnsText } from "./figures.js";
import { FONT_SIZE } from "./look.js";
import { outlineOf } from "./outline.js";
import { areaOf, around, type Bounds, NOWHERE, type Point } from "./plane.js";
import type { SheetProp, SheetTake } from "./sheet-input.js";
import { simplified } from "./simplify.js";
import { element, numeral, pathData, textAt } from "./svg.js";
import { courseOf, inView, sideView, type View } from "./view.js";

/** px: the arc, the poses below it, and the figures below these. */
export const CELL = { width: 130, arc: 62, poses: 30, height: 116 };
const AIR = 4;
/** px; an outline leaves the silhouette by no more. */
const DETAIL = 1;
/** px; corners nearer to a straight line than this are left out. */
const STRAIGHT = 0.35;
const POSES = 4;
/** px²: rings that are smaller are left out. */
const SPECK = 1.5;

export interface SmallTake {
  take: SheetTake;
  stretches: Stretch[];
  view: View;
  /** Of its paths, view's axes, m. */
  bounds: Bounds;
  turns: number;
}

export function smallTake(take: SheetTake): SmallTake {
  const stretches = stretchesOf(take);
  const places = stretches.flatMap((stretch) => pathOf(take.motion, stretch, 8));
  const view = sideView(courseOf(places));
  const bounds = places
    .map((place) => inView(view, place))
    .reduce((sum, [x, y]) => around(sum, [x, y]), NOWHERE);
  return { take, stretches, view, bounds, turns: stretches.reduce((sum, { turns }) => sum + turns, 0) };
}

/** px a metre: the same for the arcs of all takes of a throw; Infinity where none travels. */
export function arcScale(takes: readonly SmallTake[]): number {
  const most = (size: (bounds: Bounds) => number) =>
    takes.reduce((greatest, { bounds }) => Math.max(greatest, size(bounds)), 0);
  const wide = most(({ left, right }) => right - left);
  const tall = most(({ low, high }) => high - low);
  return Math.min((CELL.width - 14) / wide, (CELL.arc - 2 * AIR) / tall);
}

/** From its own upper left corner. */
export function smallPicture(prop: SheetProp, small: SmallTake, scale: number): string {
  const { take, turns } = small;
  const number = take.take ? `${take.take.take}: ` : "";
  const figures = `${number}${fixed(take.motion.duration, 2)} s, ${turnsText(turns)}`;
  return [
    arcOf(small, scale),
    element("g", { class: "body" }, ...posesOf(prop, small)),
    textAt(CELL.width / 2, CELL.arc + CELL.poses + FONT_SIZE.small + 2, figures, { class: "small" }),
  ].join("");
}

function arcOf({ take, stretches, view, bounds }: SmallTake, scale: number): string {
  const flown = stretches.filter(({ travels }) => travels);
  if (flown.length === 0) return "";
  const middle: Point = [(bounds.left + bounds.right) / 2, (bounds.low + bounds.high) / 2];
  const toPage = ([x, y]: Vec3): Point => [
    CELL.width / 2 + scale * (x - middle[0]),
    CELL.arc / 2 - scale * (y - middle[1]),
  ];
  const curves = flown.map((stretch) => curve(take, stretch, view, toPage));
  return element("path", { class: "path", d: curves.join("") });
}

/** At equal times from the first release to the last arrival. */
function posesOf(prop: SheetProp, { take: { motion }, stretches, view }: SmallTake): string[] {
  const scale = (CELL.poses - AIR) / (2 * prop.reach);
  const [{ from }, { to }] = [stretches[0], stretches[stretches.length - 1]];
  return Array.from({ length: POSES }, (_, i) => {
    const rotation = multiply(view.rotation, motion.rotation(from + ((to - from) * i) / (POSES - 1)));
    const { rings } = outlineOf(prop.solid, rotation, DETAIL / scale);
    const x = (CELL.width * (i + 0.5)) / POSES;
    const map = [scale, 0, 0, -scale, x, CELL.arc + CELL.poses / 2] as const;
    const large = rings.filter((ring) => scale * scale * areaOf([ring]) > SPECK);
    const plain = large.map((ring) => simplified(ring, STRAIGHT / scale));
    return element("path", { d: pathData(plain, { closed: true, map, decimals: 1 }) });
  });
}

/**
 * The way of the centre of mass: a parabola is one quadratic curve, whose middle point lies where the tangents at its ends meet, half the flight at
 * the first velocity from the start.
 */
export function curve(
  { motion }: SheetTake,
  stretch: Stretch,
  view: View,
  toPage: (place: Vec3) => Point,
): string {
  const { part, from, to } = stretch;
  const onPage = (place: Vec3) => toPage(inView(view, place));
  if (!part)
    return pathData([pathOf(motion, stretch, 24).flatMap((place) => [...onPage(place)])], { decimals: 1 });
  const start = motion.centerOfMass(from);
  const corner = addScaled(start, part.launch.velocity, (to - from) / 2);
  const [a, b, c] = [start, corner, motion.centerOfMass(to)].map((place) =>
    onPage(place)
      .map((value) => numeral(value, 1))
      .join(" "),
  );
  return `M${a}Q${b} ${c}`;
}
