/** Parts of a sheet, and how they are put together. */

import { FONT_SIZE } from "./look.js";
import { element, textAt } from "./svg.js";
import { wrapped } from "./text-size.js";

/** Drawn from its own upper left corner. */
export interface Drawing {
  /** px */
  width: number;
  height: number;
  /** SVG elements. */
  body: string;
}

export interface Paragraph {
  text: string;
  /** Class of the text. */
  look: "heading" | "sentence" | "label" | "faint" | "small";
}

const SIZES = { ...FONT_SIZE, faint: FONT_SIZE.label };
/** Line to line, times the font size. */
const LINE = 1.4;

/** Paragraphs one below the other, broken into lines. */
export function textBlock(paragraphs: readonly Paragraph[], width: number): Drawing {
  let y = 0;
  const lines = paragraphs.flatMap(({ text, look }) => {
    const size = SIZES[look];
    return wrapped(text, size, width, look === "heading").map((line) => {
      y += LINE * size;
      return textAt(0, y - 0.4 * size, line, { class: look });
    });
  });
  return { width, height: y, body: lines.join("\n") };
}

/** One below the other. */
export function stacked(drawings: readonly Drawing[], gap = 0): Drawing {
  let y = 0;
  const body = drawings.map((drawing) => {
    const placed = at(0, y, drawing);
    y += drawing.height + gap;
    return placed;
  });
  return {
    width: Math.max(...drawings.map(({ width }) => width)),
    height: Math.max(0, y - gap),
    body: body.join("\n"),
  };
}

/** Side by side, in columns of the same width. */
export const beside = (drawings: readonly Drawing[], column: number): Drawing => ({
  width: column * drawings.length,
  height: Math.max(...drawings.map(({ height }) => height)),
  body: drawings.map((drawing, i) => at(column * i, 0, drawing)).join("\n"),
});

/** Drawings of the same width, two by two. */
export const inPairs = (drawings: readonly Drawing[], gap: number): Drawing[] =>
  Array.from({ length: Math.ceil(drawings.length / 2) }, (_, row) =>
    beside(drawings.slice(2 * row, 2 * row + 2), drawings[0].width + gap),
  );

export function at(x: number, y: number, { body }: Drawing): string {
  const [right, down] = [Math.round(x), Math.round(y)];
  return right === 0 && down === 0
    ? body
    : element("g", { transform: `translate(${right} ${down})` }, `\n${body}\n`);
}
