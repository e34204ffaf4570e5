/** A take that drifted, on paper: as it was over as it is. */

import { angleBetween } from "../math/quat.js";
import { distance, type Vec3 } from "../math/vec3.js";
import type { Drawing } from "./drawing.js";
import {
  type DriftLayer,
  type DriftPair,
  type DriftPose,
  type DriftSide,
  driftPairs,
} from "./drift-layers.js";
import { driftOutline, driftPanel } from "./drift-panel.js";
import { capital, fixed } from "./figures.js";
import { FONT_SIZE } from "./look.js";
import { element, pathData, sheetSvg, textAt } from "./svg.js";
import { textWidth, wrapped } from "./text-size.js";
import { outOfPlane, sideView, type View, viewFromAbove } from "./view.js";

export interface DriftSheetInput {
  /** Of the clip. */
  name: string;
  /** What drifted, in words, the clip's name among them. */
  text: string;
  before: DriftSide;
  now: DriftSide;
  /** Where each comes from: "out", "quay.throws.yaml". */
  beforeName: string;
  nowName: string;
}

const WIDTH = 960;
const EDGE = 28;
const INNER = WIDTH - 2 * EDGE;
const GAP = 16;
const HALF = (INNER - GAP) / 2;
/** Greatest height of one panel alone, of one beside another, and of an enlarged one, px. */
const TALL = 400;
const SMALL = 250;
const ENLARGED = 200;
/** Of its size: a path further out of an upright plane is shown from above too. */
const LEAVES_PLANE = 0.02;

/**
 * A sheet of SVG: the arc from the side (and from above where it leaves its plane), release and arrival enlarged, and the poses in place. As it was is
 * empty and dashed, as it is filled and drawn through.
 */
export function driftSheet({ name, text, before, now, beforeName, nowName }: DriftSheetInput): string {
  const pairs = driftPairs(before, now);
  const arcs = pairs.filter((pair) => pair.now?.travels || pair.before?.travels);
  const drawings = [
    heading(name, text, beforeName, nowName),
    ...(arcs.length > 0 ? [...inColumns(arcPanels(arcs)), ...inColumns(endPanels(arcs))] : []),
    ...pairs.flatMap((pair) => inPlace(pair, pairs.length > 1)),
  ];
  let y = 0;
  const body = drawings.map((drawing) => {
    const placed = element("g", { transform: `translate(${EDGE} ${Math.round(y)})` }, `\n${drawing.body}\n`);
    y += drawing.height;
    return placed;
  });
  return sheetSvg({
    width: WIDTH,
    height: Math.ceil(y + EDGE / 2),
    title: `${name}: what drifted`,
    description: `${text}. Dashed and empty: before, ${beforeName}. Filled and drawn through: now, ${nowName}.`,
    body,
  });
}

function heading(name: string, text: string, beforeName: string, nowName: string): Drawing {
  const lines = wrapped(`${text}.`, FONT_SIZE.sentence, INNER);
  const step = FONT_SIZE.sentence * 1.4;
  const base = 40 + (lines.length + 0.5) * step + 14;
  return {
    width: INNER,
    height: base + 22,
    body: [
      textAt(0, 40, name, { class: "title" }),
      textAt(INNER, 40, "what drifted", { class: "faint", "text-anchor": "end" }),
      ...lines.map((line, i) => textAt(0, 40 + (i + 1.2) * step, line, { class: "sentence" })),
      ...legend(
        [
          ["now", `now: ${nowName}`],
          ["before", `before: ${beforeName}`],
        ],
        base,
      ),
    ].join("\n"),
  };
}

function legend(entries: readonly (readonly ["now" | "before", string])[], base: number): string[] {
  let x = 0;
  return entries.flatMap(([side, text]) => {
    const at = x;
    x += 52 + textWidth(text, FONT_SIZE.label);
    const box = [at + 1, base - 11, at + 29, base - 11, at + 29, base + 1, at + 1, base + 1];
    return [
      element("path", {
        class: side === "now" ? "body" : "body-before",
        d: pathData([box], { closed: true, decimals: 1 }),
      }),
      textAt(at + 36, base, text, { class: "label" }),
    ];
  });
}

/** A part of the sheet that is not placed yet: its width is not known. */
type Panel = (width: number, height: number) => Drawing;

function arcPanels(pairs: readonly DriftPair[]): Panel[] {
  const [first] = pairs;
  const paths = pairs.flatMap(({ before, now }) => [...(before?.path ?? []), ...(now?.path ?? [])]);
  const panels = pairs.map((pair): Panel => {
    const title =
      pairs.length > 1 && pair.name
        ? `${pair.name}, from the side`
        : "Seen from the side, thrown from left to right";
    return panel([pair], sideView(pair.ahead), true, `${title}. Numbers: the poses below.`);
  });
  if (leavesPlane(paths, first.ahead))
    panels.push(
      panel(pairs, viewFromAbove(first.ahead), true, "Seen from above, the first throw from left to right."),
    );
  return panels;
}

/** The first pose of all and the last, so large that little is seen. */
function endPanels(pairs: readonly DriftPair[]): Panel[] {
  const [first, last] = [pairs[0], pairs[pairs.length - 1]];
  return [
    endPanel(first, (poses) => poses[0], "Release"),
    endPanel(last, (poses) => poses[poses.length - 1], "Arrival"),
  ];
}

function endPanel(pair: DriftPair, pick: (poses: readonly DriftPose[]) => DriftPose, what: string): Panel {
  const alone = (layer: DriftLayer | undefined): DriftLayer | undefined =>
    layer && { ...layer, poses: [pick(layer.poses)], path: [] };
  const [before, now] = [alone(pair.before), alone(pair.now)];
  const apart = before && now ? `: ${apartText(before.poses[0], now.poses[0])}` : "";
  return panel([{ ...pair, before, now }], sideView(pair.ahead), false, `${what}, enlarged${apart}.`);
}

function panel(pairs: readonly DriftPair[], view: View, isNumbered: boolean, caption: string): Panel {
  return (width, height) => {
    const before = pairs.flatMap((pair) => pair.before ?? []);
    const now = pairs.flatMap((pair) => pair.now ?? []);
    const most = isNumbered ? height : ENLARGED;
    return captioned(driftPanel({ before, now, view, width, height: most, isNumbered }), caption);
  };
}

function captioned(drawing: Drawing, caption: string): Drawing {
  const lines = wrapped(caption, FONT_SIZE.label, drawing.width);
  const step = FONT_SIZE.label * 1.35;
  const top = Math.round(lines.length * step);
  return {
    ...drawing,
    height: drawing.height + top + 14,
    body: [
      ...lines.map((line, i) => textAt(0, (i + 0.6) * step, line, { class: "faint" })),
      element("g", { transform: `translate(0 ${top})` }, `\n${drawing.body}\n`),
    ].join("\n"),
  };
}

/** One over the whole width, or two beside each other. */
function inColumns(panels: readonly Panel[]): Drawing[] {
  if (panels.length === 1) return [panels[0](INNER, TALL)];
  const drawings = panels.map((draw) => draw(HALF, SMALL));
  return Array.from({ length: Math.ceil(drawings.length / 2) }, (_, row) => {
    const pair = drawings.slice(2 * row, 2 * row + 2);
    return {
      width: INNER,
      height: Math.max(...pair.map(({ height }) => height)),
      body: pair
        .map(({ body }, i) =>
          element("g", { transform: `translate(${Math.round(i * (HALF + GAP))} 0)` }, `\n${body}\n`),
        )
        .join("\n"),
    };
  });
}

/** Of a pose in place, and of the text below it, px. */
const CELL = { most: 104, text: 30 };

/** The same poses about their centres of mass, side by side. */
function inPlace({ name, before, now, ahead }: DriftPair, isNamed: boolean): Drawing[] {
  const count = Math.max(before?.poses.length ?? 0, now?.poses.length ?? 0);
  const cell = INNER / count;
  const room = Math.min(cell - 6, CELL.most);
  const scale = room / (2 * Math.max(before?.prop.reach ?? 0, now?.prop.reach ?? 0));
  const view = sideView(ahead);
  const top = 30;
  const cells = Array.from({ length: count }, (_, i) => {
    const place = [cell * (i + 0.5), top + room / 2] as const;
    const [old, fresh] = [before?.poses[i], now?.poses[i]];
    const turned = old && fresh ? `${fixed(degreesBetween(old, fresh), 1)}°` : "";
    return [
      ...(now && fresh ? [driftOutline(now.prop, fresh, view, scale, place, "now")] : []),
      ...(before && old ? [driftOutline(before.prop, old, view, scale, place, "before")] : []),
      textAt(place[0], top + room + 14, String(i + 1), { class: "number", "text-anchor": "middle" }),
      textAt(place[0], top + room + 27, turned, { class: "small", "text-anchor": "middle" }),
    ].join("\n");
  });
  const title = `${isNamed && name ? `${name}: the` : "The"} same poses in place, turning only`;
  const which = !now ? " (gone)" : before ? ", and by how much they are turned from each other" : " (new)";
  return [
    {
      width: INNER,
      height: top + room + CELL.text + 12,
      body: [textAt(0, 14, `${capital(title)}${which}`, { class: "heading" }), ...cells].join("\n"),
    },
  ];
}

function apartText(before: DriftPose, now: DriftPose): string {
  const far = distance(before.centerOfMass, now.centerOfMass);
  const length = far < 1 ? `${Number((far * 1000).toPrecision(2))} mm` : `${fixed(far, 2)} m`;
  return `${length} apart, turned by ${fixed(degreesBetween(before, now), 1)}°`;
}

const degreesBetween = (a: DriftPose, b: DriftPose): number =>
  (angleBetween(a.rotation, b.rotation) * 180) / Math.PI;

function leavesPlane(path: readonly Vec3[], ahead: Vec3): boolean {
  const size = Math.max(
    ...[0, 1, 2].map((i) => {
      const values = path.map((place) => place[i]);
      return Math.max(...values) - Math.min(...values);
    }),
  );
  return outOfPlane(path, ahead) > LEAVES_PLANE * size;
}
