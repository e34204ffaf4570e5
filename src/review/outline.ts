import type { Quat } from "../math/quat.js";
import { type Contour, contourOf } from "./contour.js";
import { maskOf } from "./mask.js";
import { simplified } from "./simplify.js";
import type { Solid } from "./solid.js";
import { ringsOf } from "./trace.js";

export { type Solid, solidOf } from "./solid.js";

/** What a prop covers of a picture. */
export interface Outline {
  /** Closed rings, x y x y… in m: x right, y up in the picture; even-odd filled. Counter-clockwise, holes clockwise. */
  readonly rings: Float64Array[];
}

/** Of `detail`: what the grid and the leaving out of points may take; a cell's diagonal and they together are below 1. */
const CELL = 0.5;
const STRAIGHT = 0.12;
/** No finer than so many cells across. */
const MOST_CELLS = 2000;
/** Cells²: what is smaller is left out beside greater. */
const SPECK = 1;

/**
 * The silhouette as seen from far away, about the centre of mass: all that any triangle covers, closed surface or open. What is
 * thinner than half of `detail` is drawn so thick, so that a card seen edge on stays a line.
 *
 * @param rotation turns the model's axes onto the picture's: x right, y up, z to the viewer
 * @param detail greatest distance by which a ring may leave the true silhouette, m (but for 1/1000 of its greatest width)
 */
export function outlineOf(solid: Solid, rotation: Quat, detail: number): Outline {
  const contour = contourOf(solid, rotation);
  if (contour.count === 0) return { rings: [] };
  const { low, high } = boundsOf(contour);
  const cell = Math.max(detail * CELL, Math.max(high[0] - low[0], high[1] - low[1]) / MOST_CELLS);
  // The margin keeps the rim's nodes free.
  const origin = [low[0] - 1.5 * cell, low[1] - 1.5 * cell];
  const columns = Math.ceil((high[0] - low[0]) / cell) + 4;
  const rows = Math.ceil((high[1] - low[1]) / cell) + 4;
  for (let i = 0; i < 4 * contour.count; i++) contour.ends[i] = (contour.ends[i] - origin[i % 2]) / cell;
  const rings = withoutSpecks(ringsOf(maskOf(contour, columns, rows), contour));
  return {
    rings: rings.map((ring) =>
      simplified(ring, STRAIGHT / CELL).map((value, i) => origin[i % 2] + cell * value),
    ),
  };
}

function boundsOf({ count, ends }: Contour): { low: [number, number]; high: [number, number] } {
  const low: [number, number] = [Infinity, Infinity];
  const high: [number, number] = [-Infinity, -Infinity];
  for (let i = 0; i < 4 * count; i += 2)
    for (let axis = 0; axis < 2; axis++) {
      low[axis] = Math.min(low[axis], ends[i + axis]);
      high[axis] = Math.max(high[axis], ends[i + axis]);
    }
  return { low, high };
}

function withoutSpecks(rings: number[][]): number[][] {
  const large = rings.filter((ring) => Math.abs(ringArea(ring)) >= SPECK);
  return large.length > 0 ? large : rings;
}

/** Counted positive counter-clockwise. */
function ringArea(ring: ArrayLike<number>): number {
  let twice = 0;
  for (let i = 0; i < ring.length; i += 2) {
    const j = (i + 2) % ring.length;
    twice += ring[i] * ring[j + 1] - ring[j] * ring[i + 1];
  }
  return twice / 2;
}
