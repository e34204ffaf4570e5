import { add, dot, length, normalize, scale, subtract, type Vec3 } from "../math/vec3.js";
import { nearness } from "./ranking.js";
import type { Way, WayWish } from "./way.js";

/** By how much, in turns, a wish has to prefer its way before it counts, and before a plainer one is enough. */
const LEAST_MARGIN = 1e-3;
const CLEAR_MARGIN = 0.05;
/** How far from a way's own turns a wish for it is looked for. */
const OFFSETS = [0, -0.25, 0.25, -0.5, 0.5];
const CLIMBS = 40;

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

/** The axis that prefers the way most to its nearest rival, by subgradient ascent on the sphere. */
function climb(way: Way, others: readonly Way[], turns: number): Vec3 {
  if (length(way.spin) === 0) return [1, 0, 0];
  let axis = normalize(length(way.signedShare) > 1e-3 ? way.signedShare : way.spin);
  let best = { axis, margin: Number.NEGATIVE_INFINITY };
  for (let i = 0; i < CLIMBS; i++) {
    const wish = { turns, axis };
    const own = nearness(way, wish);
    let nearest: { way: Way; margin: number } | undefined;
    for (const other of others) {
      const margin = nearness(other, wish) - own;
      if (!nearest || margin < nearest.margin) nearest = { way: other, margin };
    }
    if (!nearest) return axis;
    if (nearest.margin > best.margin) best = { axis, margin: nearest.margin };
    const away = subtract(way.signedShare, nearest.way.signedShare);
    const square = subtract(away, scale(axis, dot(away, axis)));
    if (length(square) < 1e-9) break;
    axis = normalize(add(axis, scale(normalize(square), 0.5 / (1 + i / 4))));
  }
  return best.axis;
}
