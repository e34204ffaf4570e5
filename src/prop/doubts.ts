/** What is likelier a slip of the unit than meant: warnings with the key that answers. */

import { distance, type Vec3 } from "../math/vec3.js";
import type { Density } from "./density.js";
import type { MassProperties } from "./mass.js";
import type { PropOptions } from "./prop.js";
import { type Box, diagonal } from "./vertex.js";

/** kg/m³: foams that are sold as blocks begin at about 10 (from memory); what is below likely means g/cm³. */
const LIGHTEST = 10;
/** kg/m³: osmium, the densest element, has 22,590 (from memory). */
const DENSEST = 22_600;
/** A place further from the middle of the prop than so many times its length from corner to corner is likely in another unit. */
const FAR = 3;

/**
 * @param body the prop as it is thrown
 * @param box of its mesh, m
 */
export function doubts(options: PropOptions, body: MassProperties, box: Box): string[] {
  const isMassStated = options.mass !== undefined;
  return [
    // with a stated mass, densities only share it out
    ...(isMassStated ? [] : densityDoubts(options.density)),
    ...massDoubts(options, body),
    ...placeDoubts(options, box),
  ];
}

function densityDoubts(density: Density = {}): string[] {
  const stated: [string, number][] =
    typeof density === "number"
      ? [["density", density]]
      : Object.entries(density).map(([name, value]) => [`density.${name}`, value]);
  return stated.flatMap(([key, value]) => {
    // 0 leaves a part out
    if (value > 0 && value < LIGHTEST)
      return [
        `${key} is ${value} kg/m³, less than any foam has: if it is meant in g/cm³, write ${short(1000 * value)}`,
      ];
    if (value > DENSEST)
      return [`${key} is ${value} kg/m³, more than any metal has: water has 1000, steel 7850`];
    return [];
  });
}

function massDoubts({ mass, weights = [] }: PropOptions, body: MassProperties): string[] {
  const density = body.mass / body.volume;
  // a thin surface has no volume to speak of
  if ((mass === undefined && weights.length === 0) || !(body.volume > 0 && density > DENSEST)) return [];
  const [key, value] = mass === undefined ? ["weights", body.mass] : ["mass", mass];
  return [
    `${key}: ${short(value)} kg in ${short(1000 * body.volume)} litres is heavier than any metal: it is in kilograms${mass === undefined ? "" : `, and ${short(mass)} g is ${short(mass / 1000)}`}`,
  ];
}

function placeDoubts({ points = {}, weights = [], centerOfMass }: PropOptions, box: Box): string[] {
  const size = diagonal(box);
  const middle = ([0, 1, 2] as const).map((i) => (box.low[i] + box.high[i]) / 2) as unknown as Vec3;
  const places: [string, Vec3][] = [
    ...Object.entries(points).flatMap(([name, point]): [string, Vec3][] =>
      "node" in point ? [] : [[`points.${name}`, point]],
    ),
    ...weights.map(({ at }, i): [string, Vec3] => [`weights.${i}.at`, at]),
    ...(centerOfMass ? [["centerOfMass", centerOfMass] as [string, Vec3]] : []),
  ];
  return places
    .filter(([, place]) => distance(place, middle) > FAR * size)
    .map(
      ([key, place]) =>
        `${key} is ${short(distance(place, middle))} m from the middle of the prop, which is ${short(size)} m from corner to corner: places are in metres, after scale`,
    );
}

const short = (value: number): string => String(Number(value.toPrecision(3)));
