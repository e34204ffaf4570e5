/** A take on paper: its outlines along the arc, and below them the same poses in place. */

import type { Vec3 } from "../math/vec3.js";
import { type ArcPanel, arcPanel } from "./arc-panel.js";
import { pathOf, type Stretch, stretchesOf } from "./course.js";
import { inPairs, stacked, textBlock } from "./drawing.js";
import { type Exposure, exposuresOf } from "./exposures.js";
import { capital, counted } from "./figures.js";
import { type Turning, turningOf } from "./picked-axis.js";
import { framed, heading, INNER } from "./sheet-frame.js";
import type { SheetProp, SheetTake, ThrowSheetInput } from "./sheet-input.js";
import { courseWords, throwSentence } from "./throw-sentence.js";
import { turningRows } from "./turning-rows.js";
import { courseOf, leavesPlane, sideView, type View, viewFromAbove } from "./view.js";

/** Greatest height of what is drawn of one flight alone, and of one beside others, px. */
const TALL = 440;
const SMALL = 250;
const GAP = 16;
/** Of its size: a path further out of an upright plane is shown from above too. */
const LEAVES_PLANE = 0.02;

/** A flight with all that is told of it. */
export interface Told {
  stretch: Stretch;
  exposures: Exposure[];
  turning: Turning;
  /** Level unit vector. */
  ahead: Vec3;
  view: View;
}

/**
 * The first of the takes as a sheet of SVG: a stroboscopic picture of its arc, from the side (and from above where it leaves its plane), and its turning
 * row. Of a chain each throw has its own.
 */
export function throwSheet({ title, prop, takes, takeCount = takes.length }: ThrowSheetInput): string {
  const [take] = takes;
  const told = tellEach(prop, take);
  const sentence = throwSentence(prop, take, told);
  const panels = arcs(prop, take, told);
  const onArc = new Set(panels.flatMap(({ drawn }) => drawn));
  const which = `${take.name}${takeCount > 1 ? `, one of ${counted(takeCount)} takes` : ""}`;
  const parts = [
    heading(title, which, sentence),
    ...(panels.length === 1 ? panels : inPairs(panels, GAP)),
    ...turningRows(prop, told, onArc, INNER),
  ];
  return framed(parts, GAP, `${title}: ${take.name}`, sentence);
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

interface ArcInput {
  told: readonly Told[];
  view: View;
}

/** Of one flight as wide as the sheet, of several half so wide and in one scale. */
function arcs(prop: SheetProp, take: SheetTake, told: readonly Told[]): ArcPanel[] {
  const flown = told.filter(({ stretch }) => stretch.travels);
  if (flown.length === 0) return [];
  const [{ ahead }] = flown;
  const inputs: ArcInput[] = flown.map((one) => ({ told: [one], view: one.view }));
  const path = flown.flatMap(({ stretch }) => pathOf(take.motion, stretch, 24));
  if (leavesPlane(path, ahead, LEAVES_PLANE)) inputs.push({ told: flown, view: viewFromAbove(ahead) });
  if (inputs.length === 1) return [captioned(draw(prop, take, inputs[0], INNER, TALL), inputs[0], take)];
  const width = INNER / 2 - GAP / 2;
  const most = Math.min(...inputs.map((input) => draw(prop, take, input, width, SMALL).scale));
  return inputs.map((input) => captioned(draw(prop, take, input, width, SMALL, most), input, take));
}

const draw = (
  prop: SheetProp,
  { motion }: SheetTake,
  { told, view }: ArcInput,
  width: number,
  height: number,
  mostScale?: number,
) =>
  arcPanel({
    prop,
    flights: told.map(({ stretch, exposures }) => ({ motion, stretch, exposures })),
    view,
    labels: told.length > 1 ? "names" : "marks",
    width,
    height,
    mostScale,
  });

function captioned(panel: ArcPanel, { told, view }: ArcInput, take: SheetTake): ArcPanel {
  const [{ stretch, exposures }] = told;
  const isPart = view.name === "side" && (take.take?.parts.length ?? 1) > 1;
  const seen =
    view.name === "side"
      ? "Seen from the side, thrown from left to right"
      : `Seen from above, ${told.length > 1 ? "the first throw" : "thrown"} from left to right`;
  const which = `every ${ordinal(panel.every)} of the ${exposures.length} poses below is shown`;
  const apart = panel.crowded ? "; even so some overlap" : ", so that the outlines stay apart";
  const thinned = panel.every > 1 ? `; ${which}${apart}` : panel.crowded ? "; the outlines overlap" : "";
  const notes = panel.notes.map((note) => ` ${capital(note)}.`).join("");
  const text = textBlock(
    [
      ...(isPart && stretch.name ? [{ text: stretch.name, look: "heading" } as const] : []),
      ...(isPart ? [{ text: `${capital(courseWords(take, stretch))}.`, look: "label" } as const] : []),
      { text: `${seen}${thinned}.${signs(told, view)}${notes}`, look: "faint" },
    ],
    panel.width,
  );
  return { ...panel, ...stacked([text, panel], 6) };
}

/** What the marks mean, where there are any. */
function signs(told: readonly Told[], view: View): string {
  const parts = told.flatMap(({ stretch }) => stretch.part ?? []);
  const isAsked = parts.some(({ release, arrival }) => release.asked || arrival.asked);
  if (view.name === "above" || told[0].exposures[0].number > 1) return "";
  return ` Line: its centre of mass. Square: release and arrival${isAsked ? "; ring: place asked for" : ""}.`;
}

const ordinal = (n: number): string => (n === 2 ? "2nd" : n === 3 ? "3rd" : `${n}th`);
