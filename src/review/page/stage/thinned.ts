/** Which of the other takes are drawn, and what is said of what is not. */

import type { Layer } from "./layers.js";
import type { ShownThrow } from "./shown-throw.js";

/** Whatever the machine. */
const MOST_SIBLINGS = 200;

/** Evenly out of all but the selected ones. */
export function thinnedSiblings(
  { takes }: Pick<ShownThrow, "takes">,
  selected: readonly (number | undefined)[],
  most: number,
): number[] {
  const others = takes.map((_, i) => i).filter((i) => !selected.includes(i));
  const count = Math.min(others.length, most, MOST_SIBLINGS);
  return Array.from({ length: count }, (_, i) => others[Math.floor((i * others.length) / count)]);
}

export function thinnedWords(
  shown: ShownThrow,
  selected: readonly (number | undefined)[],
  most: number,
  layers: Record<Layer, boolean>,
): string {
  const { triangles, ownTriangles } = shown.body;
  const others = shown.takes.length - new Set(selected.filter((i) => i !== undefined)).size;
  const drawn = thinnedSiblings(shown, selected, most).length;
  const copies = layers.siblings || layers.strobe;
  return [
    layers.siblings && drawn < others ? `${drawn} of ${others} siblings shown.` : "",
    copies && triangles < 0.6 * ownTriangles
      ? `Pale copies are drawn with ${triangles} of the prop's ${ownTriangles} triangles.`
      : "",
    ownTriangles === 0 && shown.missing === ""
      ? "The file has no mesh: a box of the prop's size stands for it."
      : "",
    shown.missing,
  ]
    .filter((words) => words !== "")
    .join(" ");
}
