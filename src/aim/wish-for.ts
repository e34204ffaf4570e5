import { cos, sin } from "../math/elementary.js";
import { addScaled, dot, length, normalize, subtract, type Vec3 } from "../math/vec3.js";
import { nearness } from "./ranking.js";
import type { Way, WayWish } from "./way.js";

/** By how much, in turns, a wish has to prefer its way before it counts, and before a plainer one is enough. */
const LEAST_MARGIN = 1e-3;
const CLEAR_MARGIN = 0.05;
/** How far from a way's own turns a wish for it is looked for. */
const OFFSETS = [0, -0.1, 0.1, -0.25, 0.25, -0.5, 0.5];
const CLIMBS = 40;
const FIRST_STEP = 0.1;

/** Roundings to what is written in a throw file: a unit vector (principal frame) along the rounded one, and turns. */
export interface Rounding {
  axis: (axis: Vec3) => Vec3;
  turns: (turns: number) => number;
}

/**
 * A wish, as rounded, that is nearer to this way than to any of the others, or undefined where there is none: a way is hidden where others turn as
 * much as it does, more plainly about any axis that could be wished. Plain axes come first; turns are never negative.
 *
 * @param rivals all ways that turn about as much, `way` itself may be among them
 * @param plain axes that have names, principal frame
 */
export function wishFor(
  way: Way,
  rivals: readonly Way[],
  plain: readonly Vec3[],
  rounding: Rounding,
): WayWish | undefined {
  const others = rivals.filter((rival) => rival !== way);
  const amounts = [(way.turns + way.turning) / 2, way.turns, way.turning].flatMap((turns) =>
    OFFSETS.map((offset) => rounding.turns(Math.max(0, turns + offset))),
  );
  const margin = (wish: WayWish): number => {
    const own = nearness(way, wish);
    return others.reduce((least, other) => Math.min(least, nearness(other, wish) - own), 4);
  };
  const best = (axes: readonly (Vec3 | undefined)[], counts: readonly number[]) =>
    axes
      .flatMap((axis) => counts.map((turns): WayWish => (axis ? { turns, axis } : { turns })))
      .reduce<{ wish?: WayWish; margin: number }>(
        (found, wish) => {
          const gained = margin(wish);
          return gained > found.margin ? { wish, margin: gained } : found;
        },
        { margin: LEAST_MARGIN },
      );
  const plainly = best([undefined, ...plain], amounts);
  if (plainly.margin >= CLEAR_MARGIN) return plainly.wish;
  const slanted = amounts
    .map((turns) => best([rounding.axis(climb(way, others, turns))], [turns]))
    .reduce((a, b) => (b.margin > a.margin ? b : a), plainly);
  return slanted.wish;
}

/** The axis that prefers the way most to its nearest rival: the best of many, then subgradient ascent on the sphere. */
function climb(way: Way, others: readonly Way[], turns: number): Vec3 {
  const nearestRival = (axis: Vec3, enough: number) => {
    const wish = { turns, axis };
    const own = nearness(way, wish);
    let nearest = { margin: Number.POSITIVE_INFINITY, way };
    for (const other of others) {
      const margin = nearness(other, wish) - own;
      if (margin < nearest.margin) nearest = { margin, way: other };
      if (margin < enough) break;
    }
    return nearest;
  };
  let best = { axis: SPREAD[0], margin: Number.NEGATIVE_INFINITY };
  for (const axis of SPREAD) {
    const { margin } = nearestRival(axis, best.margin);
    if (margin > best.margin) best = { axis, margin };
  }
  let { axis } = best;
  for (let i = 0; i < CLIMBS; i++) {
    const nearest = nearestRival(axis, Number.NEGATIVE_INFINITY);
    if (nearest.margin > best.margin) best = { axis, margin: nearest.margin };
    const away = subtract(way.signedShare, nearest.way.signedShare);
    const square = addScaled(away, axis, -dot(away, axis));
    if (length(square) < 1e-9) break;
    axis = normalize(addScaled(axis, normalize(square), FIRST_STEP / (1 + i / 4)));
  }
  return best.axis;
}

/** Directions spread evenly: points of a spiral, each the golden angle on. */
const SPREAD: readonly Vec3[] = Array.from({ length: 300 }, (_, i) => {
  const height = 1 - (2 * i + 1) / 300;
  const radius = Math.sqrt(1 - height * height);
  const angle = i * Math.PI * (3 - Math.sqrt(5));
  return [radius * cos(angle), height, radius * sin(angle)];
});
