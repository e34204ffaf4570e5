import { cos, sin } from "../math/elementary.js";
import { completeK } from "../math/elliptic.js";
import type { Vec3 } from "../math/vec3.js";

/** What a throw about a principal axis does whose angular momentum was tilted at the start. */
export interface Wobble {
  /** Turns from one turning over of the axis to the next; infinite where it stays on its side. */
  readonly turnsPerFlip: number;
  /** Which axis the body turns about as it turns over, by its place among the moments: 0 or 2. */
  readonly round: 0 | 2;
  /** How often the axis goes round the angular momentum per turn; NaN where it turns over. */
  readonly wobblesPerTurn: number;
}

/** Degrees of the phase: where round the axis the tilt lies. By symmetry a quarter holds all. */
const PHASES = Array.from({ length: 45 }, (_, i) => 2 * i + 1);

/**
 * The middle one of what 45 evenly spread directions of the tilt give.
 *
 * @param moments ascending, kg m²
 * @param axis 0, 1, 2: long, middle, short
 * @param tilt of the angular momentum from the axis, rad
 */
export function typicalWobble(moments: Vec3, axis: 0 | 1 | 2, tilt: number): Wobble {
  const all = PHASES.map((degrees) => wobble(moments, axis, tilt, (degrees * Math.PI) / 180));
  const middle = (list: readonly Wobble[], of: (w: Wobble) => number) =>
    [...list].sort((a, b) => (of(a) < of(b) ? -1 : of(a) > of(b) ? 1 : 0))[Math.floor(list.length / 2)];
  const typical = middle(all, (w) => w.turnsPerFlip);
  if (typical.turnsPerFlip < Number.POSITIVE_INFINITY) return typical;
  const steady = all.filter((w) => w.turnsPerFlip === Number.POSITIVE_INFINITY);
  return middle(steady, (w) => w.wobblesPerTurn);
}

/**
 * One direction of the tilt (`phase`, rad, from the next axis of long, middle, short, long). The angular momentum runs in the body
 * along a closed curve about the long or the short axis, in the time of 4 K(k) / p (Landau & Lifshitz, Mechanics, §37, eqs. 8 to 12,
 * with the other case's indices changed round); an axis that it does not go about is turned over twice meanwhile. A turn is one
 * about the angular momentum.
 */
export function wobble(moments: Vec3, axis: 0 | 1 | 2, tilt: number, phase: number): Wobble {
  const [a, b, c] = moments;
  // Whatever it turns about stands still in space.
  if (a === c) return { turnsPerFlip: Number.POSITIVE_INFINITY, round: 0, wobblesPerTurn: 1 };
  const [first, second] = [(axis + 1) % 3, (axis + 2) % 3];
  // The angular momentum has length 1.
  const squares = [0, 0, 0];
  squares[axis] = cos(tilt) * cos(tilt);
  squares[first] = sin(tilt) * sin(tilt) * cos(phase) * cos(phase);
  squares[second] = sin(tilt) * sin(tilt) * sin(phase) * sin(phase);
  const twiceEnergy = squares.reduce((sum, square, i) => sum + square / moments[i], 0);
  // 1 − 2 E I_j, without its cancellation.
  const excess = (j: number) =>
    squares.reduce((sum, square, i) => sum + (square * (moments[i] - moments[j])) / moments[i], 0);
  const round = excess(1) > 0 ? 2 : 0;
  if (round === axis)
    return {
      turnsPerFlip: Number.POSITIVE_INFINITY,
      round,
      wobblesPerTurn: wobblesPerTurn(moments, axis, squares, twiceEnergy),
    };
  const rateSquared = (round === 2 ? (c - b) * excess(0) : (b - a) * -excess(2)) / (a * b * c);
  const complement = Math.abs((c - a) * excess(1)) / (rateSquared * a * b * c);
  const time = (2 * completeK(Math.min(1, Math.sqrt(complement)))) / Math.sqrt(rateSquared);
  return { turnsPerFlip: (twiceEnergy * time) / (2 * Math.PI), round, wobblesPerTurn: Number.NaN };
}

/** Points of the curve's angle; the integrand is smooth and periodic, so that the mean over them has all digits that are shown. */
const POINTS = 256;

/**
 * Mean of the rate at which the axis goes round the angular momentum, (l_b²/I_b + l_c²/I_c) / (l_b² + l_c²) (Landau & Lifshitz,
 * §37, eq. 17), over that of the turns, 2E. Across the axis the curve is an ellipse, run through at a rate in proportion to l_a.
 */
function wobblesPerTurn(moments: Vec3, axis: 0 | 2, squares: readonly number[], twiceEnergy: number): number {
  const [b, c] = [(axis + 1) % 3, (axis + 2) % 3];
  const beta = 1 / moments[b] - 1 / moments[axis];
  const gamma = 1 / moments[c] - 1 / moments[axis];
  const share = squares[b] * beta + squares[c] * gamma;
  let time = 0;
  let angle = 0;
  for (let i = 0; i < POINTS; i++) {
    const u = (2 * Math.PI * (i + 0.5)) / POINTS;
    const lb = (share / beta) * cos(u) * cos(u);
    const lc = (share / gamma) * sin(u) * sin(u);
    const step = 1 / Math.sqrt(1 - lb - lc);
    time += step;
    angle += (step * (lb / moments[b] + lc / moments[c])) / (lb + lc);
  }
  return angle / time / twiceEnergy;
}
