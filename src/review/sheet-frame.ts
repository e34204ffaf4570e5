/** The paper that sheets of throws are drawn on, and what stands above all on it. */

import { at, type Drawing, stacked, textBlock } from "./drawing.js";
import { sheetSvg, textAt } from "./svg.js";

/** px */
const WIDTH = 960;
const EDGE = 28;
/** What a drawing may take up. */
export const INNER = WIDTH - 2 * EDGE;

/** Parts below each other, with the gap between them, as a whole sheet. */
export function framed(parts: readonly Drawing[], gap: number, title: string, description: string): string {
  const drawing = stacked(parts, gap);
  return sheetSvg({
    width: WIDTH,
    height: Math.ceil(drawing.height + 2 * EDGE),
    title,
    description,
    body: [at(EDGE, EDGE, drawing)],
  });
}

/** @param which of those that have this title, on the right */
export function heading(title: string, which: string, sentence: string): Drawing {
  const line: Drawing = {
    width: INNER,
    height: 22,
    body: `${textAt(0, 14, title, { class: "title" })}\n${textAt(INNER, 14, which, { class: "faint", "text-anchor": "end" })}`,
  };
  return stacked([line, textBlock([{ text: sentence, look: "sentence" }], INNER)], 4);
}
