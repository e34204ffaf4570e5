/** A take that drifted, on paper: as it was over as it is. */

import { type Drawing, inPairs, stacked, textBlock } from "./drawing.js";
import { type DriftPair, type DriftSide, driftPairs } from "./drift-layers.js";
import { driftMoments } from "./drift-moments.js";
import { driftPanel } from "./drift-panel.js";
import { driftRow } from "./drift-row.js";
import { FONT_SIZE } from "./look.js";
import { framed, heading, INNER } from "./sheet-frame.js";
import { element, pathData, textAt } from "./svg.js";
import { textWidth } from "./text-size.js";
import { leavesPlane, sideView, type View, viewFromAbove } from "./view.js";

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
    heading(name, "what drifted", `${text}.`),
    legend([
      ["now", `now: ${nowName}`],
      ["before", `before: ${beforeName}`],
    ]),
    ...(arcs.length > 0 ? [...inColumns(arcPanels(arcs)), ...inColumns(enlargedPanels(arcs))] : []),
    ...pairs.map((pair) => driftRow(pair, pairs.length > 1, INNER)),
  ];
  return framed(
    drawings,
    GAP,
    `${name}: what drifted`,
    `${text}. Dashed and empty: before, ${beforeName}. Filled and drawn through: now, ${nowName}.`,
  );
}

function legend(entries: readonly (readonly ["now" | "before", string])[]): Drawing {
  let x = 0;
  const body = entries.flatMap(([side, text]) => {
    const left = x;
    x += 52 + textWidth(text, FONT_SIZE.label);
    const box = [left + 1, 2, left + 29, 2, left + 29, 14, left + 1, 14];
    return [
      element("path", {
        class: side === "now" ? "body" : "body-before",
        d: pathData([box], { closed: true, decimals: 1 }),
      }),
      textAt(left + 36, 13, text, { class: "label" }),
    ];
  });
  return { width: INNER, height: 16, body: body.join("\n") };
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
  if (leavesPlane(paths, first.ahead, LEAVES_PLANE))
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
  return stacked([textBlock([{ text: caption, look: "faint" }], drawing.width), drawing], 4);
}

/** One over the whole width, or two beside each other. */
function inColumns(panels: readonly Panel[]): Drawing[] {
  if (panels.length === 1) return [panels[0](INNER, TALL)];
  return inPairs(
    panels.map((draw) => draw(HALF, SMALL)),
    GAP,
  );
}
