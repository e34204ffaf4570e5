import type { Contour } from "./contour.js";
import type { Mask } from "./mask.js";

/**
 * The rings round a mask's covered nodes, x y x y… in cells, counter-clockwise round what is covered, clockwise round holes: marching
 * squares with the contour's own crossings (W. Lorensen & H. Cline, Computer Graphics 21, 163, 1987, in the plane), and
 * with the corner where the two segments that cross a cell's sides meet inside it (L. Kobbelt et al., Feature Sensitive Surface
 * Extraction from Volume Data, SIGGRAPH 2001).
 */
export function ringsOf(mask: Mask, contour: Contour): number[][] {
  const steps = stepsOf(mask);
  const rings: number[][] = [];
  for (let first = 0; first < steps.length; first++) {
    if (steps[first] < 0) continue;
    const ring: number[] = [];
    let side = first;
    do {
      const next = steps[side];
      steps[side] = -1;
      addCrossing(ring, mask, side);
      addCorner(ring, mask, contour, side, next);
      side = next;
    } while (side !== first);
    rings.push(ring);
  }
  return rings;
}

/**
 * For each covering of a cell's nodes (1, 2, 4, 8: from the lowest left one counter-clockwise) the steps between its sides
 * (0 low, 1 right, 2 high, 3 left) that leave what is covered to the left. Two nodes across from each other are joined.
 */
const STEPS: readonly (readonly (readonly [number, number])[])[] = [
  [],
  [[0, 3]],
  [[1, 0]],
  [[1, 3]],
  [[2, 1]],
  [
    [0, 1],
    [2, 3],
  ],
  [[2, 0]],
  [[2, 3]],
  [[3, 2]],
  [[0, 2]],
  [
    [3, 0],
    [1, 2],
  ],
  [[1, 2]],
  [[3, 1]],
  [[0, 1]],
  [[3, 0]],
  [],
];

/** From each side of a cell that the rings cross to the next. Sides: 2 · node to the next in its row, + 1 to the next in its column. */
function stepsOf({ columns, rows, inside }: Mask): Int32Array {
  const steps = new Int32Array(2 * inside.length).fill(-1);
  for (let row = 0; row + 1 < rows; row++)
    for (let node = row * columns; node + 1 < (row + 1) * columns; node++) {
      const above = node + columns;
      const covered =
        inside[node] | (inside[node + 1] << 1) | (inside[above + 1] << 2) | (inside[above] << 3);
      if (covered === 0 || covered === 15) continue;
      const sides = [2 * node, 2 * node + 3, 2 * above, 2 * node + 1];
      for (const [from, to] of STEPS[covered]) steps[sides[from]] = sides[to];
    }
  return steps;
}

function addCrossing(ring: number[], mask: Mask, side: number): void {
  const node = side >> 1;
  const row = Math.floor(node / mask.columns);
  const column = node - row * mask.columns;
  if (side & 1) ring.push(column, row + mask.upward.place[node]);
  else ring.push(column + mask.along.place[node], row);
}

const segmentAt = ({ along, upward }: Mask, side: number): number =>
  (side & 1 ? upward : along).segment[side >> 1];

/** Parts of the product of two segments' lengths below which they count as parallel. */
const PARALLEL = 1e-9;

function addCorner(ring: number[], mask: Mask, { ends }: Contour, side: number, next: number): void {
  const s = segmentAt(mask, side);
  const r = segmentAt(mask, next);
  if (s === r || s < 0 || r < 0) return;
  const ux = ends[4 * s + 2] - ends[4 * s];
  const uy = ends[4 * s + 3] - ends[4 * s + 1];
  const vx = ends[4 * r + 2] - ends[4 * r];
  const vy = ends[4 * r + 3] - ends[4 * r + 1];
  const turn = ux * vy - uy * vx;
  if (!(turn * turn > PARALLEL * PARALLEL * (ux * ux + uy * uy) * (vx * vx + vy * vy))) return;
  const across = (ends[4 * r] - ends[4 * s]) * vy - (ends[4 * r + 1] - ends[4 * s + 1]) * vx;
  const x = ends[4 * s] + (across / turn) * ux;
  const y = ends[4 * s + 1] + (across / turn) * uy;
  const [column, row] = cellBetween(mask, side, next);
  if (x >= column && x <= column + 1 && y >= row && y <= row + 1) ring.push(x, y);
}

/** The lowest left node of the cell that has both sides. */
function cellBetween(mask: Mask, side: number, next: number): [column: number, row: number] {
  const ends: number[] = [];
  addCrossing(ends, mask, side);
  addCrossing(ends, mask, next);
  return [
    Math.min(Math.floor(ends[0]), Math.floor(ends[2])),
    Math.min(Math.floor(ends[1]), Math.floor(ends[3])),
  ];
}
