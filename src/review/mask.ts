import type { Contour } from "./contour.js";

/** What a contour covers, on a grid: which nodes are inside, and where it crosses the lines between nodes. Lengths in cells. */
export interface Mask {
  /** Nodes a row. */
  readonly columns: number;
  /** 1 a node that is covered; none on the rim is. */
  readonly inside: Uint8Array;
  /**
   * By the number of the cell's side, 2 · node for the one to the next node in its row, + 1 for the one to the next in its column.
   * Of all sides in rows that part what is covered from what is not, and of most in columns; of some others too.
   */
  readonly crossings: Map<number, Crossing>;
}

export interface Crossing {
  /** Between the side's two nodes, 0 to 1. */
  readonly place: number;
  /** The segment that crosses there; −1: none is known. */
  readonly segment: number;
}

/** Of a side of which nothing is known. */
export const MIDWAY: Crossing = { place: 0.5, segment: -1 };

/** Cells: gaps as wide come from rounding, between edges that were one. */
const CRACK = 1e-6;

/**
 * Fills the points round which a contour winds. Its `ends` must be given in cells, with 1 to columns − 2 and 1 to rows − 2 as the
 * bounds of x and y. What is too thin to cover any node is drawn a cell thick.
 */
export function maskOf(contour: Contour, columns: number, rows: number): Mask {
  const inside = new Uint8Array(columns * rows);
  const crossings = new Map<number, Crossing>();
  eachSpan(contour, 0, rows, (row, from, to, first, last) => {
    const low = Math.ceil(from);
    const high = Math.floor(to);
    if (low > high) return;
    const start = row * columns;
    inside.fill(1, start + low, start + high + 1);
    crossings.set(2 * (start + low - 1), { place: from - (low - 1), segment: first });
    crossings.set(2 * (start + high), { place: to - high, segment: last });
  });
  eachSpan(contour, 1, columns, (column, from, to, first, last) => {
    const low = Math.ceil(from);
    const high = Math.floor(to);
    if (low > high) return;
    crossings.set(2 * ((low - 1) * columns + column) + 1, { place: from - (low - 1), segment: first });
    crossings.set(2 * (high * columns + column) + 1, { place: to - high, segment: last });
  });
  const mask = { columns, inside, crossings };
  keepThin(contour, mask);
  return mask;
}

/**
 * Visits what is covered of each of the lines 0, 1, … (of constant y where `across` is 0, of constant x where it is 1), from low to
 * high, with the segments at its two ends.
 */
function eachSpan(
  { count, ends, weights }: Contour,
  across: 0 | 1,
  lines: number,
  visit: (line: number, from: number, to: number, first: number, last: number) => void,
): void {
  const through = 1 - across;
  // Half open, so that a line through a vertex crosses one of its two segments: lines are met that lie in [low, high).
  const firstLine = (s: number) => Math.ceil(Math.min(ends[4 * s + through], ends[4 * s + 2 + through]));
  const endLine = (s: number) => Math.ceil(Math.max(ends[4 * s + through], ends[4 * s + 2 + through]));
  const starts = new Int32Array(lines + 1);
  for (let s = 0; s < count; s++) for (let l = firstLine(s); l < endLine(s); l++) starts[l + 1]++;
  for (let l = 0; l < lines; l++) starts[l + 1] += starts[l];
  const next = starts.slice(0, lines);
  const places = new Float64Array(starts[lines]);
  const segments = new Int32Array(starts[lines]);
  for (let s = 0; s < count; s++) {
    const from = ends[4 * s + across];
    const start = ends[4 * s + through];
    const slope = (ends[4 * s + 2 + across] - from) / (ends[4 * s + 2 + through] - start);
    for (let l = firstLine(s); l < endLine(s); l++) {
      const place = from + (l - start) * slope;
      // Sorted in as they come: a line crosses few segments.
      let at = next[l]++;
      for (; at > starts[l] && places[at - 1] > place; at--) {
        places[at] = places[at - 1];
        segments[at] = segments[at - 1];
      }
      places[at] = place;
      segments[at] = s;
    }
  }
  for (let l = 0; l < lines; l++) {
    let winding = 0;
    let open = -1;
    for (let i = starts[l]; i < starts[l + 1]; i++) {
      const s = segments[i];
      if (winding === 0 && open < 0) open = i;
      winding += ends[4 * s + 2 + through] > ends[4 * s + through] ? weights[s] : -weights[s];
      if (winding !== 0 || (i + 1 < starts[l + 1] && places[i + 1] - places[i] < CRACK)) continue;
      visit(l, places[open], places[i], segments[open], s);
      open = -1;
    }
  }
}

/** Where a segment goes through a cell of which no node is covered, the node nearest to it is. */
function keepThin({ count, ends }: Contour, { columns, inside, crossings }: Mask): void {
  for (let s = 0; s < count; s++) {
    const x = ends[4 * s];
    const y = ends[4 * s + 1];
    const dx = ends[4 * s + 2] - x;
    const dy = ends[4 * s + 3] - y;
    // Steps shorter than a cell miss but corners of cells.
    const steps = Math.ceil(2 * Math.max(Math.abs(dx), Math.abs(dy))) + 1;
    for (let i = 0; i <= steps; i++) {
      const px = x + (dx * i) / steps;
      const py = y + (dy * i) / steps;
      const node = Math.floor(py) * columns + Math.floor(px);
      if (inside[node] || inside[node + 1] || inside[node + columns] || inside[node + columns + 1]) continue;
      const thin = Math.floor(py + 0.5) * columns + Math.floor(px + 0.5);
      inside[thin] = 1;
      for (const side of [2 * thin - 2, 2 * thin]) if (!crossings.has(side)) crossings.set(side, MIDWAY);
    }
  }
}
