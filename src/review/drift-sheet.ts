/** A take that drifted, on paper: as it was over as it is. */

import type { Vec3 } from "../math/vec3.js";
import type { Drawing } from "./drawing.js";
import { type DriftPair, type DriftSide, driftPairs } from "./drift-layers.js";
import { driftMoments } from "./drift-moments.js";
import { driftPanel } from "./drift-panel.js";
import { driftRow } from "./drift-row.js";
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
    ...(arcs.length > 0 ? [...inColumns(arcPanels(arcs)), ...inColumns(enlargedPanels(arcs))] : []),
    ...pairs.map((pair) => driftRow(pair, pairs.length > 1, INNER)),
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
    return panel(
      [pair],
      sideView(pair.ahead),
      { isNumbered: true },
      `${title}. Numbers: equal shares of the time from release to arrival.`,
    );
  });
  if (leavesPlane(paths, first.ahead))
    panels.push(
      panel(
        pairs,
        viewFromAbove(first.ahead),
        { isNumbered: pairs.length === 1 },
        "Seen from above, the first throw from left to right.",
      ),
    );
  return panels;
}

const enlargedPanels = (pairs: readonly DriftPair[]): Panel[] =>
  driftMoments(pairs).map(({ pair, caption }) =>
    panel([pair], sideView(pair.ahead), { height: ENLARGED }, caption),
  );

function panel(
  pairs: readonly DriftPair[],
  view: View,
  { isNumbered = false, height: own }: { isNumbered?: boolean; height?: number },
  caption: string,
): Panel {
  const before = pairs.flatMap((pair) => pair.before ?? []);
  const now = pairs.flatMap((pair) => pair.now ?? []);
  return (width, height) =>
    captioned(
      driftPanel({ before, now, view, width, height: own ?? height, isNumbered, zero: pairs[0].release }),
      caption,
    );
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

function leavesPlane(path: readonly Vec3[], ahead: Vec3): boolean {
  const size = Math.max(
    ...[0, 1, 2].map((i) => {
      const values = path.map((place) => place[i]);
      return Math.max(...values) - Math.min(...values);
    }),
  );
  return outOfPlane(path, ahead) > LEAVES_PLANE * size;
}
