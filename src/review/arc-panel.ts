/** One flight, or several in one view, in one true scale: outlines along the path, marks, limits and rulers. */

import { type ArcLayout, type ArcPanelInput, arcLayout, type LaidFlight, MARGIN } from "./arc-layout.js";
import type { Drawing } from "./drawing.js";
import { labelMarkup } from "./label-markup.js";
import { FONT_SIZE } from "./look.js";
import { type Label, placeLabels, pointsAlong } from "./place-labels.js";
import type { Point } from "./plane.js";
import { type Pose, poseOf } from "./poses.js";
import { rulers } from "./rulers.js";
import type { PlaceMark } from "./surroundings.js";
import { element, pathData } from "./svg.js";
import { inView, type View } from "./view.js";

export type { ArcPanelInput, ShownFlight } from "./arc-layout.js";

export interface ArcPanel extends Drawing {
  /** Numbers of the exposures that are drawn. */
  drawn: number[];
  /** Every how many exposures are drawn, of the flight of which most are left out. */
  every: number;
  crowded: boolean;
  /** px a metre. */
  scale: number;
  /** What there was no room for, in words. */
  notes: string[];
}

/** Parts of a picture's point, px: an outline leaves the silhouette by no more. */
const DETAIL = 0.35;

export function arcPanel(input: ArcPanelInput): ArcPanel {
  const { prop, view, width } = input;
  const layout = arcLayout(input);
  const { flights, scale, toPage, bounds, surroundings } = layout;
  const poses = flights.map(({ drawn }) =>
    drawn.map((exposure) => poseOf(prop, view, exposure, DETAIL / scale)),
  );
  const scenery = surroundings.draw(bounds, toPage);
  const [first] = flights;
  const ruled = rulers({ bounds, toPage, scale, zero: first.path[0], view });
  const labels = [
    ...(input.labels === "names" ? nameLabels(layout) : markLabels(layout, view)),
    ...scenery.labels,
    ...flights.flatMap((flight) => numberLabels(flight, layout, view)),
  ];
  const frame = {
    left: 2,
    top: 1,
    right: width - 2,
    bottom: MARGIN.top + scale * (bounds.high - bounds.low) + 8,
  };
  const placed = placeLabels(labels, frame, obstacles(layout, poses, view, ruled.lines), ruled.boxes);
  return {
    width,
    height: ruled.bottom,
    body: [
      ...scenery.shapes,
      ...flights.flatMap((flight, i) => [
        ...outlines(flight, poses[i], layout),
        ...line(flight, layout, view),
      ]),
      ...flights.flatMap(({ marks }) =>
        marks.map((mark) => sign(mark, toPage(inView(view, mark.place)), view)),
      ),
      ...ruled.body,
      ...placed.map(labelMarkup),
    ].join("\n"),
    drawn: flights.flatMap(({ drawn }) => drawn.map(({ number }) => number)),
    every: Math.max(...flights.map(({ every }) => every)),
    crowded: layout.crowded,
    scale,
    notes: scenery.beyond,
  };
}

function outlines({ exposures, looks }: LaidFlight, poses: readonly Pose[], { toPage }: ArcLayout): string[] {
  const { outline = "body", ends = "picked" } = looks ?? {};
  const outer = [exposures[0].number, exposures[exposures.length - 1].number];
  return poses.map(({ rings, number }) =>
    element("path", {
      class: outer.includes(number) ? ends : outline,
      d: pathData(
        rings.map((ring) => onPage(ring, toPage)),
        { closed: true, decimals: 1 },
      ),
    }),
  );
}

/** The centre of mass's path, and where on it the exposures are. */
function line({ path, drawn, looks, isMute }: LaidFlight, { toPage }: ArcLayout, view: View): string[] {
  const dots = drawn.map(({ centerOfMass }) => {
    const [cx, cy] = toPage(inView(view, centerOfMass));
    return element("circle", { class: "spot", cx, cy, r: 2.2 });
  });
  return [
    element("path", {
      class: looks?.path ?? "path",
      d: pathData([path.flatMap((place) => [...toPage(place)])], { decimals: 1 }),
    }),
    ...(isMute ? [] : dots),
  ];
}

/** The place asked for, where it was met, and the top, seen from the side. */
function sign({ kind }: PlaceMark, [x, y]: Point, view: View): string {
  if (kind === "met") return element("rect", { class: "met", x: x - 3, y: y - 3, width: 6, height: 6 });
  if (kind === "asked") {
    const ticks = [
      [x - 9, y, x - 3, y],
      [x + 3, y, x + 9, y],
      [x, y - 9, x, y - 3],
      [x, y + 3, x, y + 9],
    ];
    return (
      element("circle", { class: "asked", cx: x, cy: y, r: 6 }) +
      element("path", { class: "asked", d: pathData(ticks, { decimals: 1 }) })
    );
  }
  return view.name === "above"
    ? ""
    : element("path", {
        class: "sight",
        d: pathData([[x - 6, y - 9, x, y - 3, x + 6, y - 9]], { decimals: 1 }),
      });
}

const markLabels = ({ flights, toPage }: ArcLayout, view: View): Label[] =>
  flights.flatMap(({ marks }) =>
    marks.flatMap(({ kind, place, label }): Label[] => {
      if (label === undefined || (kind === "apex" && view.name === "above")) return [];
      const [x, y] = toPage(inView(view, place));
      const prefer = kind === "apex" ? [2, 1, 3] : [6, 5, 7, 4, 0];
      return [{ text: label, kind: "label", size: FONT_SIZE.label, x, y, gap: 12, isNeeded: true, prefer }];
    }),
  );

const nameLabels = ({ flights, toPage }: ArcLayout): Label[] =>
  flights.flatMap(({ path, stretch: { name } }): Label[] => {
    if (name === undefined) return [];
    const [x, y] = toPage(path[Math.floor(path.length / 2)]);
    return [{ text: name, kind: "label", size: FONT_SIZE.label, x, y, gap: 12, isNeeded: true }];
  });

const numberLabels = ({ drawn, isMute }: LaidFlight, { toPage }: ArcLayout, view: View): Label[] =>
  isMute
    ? []
    : drawn.map(({ number, centerOfMass }): Label => {
        const [x, y] = toPage(inView(view, centerOfMass));
        const prefer = [2, 6, 1, 3, 5, 7];
        return {
          text: String(number),
          kind: "number",
          size: FONT_SIZE.small,
          isBold: true,
          x,
          y,
          gap: 5,
          prefer,
        };
      });

/** Points of all that would better not be covered, px. */
function obstacles(
  { flights, toPage }: ArcLayout,
  poses: readonly (readonly Pose[])[],
  view: View,
  ruled: readonly number[][],
): number[] {
  const lines = [
    ...poses.flatMap((some) =>
      some.flatMap(({ rings }) =>
        rings.map((ring) => {
          const points = onPage(ring, toPage);
          return [...points, points[0], points[1]];
        }),
      ),
    ),
    ...flights.map(({ path }) => path.flatMap((place) => [...toPage(place)])),
    ...flights.flatMap(({ marks }) =>
      marks.map(({ place }) => {
        const [x, y] = toPage(inView(view, place));
        return [x - 7, y - 7, x + 7, y + 7, x, y, x - 7, y + 7, x + 7, y - 7];
      }),
    ),
    ...ruled,
  ];
  return lines.flatMap(pointsAlong);
}

export function onPage(ring: Float64Array, toPage: ArcLayout["toPage"]): number[] {
  const points: number[] = [];
  for (let i = 0; i < ring.length; i += 2) points.push(...toPage([ring[i], ring[i + 1]]));
  return points;
}
