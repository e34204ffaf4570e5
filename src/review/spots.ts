/** Places of a prop that have names, and the signs that they are drawn with. */

import { length, negate, subtract, type Vec3 } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { TextBox } from "./place-labels.js";
import { element, pathData } from "./svg.js";

/** A place of the prop that has a name. */
export interface Spot {
  name: string;
  /** About the centre of mass, model's axes, m. */
  place: Vec3;
  kind: "balance" | "origin" | "point";
}

/** Of the reach: what lies further off is told of in words, not drawn. */
const FAR = 2.5;
/** Half of a mark's size, px. */
const MARK = 5;
/** px: nearer marks are one. */
const SAME = 2.5;

/** What is near enough to be drawn. */
export const spotsNear = (prop: Prop): Spot[] =>
  spotsOf(prop).filter(({ place }) => length(place) <= FAR * prop.reach);

/** What is too far off to be drawn. */
export const spotsBeyond = (prop: Prop): { name: string; distance: number }[] =>
  spotsOf(prop)
    .map(({ name, place }) => ({ name, distance: length(place) }))
    .filter(({ distance }) => distance > FAR * prop.reach);

const spotsOf = ({ centerOfMass, points }: Prop): Spot[] => [
  { name: "centre of mass", place: [0, 0, 0], kind: "balance" },
  { name: "model’s origin", place: negate(centerOfMass), kind: "origin" },
  ...Object.entries(points).map(
    ([name, { position }]): Spot => ({ name, place: subtract(position, centerOfMass), kind: "point" }),
  ),
];

/** What a sign takes up. */
export const boxAbout = ([x, y]: readonly [number, number]): TextBox => ({
  left: x - MARK,
  top: y - MARK,
  right: x + MARK,
  bottom: y + MARK,
});

export function sign(kind: Spot["kind"], [x, y]: readonly [number, number]): string {
  if (kind === "point") return element("circle", { class: "spot", cx: x, cy: y, r: 3 });
  if (kind === "origin")
    return element("path", {
      class: "sight",
      d: pathData([
        [x - 6, y - 6, x + 6, y + 6],
        [x - 6, y + 6, x + 6, y - 6],
      ]),
    });
  // The usual sign of a centre of mass: a disc of two full and two empty quarters.
  const quarter = (sx: number, sy: number) =>
    `M${[x, y].map((v) => v.toFixed(1)).join(" ")}h${5 * sx}a5 5 0 0 ${sx * sy > 0 ? 1 : 0} ${-5 * sx} ${5 * sy}z`;
  return [
    element("circle", { class: "spot", cx: x, cy: y, r: 6 }),
    element("path", { class: "paper", d: `${quarter(1, 1)}${quarter(-1, -1)}` }),
  ].join("\n");
}

/** One text for all spots that lie on each other. */
export function merged(
  spots: readonly Spot[],
  toPage: (place: Vec3) => [number, number],
): { text: string; at: [number, number] }[] {
  const groups: { text: string; at: [number, number] }[] = [];
  for (const { name, place } of spots) {
    const at = toPage(place);
    const same = groups.find((g) => Math.abs(g.at[0] - at[0]) < SAME && Math.abs(g.at[1] - at[1]) < SAME);
    if (same) same.text += `, ${name}`;
    else groups.push({ text: name, at });
  }
  return groups;
}
