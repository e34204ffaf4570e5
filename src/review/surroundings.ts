/** What stands round a flight: marks, floor, heights and boxes. */

import type { FlownPart, Mark, Motion } from "../bake/take-motion.js";
import { rotate } from "../math/quat.js";
import { add, distance, type Vec3 } from "../math/vec3.js";
import type { Stretch } from "./course.js";
import { metres, numeralMetres } from "./figures.js";
import { FONT_SIZE } from "./look.js";
import type { Label } from "./place-labels.js";
import { around, type Bounds, clipped, convexHull2d, NOWHERE, type Point, type Thing } from "./plane.js";
import { element, pathData } from "./svg.js";
import { inView, type View } from "./view.js";

export interface PlaceMark {
  kind: "asked" | "met" | "apex";
  /** World frame, m. */
  place: Vec3;
  label?: string;
}

/** m; what misses by less has met its mark. */
const MET = 1e-4;

/** Ends of a flight, marks asked for and where they were met, and the highest point. */
export function marksOf(motion: Motion, { from, to, part, travels }: Stretch): PlaceMark[] {
  if (!part)
    return [
      { kind: "met", place: motion.centerOfMass(from), label: "start" },
      ...(travels ? [{ kind: "met" as const, place: motion.centerOfMass(to), label: "end" }] : []),
    ];
  const apex = part.apex;
  const isWithin = apex !== null && apex > from && apex < to;
  const top = isWithin ? motion.centerOfMass(apex) : undefined;
  return [
    ...endMarks(motion, from, "release", part.release),
    ...endMarks(motion, to, part.floor === undefined ? "arrival" : "first touch", part.arrival),
    ...(top ? [{ kind: "apex" as const, place: top, label: `top ${metres(top[1])}` }] : []),
  ];
}

function endMarks(motion: Motion, t: number, name: string, { point, offset, asked }: Mark): PlaceMark[] {
  const place = add(motion.centerOfMass(t), rotate(motion.rotation(t), offset));
  const what = point === "centerOfMass" ? name : `${name} (${point})`;
  if (!asked) return [{ kind: "met", place, label: what }];
  const miss = distance(asked, place);
  return [
    { kind: "asked", place: asked },
    {
      kind: "met",
      place,
      label: miss < MET ? `${what}, on its mark` : `${what}, ${numeralMetres(miss)} off its mark`,
    },
  ];
}

export interface Surroundings {
  bounds: Thing[];
  draw(
    bounds: Bounds,
    toPage: (place: Point | Vec3) => Point,
  ): { shapes: string[]; labels: Label[]; beyond: string[] };
}

export function surroundingsOf(stretches: readonly Stretch[], view: View): Surroundings {
  const parts = stretches.flatMap(({ part }) => part ?? []);
  const levels = view.name === "side" ? unique(parts.flatMap(levelsOf)) : [];
  const boxes = unique(stretches.flatMap((stretch) => boxesOf(stretch, view)));
  return {
    bounds: [
      ...levels.map(({ height }) => ({ bounds: { ...NOWHERE, low: height, high: height }, isWhole: true })),
      ...boxes.map(({ whole }) => ({ bounds: whole.reduce(around, NOWHERE), isWhole: false })),
    ],
    draw(bounds, toPage) {
      const inside = levels.filter(
        ({ height }) => height >= bounds.low - 1e-9 && height <= bounds.high + 1e-9,
      );
      const within = (hull: readonly Point[]) => [clipped(hull, bounds)].filter((rest) => rest.length > 2);
      const seen = boxes.flatMap(({ whole }) => within(whole));
      const drawn = (look: string, hull: readonly Point[]) =>
        element("path", {
          class: look,
          d: pathData([hull.flatMap((p) => [...toPage(p)])], { closed: true, decimals: 1 }),
        });
      return {
        shapes: [
          ...seen.map((hull) => drawn("hair", hull)),
          ...boxes.flatMap(({ cut }) => within(cut)).map((hull) => drawn("box", hull)),
          ...inside.map(({ height, kind }) =>
            levelLine(kind, toPage([bounds.left, height]), toPage([bounds.right, height])),
          ),
        ],
        labels: [
          ...inside.map(({ height, words, kind }): Label => {
            const [x, y] = toPage([bounds.right, height]);
            return {
              text: words,
              kind: "label",
              size: FONT_SIZE.label,
              x: x - 4,
              y,
              gap: kind === "floor" ? 8 : 4,
              isNeeded: true,
              prefer: kind === "floor" ? [5, 6, 3] : [3, 5],
            };
          }),
          ...seen.map((hull): Label => {
            const [x, y] = toPage(hull.reduce((top, p) => (p[1] > top[1] ? p : top)));
            return {
              text: "keep clear",
              kind: "label",
              size: FONT_SIZE.label,
              x,
              y,
              gap: 5,
              prefer: [2, 1, 3],
            };
          }),
        ],
        beyond: levels
          .filter((level) => !inside.includes(level))
          .map(({ words }) => `${words} lies outside the picture`),
      };
    },
  };
}

/** A box as a view shows it, and its cut with the upright plane that the flight is in. */
interface SeenBox {
  whole: Point[];
  cut: Point[];
  words: string;
}

function boxesOf({ part, flight }: Stretch, view: View): SeenBox[] {
  if (!part || !flight) return [];
  const start = inView(view, part.launch.centerOfMass)[2];
  return part.boxes.map((box) => {
    const seen = corners(box).map((corner) => inView(view, corner));
    const isAbove = view.name === "above";
    return {
      whole: convexHull2d(seen.map(flat)),
      cut: convexHull2d(isAbove ? seen.map(flat) : cutPoints(seen, start)),
      words: JSON.stringify(box),
    };
  });
}

/** Where the edges between corners (view's axes) pass a depth; lines between other corners pass it within the cut. */
const cutPoints = (seen: readonly Vec3[], depth: number): Point[] =>
  seen.flatMap((a, i) =>
    seen.slice(i + 1).flatMap((b): Point[] => {
      if (a[2] < depth === b[2] < depth) return [];
      const share = (depth - a[2]) / (b[2] - a[2]);
      return [[a[0] + share * (b[0] - a[0]), a[1] + share * (b[1] - a[1])]];
    }),
  );

interface Level {
  kind: "floor" | "limit";
  /** m */
  height: number;
  words: string;
}

const levelsOf = ({ floor, minHeight, maxHeight }: FlownPart): Level[] => [
  ...level("floor", floor, "floor at"),
  ...level("limit", minHeight, "limit: no lower than"),
  ...level("limit", maxHeight, "limit: no higher than"),
];

const level = (kind: Level["kind"], height: number | undefined, words: string): Level[] =>
  height === undefined ? [] : [{ kind, height, words: `${words} ${metres(height)}` }];

const unique = <T extends { words: string }>(things: readonly T[]): T[] =>
  things.filter(({ words }, i) => things.findIndex((other) => other.words === words) === i);

function levelLine(kind: Level["kind"], [left, y]: Point, [right]: Point): string {
  const line = element("path", { class: kind, d: pathData([[left, y, right, y]], { decimals: 1 }) });
  if (kind === "limit") return line;
  const strokes = Array.from({ length: Math.floor((right - left) / 12) + 1 }, (_, i) => {
    const x = left + 12 * i;
    return [x, y, Math.max(left - 5, x - 5), y + 5];
  });
  return line + element("path", { class: "hair", d: pathData(strokes, { decimals: 1 }) });
}

const flat = ([x, y]: Vec3): Point => [x, y];

function corners({ center, half, rotation }: FlownPart["boxes"][number]): Vec3[] {
  const signs = [-1, 1];
  return signs.flatMap((x) =>
    signs.flatMap((y) =>
      signs.map((z) => add(center, rotate(rotation, [x * half[0], y * half[1], z * half[2]]))),
    ),
  );
}
