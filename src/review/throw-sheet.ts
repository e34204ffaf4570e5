/** A take on paper: its outlines along the arc, and below them the same poses in place. */

import type { Vec3 } from "../math/vec3.js";
import { type ArcPanel, arcPanel } from "./arc-panel.js";
import { pathOf, type Stretch, stretchesOf } from "./course.js";
import type { Drawing } from "./drawing.js";
import { type Exposure, exposuresOf } from "./exposures.js";
import { capital, counted, fixed } from "./figures.js";
import { FONT_SIZE } from "./look.js";
import { type Turning, turningOf } from "./picked-axis.js";
import type { SheetProp, SheetTake, ThrowSheetInput } from "./sheet-input.js";
import { element, sheetSvg, textAt } from "./svg.js";
import { wrapped } from "./text-size.js";
import { courseWords, throwSentence } from "./throw-sentence.js";
import { turningRow } from "./turning-row.js";
import { axisMeaning, axisName, turningPhrase } from "./turning-words.js";
import { courseOf, outOfPlane, sideView, type View, viewFromAbove } from "./view.js";

const WIDTH = 960;
const EDGE = 28;
const INNER = WIDTH - 2 * EDGE;
/** Greatest height of what is drawn of one flight alone, and beside others, px. */
const TALL = 440;
const SMALL = 250;
/** Of its size: a path further out of an upright plane is shown from above too. */
const LEAVES_PLANE = 0.02;

interface Told {
  stretch: Stretch;
  exposures: Exposure[];
  turning: Turning;
  ahead: Vec3;
  view: View;
}

/**
 * The first of the takes as a sheet of SVG: a stroboscopic picture of its arc, from the side (and from above where it leaves its plane), and its turning row.
 * Of a chain each throw has its own.
 */
export function throwSheet({ title, prop, takes, takeCount = takes.length }: ThrowSheetInput): string {
  const [take] = takes;
  const told = tellEach(prop, take);
  const sentence = throwSentence(prop, take, told);
  const drawings = [
    heading(title, sentence, `${take.name}${takeCount > 1 ? `, one of ${counted(takeCount)} takes` : ""}`),
    ...arcs(prop, take, told),
  ];
  const shown = new Set(
    drawings.flatMap((drawing) => ("drawn" in drawing ? (drawing as ArcPanel).drawn : [])),
  );
  drawings.push(...rows(prop, told, shown));
  let y = 0;
  const body = drawings.map((drawing) => {
    const placed = element("g", { transform: `translate(${EDGE} ${Math.round(y)})` }, `\n${drawing.body}\n`);
    y += drawing.height;
    return placed;
  });
  return sheetSvg({
    width: WIDTH,
    height: Math.ceil(y + EDGE / 2),
    title: `${title}: ${take.name}`,
    description: sentence,
    body,
  });
}

function tellEach(prop: SheetProp, take: SheetTake): Told[] {
  let number = 1;
  return stretchesOf(take).map((stretch) => {
    const exposures = exposuresOf(take, stretch, number);
    number += exposures.length;
    const ahead = courseOf(pathOf(take.motion, stretch, 16));
    return { stretch, exposures, ahead, view: sideView(ahead), turning: turningOf(prop, take, stretch) };
  });
}

function heading(title: string, sentence: string, which: string): Drawing {
  const lines = wrapped(sentence, FONT_SIZE.sentence, INNER);
  const step = FONT_SIZE.sentence * 1.4;
  return {
    width: INNER,
    height: 62 + lines.length * step,
    body: [
      textAt(0, 40, title, { class: "title" }),
      textAt(INNER, 40, which, { class: "faint", "text-anchor": "end" }),
      ...lines.map((line, i) => textAt(0, 40 + (i + 1.2) * step, line, { class: "sentence" })),
    ].join("\n"),
  };
}

function arcs(prop: SheetProp, take: SheetTake, told: readonly Told[]): Drawing[] {
  const flown = told.filter(({ stretch }) => stretch.travels);
  if (flown.length === 0) return [];
  const [first] = flown;
  const path = flown.flatMap(({ stretch }) => pathOf(take.motion, stretch, 24));
  const above: ArcInput | undefined = leavesPlane(path, first.ahead)
    ? { told: flown, view: viewFromAbove(first.ahead) }
    : undefined;
  const inputs: ArcInput[] = [
    ...flown.map((one) => ({ told: [one], view: one.view })),
    ...(above ? [above] : []),
  ];
  return inputs.length === 1
    ? [captioned(draw(prop, take, inputs[0], INNER, TALL), inputs[0], INNER)]
    : grid(prop, take, inputs);
}

interface ArcInput {
  told: readonly Told[];
  view: View;
}

const draw = (
  prop: SheetProp,
  { motion }: SheetTake,
  { told, view }: ArcInput,
  width: number,
  height: number,
  mostScale?: number,
) => arcPanel({ prop, motion, flights: told, view, width, height, mostScale });

/** Two beside each other, all in one scale. */
function grid(prop: SheetProp, take: SheetTake, inputs: readonly ArcInput[]): Drawing[] {
  const width = INNER / 2 - 8;
  const most = Math.min(...inputs.map((input) => draw(prop, take, input, width, SMALL).scale));
  const panels = inputs.map((input) =>
    captioned(draw(prop, take, input, width, SMALL, most), input, width, take),
  );
  return Array.from({ length: Math.ceil(panels.length / 2) }, (_, row) => {
    const pair = panels.slice(2 * row, 2 * row + 2);
    return {
      width: INNER,
      height: Math.max(...pair.map(({ height }) => height)),
      drawn: pair.flatMap(({ drawn }) => drawn),
      body: pair
        .map(({ body }, i) =>
          element("g", { transform: `translate(${Math.round(i * (INNER / 2 + 8))} 0)` }, `\n${body}\n`),
        )
        .join("\n"),
    };
  });
}

function captioned(panel: ArcPanel, { told, view }: ArcInput, width: number, take?: SheetTake): ArcPanel {
  const [{ stretch, exposures }] = told;
  const side =
    view.name === "side"
      ? "Seen from the side, the throw from left to right"
      : "Seen from above, the first throw from left to right";
  const thinned =
    panel.every > 1
      ? `; every ${ordinal(panel.every)} of the ${exposures.length} poses below is shown, so that the outlines stay apart`
      : "";
  const head =
    take && view.name === "side" && stretch.name
      ? [`${stretch.name}: ${courseWords(take, stretch).replace(/,$/, "")}`]
      : [];
  const lines = [
    ...head.flatMap((line) => wrapped(line, FONT_SIZE.label, width)),
    ...wrapped(
      [`${side}${thinned}.`, ...panel.notes.map((note) => `${capital(note)}.`)].join(" "),
      FONT_SIZE.label,
      width,
    ),
  ];
  const step = FONT_SIZE.label * 1.35;
  const top = lines.length * step;
  return {
    ...panel,
    height: panel.height + top + 10,
    body: [
      ...lines.map((line, i) =>
        textAt(0, (i + 0.6) * step, line, { class: i < head.length ? "label" : "faint" }),
      ),
      element("g", { transform: `translate(0 ${Math.round(top)})` }, `\n${panel.body}\n`),
    ].join("\n"),
  };
}

const ordinal = (n: number): string => (n === 2 ? "2nd" : n === 3 ? "3rd" : `${n}th`);

function rows(prop: SheetProp, told: readonly Told[], shown: ReadonlySet<number>): Drawing[] {
  return told.map(({ stretch, exposures, turning, view, ahead }, i) => {
    const row = turningRow({
      prop,
      exposures,
      onArc: shown.size > 0 ? shown : undefined,
      view,
      picked: turning,
      width: INNER,
    });
    const name = told.length > 1 && stretch.name ? `${stretch.name}: ` : "";
    const phrase = capital(turningPhrase(turning, stretch.turns, ahead, stretch.part?.launch.velocity));
    const lines = [
      ...wrapped(
        `${name}${name ? phrase : "The same poses in place, turning only"}.`,
        FONT_SIZE.heading,
        INNER,
        true,
      ),
      ...(i === 0 ? wrapped(explanation(turning, exposures), FONT_SIZE.label, INNER) : []),
    ];
    const heads =
      lines.length - (i === 0 ? wrapped(explanation(turning, exposures), FONT_SIZE.label, INNER).length : 0);
    const step = FONT_SIZE.heading * 1.3;
    const top = lines.length * step + 6;
    return {
      width: INNER,
      height: row.height + top + 8,
      body: [
        ...lines.map((line, n) =>
          textAt(0, (n + 0.8) * step, line, { class: n < heads ? "heading" : "faint" }),
        ),
        element("g", { transform: `translate(0 ${Math.round(top)})` }, `\n${row.body}\n`),
      ].join("\n"),
    };
  });
}

function explanation({ name, about }: Turning, exposures: readonly Exposure[]): string {
  const step = exposures.length > 1 ? `, ${fixed((exposures[1].t - exposures[0].t) * 1000, 0)} ms apart` : "";
  if (!about) return `${exposures.length} poses${step}.`;
  return `${exposures.length} poses${step}. Arrow: the ${axisName(name)} (${axisMeaning[name]}), its point filled when it comes towards you. Thin arm: square to the arrow; it ends in a full dot on the near side, in a ring on the far side.`;
}

function leavesPlane(path: readonly Vec3[], ahead: Vec3): boolean {
  const size = Math.max(
    ...[0, 1, 2].map((i) => Math.max(...path.map((p) => p[i])) - Math.min(...path.map((p) => p[i]))),
  );
  return outOfPlane(path, ahead) > LEAVES_PLANE * size;
}
