/** Puts texts where they cover neither each other nor, if that can be, what is drawn. */

import { textWidth } from "./text-size.js";

export interface Label {
  text: string;
  /** Class of the text. */
  kind: string;
  /** px */
  size: number;
  isBold?: boolean;
  /** What it belongs to, px. */
  x: number;
  y: number;
  /** Distance from there to keep, px. */
  gap: number;
  /** Directions to try first, as steps of 45° from the right, counter-clockwise. */
  prefer?: readonly number[];
  /** It has to stand, further off with a leader line if need be; else it is left out where there is no room. */
  isNeeded?: boolean;
}

export interface PlacedLabel extends Label {
  /** Where the text stands, px: its baseline, and there its start, middle or end. */
  at: number;
  baseline: number;
  anchor: "start" | "middle" | "end";
  /** It stands so far off that a line has to lead to it: where the line ends. */
  lead?: readonly [number, number];
}

export interface TextBox {
  left: number;
  top: number;
  right: number;
  bottom: number;
}

/** px from point to point along a line. */
const APART = 4;

/** Points of a line of straight pieces, x y x y… px, so near to each other that no text stands between them unseen: for `drawn` below. */
export function pointsAlong(line: readonly number[]): number[] {
  const points: number[] = [];
  for (let i = 0; i + 3 < line.length; i += 2) {
    const [dx, dy] = [line[i + 2] - line[i], line[i + 3] - line[i + 1]];
    const steps = 1 + Math.floor(Math.max(Math.abs(dx), Math.abs(dy)) / APART);
    for (let k = 0; k < steps; k++) points.push(line[i] + (dx * k) / steps, line[i + 1] + (dy * k) / steps);
  }
  return points;
}

/** Room between two texts, px. */
const AIR = 2;
const DIRECTIONS = [0, 1, 2, 3, 4, 5, 6, 7];
/** From there on a line leads to a label, px beyond its gap. */
const FAR = 14;
/** What a place further off is worth, in points of the drawing that are covered. */
const STEP_COST = 1.5;

/**
 * Labels in the order of their importance.
 *
 * @param drawn x y x y… px, of what would better not be covered
 * @param taken boxes of texts that stand already
 */
export function placeLabels(
  labels: readonly Label[],
  frame: TextBox,
  drawn: readonly number[],
  taken: readonly TextBox[] = [],
): PlacedLabel[] {
  const boxes = [...taken];
  return labels.flatMap((label): PlacedLabel[] => {
    const found = best(label, frame, drawn, boxes);
    if (!found) return [];
    boxes.push(found.box);
    const { box, isLed, anchor } = found;
    const at = anchor === "start" ? box.left : anchor === "end" ? box.right : (box.left + box.right) / 2;
    return [
      {
        ...label,
        at,
        anchor,
        baseline: box.bottom - 0.28 * label.size,
        ...(isLed && { lead: nearest(box, label) }),
      },
    ];
  });
}

/** Of a box's edge to what it belongs to. */
const nearest = ({ left, right, top, bottom }: TextBox, { x, y }: Label): readonly [number, number] => [
  Math.max(left, Math.min(right, x)),
  Math.max(top, Math.min(bottom, y)),
];

interface Candidate extends Pick<PlacedLabel, "anchor"> {
  box: TextBox;
  isLed: boolean;
}

function best(
  label: Label,
  frame: TextBox,
  drawn: readonly number[],
  taken: readonly TextBox[],
): Candidate | undefined {
  let least = Number.POSITIVE_INFINITY;
  let chosen: Candidate | undefined;
  const order = [...(label.prefer ?? []), ...DIRECTIONS.filter((d) => !label.prefer?.includes(d))];
  const steps = label.isNeeded ? 40 : 4;
  for (let step = 0; step < steps; step++) {
    for (const [rank, direction] of order.entries()) {
      const far = 5 * step;
      const box = boxAt(label, direction, label.gap + far);
      if (!isWithin(box, frame) || taken.some((other) => overlap(box, other))) continue;
      const cost =
        covered(box, drawn) + STEP_COST * step + (label.prefer && rank < label.prefer.length ? 0 : 1);
      if (cost < least) {
        least = cost;
        const [right] = WAYS[direction];
        chosen = { box, isLed: far > FAR, anchor: right > 0.5 ? "start" : right < -0.5 ? "end" : "middle" };
      }
    }
    if (chosen && least <= STEP_COST * (step + 1)) break;
  }
  return chosen;
}

const DIAGONAL = Math.SQRT1_2;
const WAYS: readonly (readonly [number, number])[] = [
  [1, 0],
  [DIAGONAL, -DIAGONAL],
  [0, -1],
  [-DIAGONAL, -DIAGONAL],
  [-1, 0],
  [-DIAGONAL, DIAGONAL],
  [0, 1],
  [DIAGONAL, DIAGONAL],
];

function boxAt({ text, size, isBold, x, y }: Label, direction: number, far: number): TextBox {
  const [right, down] = WAYS[direction];
  const width = textWidth(text, size, isBold);
  const height = 1.2 * size;
  const middle = x + right * far;
  const level = y + down * far;
  const left = right > 0.5 ? middle : right < -0.5 ? middle - width : middle - width / 2;
  const top = down > 0.5 ? level : down < -0.5 ? level - height : level - height / 2;
  return { left, top, right: left + width, bottom: top + height };
}

const isWithin = (box: TextBox, frame: TextBox): boolean =>
  box.left >= frame.left && box.right <= frame.right && box.top >= frame.top && box.bottom <= frame.bottom;

const overlap = (a: TextBox, b: TextBox): boolean =>
  a.left < b.right + AIR && b.left < a.right + AIR && a.top < b.bottom + AIR && b.top < a.bottom + AIR;

function covered({ left, top, right, bottom }: TextBox, drawn: readonly number[]): number {
  let count = 0;
  for (let i = 0; i < drawn.length; i += 2)
    if (drawn[i] > left && drawn[i] < right && drawn[i + 1] > top && drawn[i + 1] < bottom) count++;
  return count;
}
