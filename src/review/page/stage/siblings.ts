/** How many of the other takes are drawn: fewer where pictures come too slowly, and openly. */

import { Fluency } from "./fluency.js";
import type { Layer } from "./layers.js";
import type { ShownThrow } from "./shown-throw.js";
import { thinnedSiblings, thinnedWords } from "./thinned.js";

/** Indices of the takes that are shown themselves. */
type Selected = readonly (number | undefined)[];

/** So few are not what makes a picture slow. */
const FEW = 8;

export class Siblings {
  /** What is left out to stay fluent, or cannot be shown, in words for the page, or "". */
  words = "";
  readonly #fluency = new Fluency();
  #most = Number.POSITIVE_INFINITY;

  /** Of another throw. */
  reset(): void {
    this.#most = Number.POSITIVE_INFINITY;
    this.#fluency.reset();
  }

  drawn(shown: ShownThrow, selected: Selected): number[] {
    return thinnedSiblings(shown, selected, this.#most);
  }

  /** Told after each picture how long it took from the wish on, ms; true: half as many are to be drawn from now on. */
  picture(
    milliseconds: number,
    isShown: boolean,
    shown: ShownThrow | undefined,
    selected: Selected,
  ): boolean {
    if (!this.#fluency.picture(milliseconds) || !isShown || !shown) return false;
    const now = this.drawn(shown, selected).length;
    if (now < FEW) return false;
    this.#most = Math.floor(now / 2);
    return true;
  }

  /** Whether the words have changed. */
  tell(shown: ShownThrow | undefined, selected: Selected, layers: Record<Layer, boolean>): boolean {
    const words = shown ? thinnedWords(shown, selected, this.#most, layers) : "";
    const isNew = words !== this.words;
    this.words = words;
    return isNew;
  }
}
