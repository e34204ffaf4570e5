/** What drifted in one prop, in words. */

import { angleBetween } from "../math/quat.js";
import { distance, subtract } from "../math/vec3.js";
import type { PropRecord } from "./clip-record.js";
import { type Change, changes } from "./compare-values.js";
import { amount, degrees, joined, lastDigits, longer } from "./compare-words.js";

export interface PropDrift {
  text: string;
  changes: Change[];
}

/** Least change of mass or moment of inertia that is told, relative. */
const WORTH = 1e-4;

/** Undefined where nothing drifted. */
export function compareProps(before: PropRecord, now: PropRecord): PropDrift | undefined {
  const found = changes(before, now);
  if (found.length === 0) return undefined;
  const words = [...source(before, now), ...mass(before, now), ...balance(before, now)];
  return {
    text: words.length > 0 ? words.join(", ") : lastDigits(found.map(({ key }) => key)),
    changes: found,
  };
}

function source(before: PropRecord, now: PropRecord): string[] {
  if (now.source !== before.source) return [`is ${now.source} instead of ${before.source}`];
  return now.sha256 === before.sha256 ? [] : [`${now.source} changed`];
}

function mass(before: PropRecord, now: PropRecord): string[] {
  const gain = now.mass - before.mass;
  const heavier = now.mass / before.mass;
  const moments = (["long", "middle", "short"] as const).flatMap((axis, i) => {
    const share = now.principal.moments[i] / before.principal.moments[i];
    // where all is heavier alike, the mass says it
    if (Math.abs(share / heavier - 1) < WORTH || Math.abs(share - 1) < WORTH) return [];
    return [`${percent(share)} ${share > 1 ? "harder" : "easier"} to turn about its ${axis} axis`];
  });
  return [
    ...(Math.abs(heavier - 1) < WORTH
      ? []
      : [`weighs ${grams(gain)} ${gain > 0 ? "more" : "less"} (${percent(heavier)})`]),
    ...(moments.length > 0 ? [`is ${joined(moments)}`] : []),
  ];
}

function balance(before: PropRecord, now: PropRecord): string[] {
  const shift = subtract(now.centerOfMass, before.centerOfMass);
  const moved = longer(distance(now.centerOfMass, before.centerOfMass), "off where it did", "");
  const axes = degrees(angleBetween(before.principal.axes, now.principal.axes), "differently");
  const fresh = now.warnings.filter((text) => !before.warnings.includes(text));
  const gone = before.warnings.filter((text) => !now.warnings.includes(text));
  return [
    ...moved.map(
      (text) =>
        `balances ${text} (by [${shift.map((d) => (Math.abs(d) < 1e-5 ? 0 : amount(d * 1000))).join(", ")}] mm)`,
    ),
    ...axes.map((text) => `has its axes ${text}`),
    ...longer(now.reach - before.reach, "further", "less far").map((text) => `reaches ${text}`),
    ...fresh.map((text) => `warns: ${text}`),
    ...gone.map((text) => `no longer warns: ${text}`),
  ];
}

const percent = (share: number) => `${amount(Math.abs(share - 1) * 100)} %`;
const grams = (kilograms: number) => {
  const size = Math.abs(kilograms);
  return size < 1 ? `${amount(size * 1000)} g` : `${Number(size.toPrecision(3))} kg`;
};
