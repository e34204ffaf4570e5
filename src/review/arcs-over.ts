/** The arcs of many takes over each other, in one scale. */

import type { Vec3 } from "../math/vec3.js";
import { pathOf } from "./course.js";
import type { Drawing } from "./drawing.js";
import { FONT_SIZE } from "./look.js";
import { around, NOWHERE, type Point } from "./plane.js";
import { curve, type SmallTake } from "./small-take.js";
import { element, numeral, pathData, textAt } from "./svg.js";
import { inView, type View } from "./view.js";

const AIR = 8;
/** px; the bar of a scale is no longer. */
const LONGEST_BAR = 90;
const BARS = [0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50, 100, 200, 500, 1000];

export function arcsOver(takes: readonly SmallTake[], view: View, width: number, height: number): Drawing {
  const places = takes.flatMap(({ take, stretches }) =>
    stretches.flatMap((stretch) => pathOf(take.motion, stretch, 8).map((place) => inView(view, place))),
  );
  const bounds = places.reduce((sum, [x, y]) => around(sum, [x, y]), NOWHERE);
  const [wide, tall] = [bounds.right - bounds.left, bounds.high - bounds.low];
  const scale = Math.min((width - 2 * AIR) / wide, (height - 2 * AIR) / tall);
  const toPage = ([x, y]: Point | Vec3): Point => [
    AIR + scale * (x - bounds.left),
    AIR + scale * (bounds.high - y),
  ];
  const curves = takes.flatMap(({ take, stretches }) =>
    stretches.filter(({ travels }) => travels).map((stretch) => curve(take, stretch, view, toPage)),
  );
  const ends = takes.flatMap(({ take, stretches }) => {
    const [x, y] = toPage(inView(view, take.motion.centerOfMass(stretches[stretches.length - 1].to)));
    return `M${numeral(x - 2, 1)} ${numeral(y, 1)}h4m-2-2v4`;
  });
  const below = scale * tall + 2 * AIR;
  return {
    width,
    height: below + FONT_SIZE.small + 10,
    body: [
      element("path", { class: "path", d: curves.join("") }),
      element("path", { class: "asked", d: ends.join("") }),
      scaleBar(AIR, below + 6, scale, view.name === "side" ? "from the side" : "from above"),
    ].join("\n"),
  };
}

/** A length in metres to measure with; below it words. */
export function scaleBar(x: number, y: number, scale: number, words: string): string {
  const size = BARS.reduce((best, bar) => (bar * scale <= LONGEST_BAR ? bar : best), BARS[0]);
  const end = x + size * scale;
  return (
    element("path", { class: "rule", d: pathData([[x, y - 3, x, y, end, y, end, y - 3]], { decimals: 1 }) }) +
    textAt(end + 6, y + 2, `${numeral(size)} m${words ? `, ${words}` : ""}`, { class: "small" })
  );
}
