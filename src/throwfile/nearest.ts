/** What to say to a misspelt word. */

import { nearestName } from "../math/nearest-name.js";
import { shown } from "./errors.js";

/** The nearest of `known`; a word longer than any name is cut, so that this takes no time. */
export const nearest = (word: string, known: readonly string[]): string | undefined =>
  nearestName(word.slice(0, 100), known);

/** What to say to a name that is not there. */
export function nearestHint(word: string, known: readonly string[], what: string): string {
  const near = nearest(word, known);
  return near === undefined ? `there is no ${what} yet` : `the nearest ${what} is ${shown(near)}`;
}

/** What to say to an unknown key; `elsewhere` are places of the entry where this key is known. */
export function unknownKey(key: string, known: readonly string[], elsewhere: readonly string[] = []): string {
  const moved = elsewhere.length > 0 ? `it belongs under ${elsewhere.join(" or ")}; ` : "";
  return `${moved}the nearest known key is ${nearest(key, known)}`;
}
