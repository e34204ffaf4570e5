/** Of a drift, the moments that are worth a closer look. */

import { sin } from "../math/elementary.js";
import { angleBetween } from "../math/quat.js";
import { distance } from "../math/vec3.js";
import type { DriftLayer, DriftPair } from "./drift-layers.js";
import { apartText, UNSEEN_METRES } from "./drift-words.js";

export interface DriftMoment {
  /** With this one pose alone and no path. */
  pair: DriftPair;
  caption: string;
}

interface Met {
  pair: DriftPair;
  i: number;
  isRelease: boolean;
  isArrival: boolean;
  /** m: no point of the prop is further from where it was. */
  apart: number;
}

/** Of what is seen of the whole: a picture that is no larger than this many times it shows nothing more. */
const LARGER = 2.5;

/** Release and arrival where they are not as they were, and where the two are furthest apart; what could not be drawn larger is left out. */
export function driftMoments(pairs: readonly DriftPair[]): DriftMoment[] {
  const moments = pairs.flatMap((pair, part) => {
    const { before, now } = pair;
    const count = before && now ? Math.min(before.poses.length, now.poses.length) : 0;
    return Array.from({ length: count }, (_, i): Met => {
      const isRelease = part === 0 && i === 0;
      const isArrival = part === pairs.length - 1 && i === count - 1;
      return { pair, i, isRelease, isArrival, apart: apart(before!, now!, i) };
    });
  });
  if (moments.length === 0) return [];
  const most = moments.reduce((best, moment) => (moment.apart > best.apart ? moment : best));
  const whole = Math.max(...pairs.flatMap(({ before, now }) => [before, now].map(extent)));
  return moments
    .filter(({ pair: { now }, apart }) => whole >= LARGER * (2 * now!.prop.reach + apart))
    .filter(
      (moment) => moment === most || ((moment.isRelease || moment.isArrival) && moment.apart > UNSEEN_METRES),
    )
    .map((moment) => enlarged(moment, pairs.length > 1));
}

function enlarged({ pair, i, isRelease, isArrival }: Met, isChain: boolean): DriftMoment {
  const alone = (layer: DriftLayer): DriftLayer => ({ ...layer, poses: [layer.poses[i]], path: [] });
  const [before, now] = [alone(pair.before!), alone(pair.now!)];
  const of = isChain && pair.name ? ` of ${pair.name}` : "";
  const where = isRelease
    ? "Release"
    : isArrival
      ? "Arrival"
      : `Pose ${i + 1}${of}, where they are furthest apart`;
  return {
    pair: { ...pair, before, now },
    caption: `${where}, enlarged: ${apartText(before.poses[0], now.poses[0])}.`,
  };
}

function apart(before: DriftLayer, now: DriftLayer, i: number): number {
  const [old, fresh] = [before.poses[i], now.poses[i]];
  const turned = 2 * now.prop.reach * sin(angleBetween(old.rotation, fresh.rotation) / 2);
  return distance(old.centerOfMass, fresh.centerOfMass) + turned;
}

/** m, of the path and the prop. */
function extent(layer: DriftLayer | undefined): number {
  if (!layer) return 0;
  const { path, prop } = layer;
  const sides = [0, 1, 2].map((axis) => {
    const values = path.map((place) => place[axis]);
    return Math.max(...values) - Math.min(...values);
  });
  return Math.max(...sides) + 2 * prop.reach;
}
