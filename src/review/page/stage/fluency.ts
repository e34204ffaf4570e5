/** Watches whether pictures come soon after they are wanted, and says when fewer things should be drawn. */

/** ms between wish and picture: slower than this is not fluent. */
const SLOW = 50;
const PICTURES = 12;
/** Of the time before: if fewer things take no less than this, it is not they that take the time. */
const HELPS = 0.85;

export class Fluency {
  #times: number[] = [];
  #before = Number.POSITIVE_INFINITY;

  /** Of something else to be drawn. */
  reset(): void {
    this.#times = [];
    this.#before = Number.POSITIVE_INFINITY;
  }

  /** Told after each picture how long it took from the wish on, ms; true: they come too slowly, and fewer things may help. */
  picture(milliseconds: number): boolean {
    this.#times.push(milliseconds);
    if (this.#times.length < PICTURES) return false;
    // the middle one: a single long one is somebody else's
    const middle = [...this.#times].sort((a, b) => a - b)[PICTURES >> 1];
    this.#times = [];
    const isSlow = middle > SLOW && middle < HELPS * this.#before;
    if (isSlow) this.#before = middle;
    return isSlow;
  }
}
