import type { Contour } from "./contour.js";
import { type Crossing, type Mask, MIDWAY } from "./mask.js";

/**
 * The rings round a mask's covered nodes, x y x y… in cells, counter-clockwise round what is covered, clockwise round holes: marching
 * squares with the contour's own crossings (W. Lorensen & H. Cline, Computer Graphics 21, 163, 1987, in the plane), and
 * with the corner where the two segments that cross a cell's sides meet inside it (L. Kobbelt et al., Feature Sensitive Surface
 * Extraction from Volume Data, SIGGRAPH 2001).
 */
export function ringsOf(mask: Mask, contour: Contour): number[][] {
  const { inside, crossings } = mask;
  const seen = new Set<number>();
  const rings: number[][] = [];
  for (const first of crossings.keys()) {
    // Every ring goes through a row's side.
    if (first & 1 || seen.has(first) || inside[first >> 1] === inside[(first >> 1) + 1]) continue;
    const ring: number[] = [];
    let side = first;
    do {
      seen.add(side);
      const cell = cellAhead(mask, side);
      const next = sideAhead(mask, cell, side);
      addCrossing(ring, mask, side);
      addCorner(ring, mask, contour, cell, side, next);
      side = next;
    } while (side !== first);
    rings.push(ring);
  }
  return rings;
}

/** The cell, by its lowest left node, into which a ring goes through a side with what is covered to its left. */
function cellAhead({ columns, inside }: Mask, side: number): number {
  const node = side >> 1;
  if (side & 1) return inside[node] ? node - 1 : node;
  return inside[node] ? node : node - columns;
}

/**
 * Where a ring that comes into a cell through a side goes out: to the right where the node beyond there is covered, so that two covered
 * nodes across from each other are joined; else straight on or to the left.
 */
function sideAhead({ columns, inside }: Mask, cell: number, side: number): number {
  // The cell's sides counter-clockwise, low first, and the node where each begins.
  const sides = [2 * cell, 2 * cell + 3, 2 * (cell + columns), 2 * cell + 1];
  const nodes = [cell, cell + 1, cell + columns + 1, cell + columns];
  const i = sides.indexOf(side);
  // Coming in through side i, covered is where it begins, and free where it ends.
  if (inside[nodes[(i + 2) % 4]]) return sides[(i + 1) % 4];
  return inside[nodes[(i + 3) % 4]] ? sides[(i + 2) % 4] : sides[(i + 3) % 4];
}

const crossingAt = ({ crossings }: Mask, side: number): Crossing => crossings.get(side) ?? MIDWAY;

function addCrossing(ring: number[], mask: Mask, side: number): void {
  const node = side >> 1;
  const row = Math.floor(node / mask.columns);
  const column = node - row * mask.columns;
  const { place } = crossingAt(mask, side);
  if (side & 1) ring.push(column, row + place);
  else ring.push(column + place, row);
}

/** Parts of the product of two segments' lengths below which they count as parallel. */
const PARALLEL = 1e-9;

function addCorner(
  ring: number[],
  mask: Mask,
  { ends }: Contour,
  cell: number,
  side: number,
  next: number,
): void {
  const s = crossingAt(mask, side).segment;
  const r = crossingAt(mask, next).segment;
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
  const row = Math.floor(cell / mask.columns);
  const column = cell - row * mask.columns;
  if (x >= column && x <= column + 1 && y >= row && y <= row + 1) ring.push(x, y);
}
