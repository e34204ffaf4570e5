/** A flight as it was over the same flight as it is, in one true scale. */

import { multiply } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import { onPage } from "./arc-panel.js";
import type { Drawing } from "./drawing.js";
import type { DriftLayer, DriftPose } from "./drift-layers.js";
import { thinning } from "./exposures.js";
import { labelMarkup } from "./label-markup.js";
import { FONT_SIZE } from "./look.js";
import { outlineOf } from "./outline.js";
import { type Label, placeLabels, pointsAlong } from "./place-labels.js";
import { areaOf, around, type Bounds, NOWHERE, type Point } from "./plane.js";
import { rulers } from "./rulers.js";
import type { SheetProp } from "./sheet-input.js";
import { element, pathData } from "./svg.js";
import { inView, type View } from "./view.js";

export interface DriftPanelInput {
  before: readonly DriftLayer[];
  now: readonly DriftLayer[];
  view: View;
  /** Of the panel, px. */
  width: number;
  /** Greatest of what is drawn in it, px. */
  height: number;
  /** Poses have the numbers of their shares. */
  isNumbered: boolean;
  /** Where distances are counted from, world frame, m. */
  zero: Vec3;
}

/** Room round the drawing for texts, px. */
const MARGIN = { left: 62, right: 30, top: 26 };
/** Of the root of an outline's area, and of the prop's reach: poses are no nearer to each other. */
const ROOM = { area: 0.8, reach: 0.5 };
/** px: an outline leaves the silhouette by no more. */
const DETAIL = 0.35;

export function driftPanel(input: DriftPanelInput): Drawing {
  const { view, width, height, isNumbered } = input;
  const shown = (layers: readonly DriftLayer[]) => layers.map((layer) => thinned(layer, view));
  const [before, now] = [shown(input.before), shown(input.now)];
  const bounds = boundsOf([...before, ...now], view);
  const inner = width - MARGIN.left - MARGIN.right;
  const scale = Math.min(inner / (bounds.right - bounds.left), height / (bounds.high - bounds.low));
  const spare = (inner - scale * (bounds.right - bounds.left)) / 2;
  const toPage = ([x, y]: Point | Vec3): Point => [
    MARGIN.left + spare + scale * (x - bounds.left),
    MARGIN.top + scale * (bounds.high - y),
  ];
  const zero = inView(view, input.zero);
  const ruled = rulers({ bounds, toPage, scale, zero, view });
  const frame = {
    left: 2,
    top: 1,
    right: width - 2,
    bottom: MARGIN.top + scale * (bounds.high - bounds.low) + 8,
  };
  const labels = isNumbered
    ? (now.length > 0 ? now : before).flatMap((layer) => numbers(layer, view, toPage))
    : [];
  const drawn = isNumbered ? [...before, ...now].flatMap((layer) => linesOf(layer, view, toPage, scale)) : [];
  return {
    width,
    height: ruled.bottom,
    body: [
      ...now.flatMap((layer) => drawLayer(layer, view, toPage, scale, "now")),
      ...before.flatMap((layer) => drawLayer(layer, view, toPage, scale, "before")),
      ...ruled.body,
      ...placeLabels(labels, frame, drawn, ruled.boxes).map(labelMarkup),
    ].join("\n"),
  };
}

/** Classes of the look. */
const DRIFT_LOOK = {
  now: { body: "body", path: "path", spot: "spot" },
  before: { body: "body-before", path: "path-before", spot: "spot-before" },
} as const;

/** A prop's outline about a place of the page, px. */
export function driftOutline(
  { solid }: SheetProp,
  { rotation }: DriftPose,
  view: View,
  scale: number,
  [x, y]: Point,
  side: keyof typeof DRIFT_LOOK,
): string {
  const { rings } = outlineOf(solid, multiply(view.rotation, rotation), DETAIL / scale);
  const map = [scale, 0, 0, -scale, x, y] as const;
  return element("path", {
    class: DRIFT_LOOK[side].body,
    d: pathData(rings, { closed: true, decimals: 1, map }),
  });
}

type ShownLayer = DriftLayer & {
  /** Number from 1 of each of its poses. */
  counts: number[];
};

/** Of the poses, those that there is room for. */
function thinned(layer: DriftLayer, view: View): ShownLayer {
  const { prop, poses } = layer;
  const area = poses.reduce((sum, { rotation }) => {
    const { rings } = outlineOf(prop.solid, multiply(view.rotation, rotation), prop.reach / 50);
    return sum + areaOf(rings);
  }, 0);
  const room = Math.max(ROOM.area * Math.sqrt(area / poses.length), ROOM.reach * prop.reach);
  const { every } = thinning(
    poses.map(({ centerOfMass }) => inView(view, centerOfMass)),
    room,
  );
  const counts = poses.flatMap((_, i) => (i % every === 0 ? [i + 1] : []));
  return { ...layer, counts, poses: counts.map((count) => poses[count - 1]) };
}

function boundsOf(layers: readonly ShownLayer[], view: View): Bounds {
  let bounds = NOWHERE;
  for (const { prop, poses, path } of layers) {
    for (const place of path) bounds = around(bounds, plane(inView(view, place)));
    for (const { centerOfMass, rotation } of poses) {
      const [x, y] = inView(view, centerOfMass);
      const { rings } = outlineOf(prop.solid, multiply(view.rotation, rotation), prop.reach / 100);
      for (const ring of rings)
        for (let i = 0; i < ring.length; i += 2) bounds = around(bounds, [x + ring[i], y + ring[i + 1]]);
    }
  }
  return bounds;
}

const plane = ([x, y]: Vec3): Point => [x, y];

function drawLayer(
  { prop, poses, path }: ShownLayer,
  view: View,
  toPage: (place: Point | Vec3) => Point,
  scale: number,
  side: keyof typeof DRIFT_LOOK,
): string[] {
  const look = DRIFT_LOOK[side];
  const line = path.flatMap((place) => [...toPage(inView(view, place))]);
  return [
    ...poses.map((pose) =>
      driftOutline(prop, pose, view, scale, toPage(inView(view, pose.centerOfMass)), side),
    ),
    ...(line.length > 2 ? [element("path", { class: look.path, d: pathData([line], { decimals: 1 }) })] : []),
    ...poses.map(({ centerOfMass }) => {
      const [cx, cy] = toPage(inView(view, centerOfMass));
      return element("circle", { class: look.spot, cx, cy, r: 2.2 });
    }),
  ];
}

/** x y x y… px: what a number had better not cover. */
const linesOf = (
  { prop, poses, path }: ShownLayer,
  view: View,
  toPage: (place: Point | Vec3) => Point,
  scale: number,
): number[] => [
  ...path.flatMap((place) => [...toPage(inView(view, place))]),
  ...poses.flatMap(({ centerOfMass, rotation }) => {
    const [x, y] = inView(view, centerOfMass);
    const { rings } = outlineOf(prop.solid, multiply(view.rotation, rotation), DETAIL / scale);
    return rings.flatMap((ring) => {
      const points = onPage(ring, ([right, up]) => toPage([x + right, y + up]));
      return pointsAlong([...points, points[0], points[1]]);
    });
  }),
];

const numbers = (
  { poses, counts }: ShownLayer,
  view: View,
  toPage: (place: Point | Vec3) => Point,
): Label[] =>
  poses.map(({ centerOfMass }, i) => {
    const [x, y] = toPage(inView(view, centerOfMass));
    return {
      ...{ text: String(counts[i]), kind: "number", size: FONT_SIZE.small, isBold: true },
      ...{ x, y, gap: 6, prefer: [2, 6, 1, 3, 5, 7] },
    };
  });
