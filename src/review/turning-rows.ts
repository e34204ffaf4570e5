/** The turning rows of a take, with what they show in words. */

import { type Drawing, type Paragraph, stacked, textBlock } from "./drawing.js";
import type { Exposure } from "./exposures.js";
import { capital, fixed } from "./figures.js";
import type { Turning } from "./picked-axis.js";
import type { SheetProp } from "./sheet-input.js";
import type { Told } from "./throw-sheet.js";
import { turningRow } from "./turning-row.js";
import { axisMeaning, axisName, turningPhrase } from "./turning-words.js";
import { sideView, viewFromAbove } from "./view.js";

/** Cosine of the angle within which what turns about an upright axis is shown from above too. */
const UPRIGHT = 0.8;

/** One for each flight; where it is the shape from above that turns, another from there. */
export function turningRows(
  prop: SheetProp,
  told: readonly Told[],
  onArc: ReadonlySet<number>,
  width: number,
): Drawing[] {
  return told.flatMap(({ stretch, exposures, turning, ahead }, i) => {
    const { about } = turning;
    const isUpright = about !== undefined && turning.isSpun && Math.abs(about[1]) > UPRIGHT;
    const views = [sideView(ahead), ...(isUpright && told.length === 1 ? [viewFromAbove(ahead)] : [])];
    return views.map((view, v) => {
      const title = v > 0 ? "The same from above" : "The same poses in place, turning only";
      const phrase = turningPhrase(turning, stretch.turns, ahead, stretch.part?.launch.velocity);
      const words: Paragraph[] = [
        { text: told.length > 1 && stretch.name ? `${stretch.name}: ${phrase}` : title, look: "heading" },
        ...(i + v === 0 ? [{ text: capital(explanation(turning, exposures)), look: "faint" } as const] : []),
      ];
      const row = turningRow({
        prop,
        exposures,
        onArc: onArc.size > 0 ? onArc : undefined,
        view,
        picked: about ? turning : undefined,
        width,
      });
      return stacked([textBlock(words, width), row], 4);
    });
  });
}

function explanation({ name, about }: Turning, exposures: readonly Exposure[]): string {
  const step = exposures.length > 1 ? `, ${fixed((exposures[1].t - exposures[0].t) * 1000, 0)} ms apart` : "";
  const poses = `${exposures.length} poses${step}`;
  if (!about) return `${poses}.`;
  return `${poses}. Arrow: its ${axisName(name)} (${axisMeaning[name]}); the head is filled while it points towards you, and a ring is an arrow seen end on. Thin arm: square to the arrow, with a dot at its end when that is on the near side and a small ring when on the far one.`;
}
