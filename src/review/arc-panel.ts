/** One flight, or several in one view, in one true scale: outlines along the path, marks, limits and rulers. */

import type { Motion } from "../bake/take-motion.js";
import { multiply } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import { pathOf, type Stretch } from "./course.js";
import type { Drawing } from "./drawing.js";
import { type Exposure, thinning } from "./exposures.js";
import { FONT_SIZE } from "./look.js";
import { outlineOf } from "./outline.js";
import { type Label, placeLabels, type TextBox } from "./place-labels.js";
import { areaOf, around, type Bounds, grown, NOWHERE, type Point } from "./plane.js";
import { rulers } from "./rulers.js";
import type { SheetProp } from "./sheet-input.js";
import { marksOf, type PlaceMark, surroundingsOf } from "./surroundings.js";
import { element, pathData, textAt } from "./svg.js";
import { inView, type View } from "./view.js";

export interface ArcPanelInput {
  prop: SheetProp;
  motion: Motion;
  /** In the order of time. */
  flights: readonly { stretch: Stretch; exposures: readonly Exposure[] }[];
  view: View;
  /** Of the panel, px. */
  width: number;
  /** Greatest of what is drawn in it, px. */
  height: number;
  /** px a metre: no larger than this. */
  mostScale?: number;
}

export interface ArcPanel extends Drawing {
  /** Numbers of the exposures that are drawn. */
  drawn: number[];
  /** Every how many exposures are drawn. */
  every: number;
  crowded: boolean;
  /** px a metre. */
  scale: number;
  /** What there was no room for, in words. */
  notes: string[];
}

/** Room round the drawing for texts, px. */
const MARGIN = { left: 62, right: 46, top: 26, bottom: 44 };
/** Parts of a picture's point, px: an outline leaves the silhouette by no more. */
const DETAIL = 0.35;
/** Of the root of an outline's area: exposures are no nearer to each other. */
const ROOM = 0.8;
/** How far surroundings may enlarge the picture, as a share of what flies. */
const SURROUNDINGS = 0.4;

export function arcPanel({
  prop,
  motion,
  flights,
  view,
  width,
  height,
  mostScale = Number.POSITIVE_INFINITY,
}: ArcPanelInput): ArcPanel {
  const all = flights.flatMap(({ exposures }) => exposures);
  const coarse = prop.reach / 100;
  const rough = all.map((exposure) => poseOf(prop, view, exposure, coarse));
  const room = ROOM * Math.sqrt(rough.reduce((sum, { area }) => sum + area, 0) / rough.length);
  const thinned = flights.map(({ exposures }) =>
    thinning(
      exposures.map(({ centerOfMass }) => inView(view, centerOfMass)),
      room,
    ),
  );
  const every = Math.max(...thinned.map((one) => one.every));
  const drawn = flights.flatMap(({ exposures }, i) => exposures.filter((_, n) => n % thinned[i].every === 0));
  const paths = flights.map(({ stretch }) => pathOf(motion, stretch, 48).map((place) => inView(view, place)));
  const marks = flights.flatMap(({ stretch }) => marksOf(motion, stretch));
  const flown = boundsOf(
    rough,
    paths,
    marks.map(({ place }) => inView(view, place)),
  );
  const around = surroundingsOf(
    flights.map(({ stretch }) => stretch),
    view,
  );
  const size = Math.max(flown.right - flown.left, flown.high - flown.low);
  const bounds = around.bounds.reduce((sum, one) => grown(sum, one, SURROUNDINGS * size), flown);
  const inner = width - MARGIN.left - MARGIN.right;
  const scale = Math.min(
    inner / (bounds.right - bounds.left),
    height / (bounds.high - bounds.low),
    mostScale,
  );
  const spare = (inner - scale * (bounds.right - bounds.left)) / 2;
  const toPage = ([x, y]: Point | Vec3): Point => [
    MARGIN.left + spare + scale * (x - bounds.left),
    MARGIN.top + scale * (bounds.high - y),
  ];
  const frame: TextBox = {
    left: 2,
    top: 1,
    right: width - 2,
    bottom: MARGIN.top + scale * (bounds.high - bounds.low) + 8,
  };

  const poses = drawn.map((exposure) => poseOf(prop, view, exposure, DETAIL / scale));
  const ends = new Set(
    flights.flatMap(({ exposures }) => [exposures[0], exposures[exposures.length - 1]]).map((e) => e.number),
  );
  const outlines = poses.map(({ rings, number }) =>
    element("path", {
      class: ends.has(number) ? "picked" : "body",
      d: pathData(
        rings.map((ring) => onPage(ring, toPage)),
        { closed: true, decimals: 1 },
      ),
    }),
  );
  const scenery = around.draw(bounds, toPage);
  const lines = paths.map((path) =>
    element("path", { class: "path", d: pathData([path.flatMap((p) => [...toPage(p)])], { decimals: 1 }) }),
  );
  const dots = drawn.map(({ centerOfMass }) => {
    const [cx, cy] = toPage(inView(view, centerOfMass));
    return element("circle", { class: "spot", cx, cy, r: 2.2 });
  });
  const ruled = rulers({ bounds, toPage, scale, zero: inView(view, all[0].centerOfMass), view });

  const obstacles = [
    ...poses.flatMap(({ rings }) => rings.flatMap((ring) => dense(onPage(ring, toPage)))),
    ...paths.flatMap((path) => path.flatMap((p) => [...toPage(p)])),
  ];
  const signs = marks.map((mark) => markSign(mark, toPage(inView(view, mark.place))));
  const labels: Label[] = [
    ...marks.flatMap((mark) => markLabel(mark, toPage(inView(view, mark.place)))),
    ...scenery.labels,
    ...drawn.map(({ number, centerOfMass }): Label => {
      const [x, y] = toPage(inView(view, centerOfMass));
      return {
        text: String(number),
        kind: "number",
        size: FONT_SIZE.small,
        isBold: true,
        x,
        y,
        gap: 5,
        prefer: [2, 6, 1, 3, 5, 7],
      };
    }),
  ];
  const placed = placeLabels(labels, frame, obstacles, ruled.boxes);
  const body = [
    ...scenery.shapes,
    ...outlines,
    ...lines,
    ...dots,
    ...signs,
    ...ruled.body,
    ...placed.flatMap((label) => [
      ...(label.isLed
        ? [
            element("path", {
              class: "lead",
              d: pathData([[label.x, label.y, label.at, label.baseline - 4]], { decimals: 1 }),
            }),
          ]
        : []),
      textAt(label.at, label.baseline, label.text, { class: label.kind, "text-anchor": label.anchor }),
    ]),
  ].join("\n");
  return {
    width,
    height: ruled.bottom,
    body,
    drawn: drawn.map(({ number }) => number),
    every,
    crowded: thinned.some(({ crowded }) => crowded),
    scale,
    notes: scenery.beyond,
  };
}

interface Pose {
  number: number;
  /** m, view's axes, in place. */
  rings: Float64Array[];
  area: number;
}

function poseOf(
  prop: SheetProp,
  view: View,
  { number, centerOfMass, rotation }: Exposure,
  detail: number,
): Pose {
  const [x, y] = inView(view, centerOfMass);
  const { rings } = outlineOf(prop.solid, multiply(view.rotation, rotation), detail);
  return {
    number,
    area: areaOf(rings),
    rings: rings.map((ring) => ring.map((value, i) => value + (i % 2 === 0 ? x : y))),
  };
}

function boundsOf(
  poses: readonly Pose[],
  paths: readonly (readonly Vec3[])[],
  marks: readonly Vec3[],
): Bounds {
  let bounds = NOWHERE;
  for (const { rings } of poses)
    for (const ring of rings)
      for (let i = 0; i < ring.length; i += 2) bounds = around(bounds, [ring[i], ring[i + 1]]);
  for (const [x, y] of [...paths.flat(), ...marks]) bounds = around(bounds, [x, y]);
  return bounds;
}

function onPage(ring: Float64Array, toPage: (p: Point) => Point): number[] {
  const out: number[] = [];
  for (let i = 0; i < ring.length; i += 2) out.push(...toPage([ring[i], ring[i + 1]]));
  return out;
}

/** Points along a closed line no further than 4 px apart. */
function dense(ring: readonly number[]): number[] {
  const out: number[] = [];
  for (let i = 0; i < ring.length; i += 2) {
    const j = (i + 2) % ring.length;
    const steps =
      1 + Math.floor(Math.max(Math.abs(ring[j] - ring[i]), Math.abs(ring[j + 1] - ring[i + 1])) / 4);
    for (let k = 0; k < steps; k++)
      out.push(
        ring[i] + ((ring[j] - ring[i]) * k) / steps,
        ring[i + 1] + ((ring[j + 1] - ring[i + 1]) * k) / steps,
      );
  }
  return out;
}

function markSign({ kind }: PlaceMark, [x, y]: Point): string {
  if (kind === "apex")
    return element("path", {
      class: "sight",
      d: pathData([[x - 6, y - 9, x, y - 3, x + 6, y - 9]], { decimals: 1 }),
    });
  if (kind === "asked")
    return (
      element("circle", { class: "asked", cx: x, cy: y, r: 6 }) +
      element("path", {
        class: "asked",
        d: pathData(
          [
            [x - 9, y, x - 3, y],
            [x + 3, y, x + 9, y],
            [x, y - 9, x, y - 3],
            [x, y + 3, x, y + 9],
          ],
          { decimals: 1 },
        ),
      })
    );
  return element("rect", { class: "met", x: x - 3, y: y - 3, width: 6, height: 6 });
}

const markLabel = ({ label, kind }: PlaceMark, [x, y]: Point): Label[] =>
  label === undefined
    ? []
    : [
        {
          text: label,
          kind: "label",
          size: FONT_SIZE.label,
          x,
          y,
          gap: 11,
          isNeeded: true,
          prefer: kind === "apex" ? [2, 1, 3] : [6, 5, 7, 4, 0],
        },
      ];
