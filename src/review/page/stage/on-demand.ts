/** Draws once for any number of wishes, with the screen's next picture; nothing while nothing is wished for. */
export class OnDemand {
  #asked = 0;
  #since = 0;

  /** @param draw told how long the first of the wishes has waited once it is drawn: a function that answers ms */
  constructor(private readonly draw: (waited: () => number) => void) {}

  request(): void {
    if (this.#asked) return;
    this.#since = performance.now();
    this.#asked = requestAnimationFrame(() => {
      this.#asked = 0;
      const since = this.#since;
      this.draw(() => performance.now() - since);
    });
  }

  cancel(): void {
    cancelAnimationFrame(this.#asked);
  }
}
