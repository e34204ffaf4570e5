/** Watches whether pictures come soon after they are wanted, and says when fewer things should be drawn. */

/** ms between wish and picture: slower than this is not fluent. */
const SLOW = 50;
const PICTURES = 12;

export class Fluency {
  #times: number[] = [];

  /** Told after each picture how long it took from the wish on, ms; true: they come too slowly. */
  picture(milliseconds: number): boolean {
    this.#times.push(milliseconds);
    if (this.#times.length < PICTURES) return false;
    // the middle one: a single long one is somebody else's
    const middle = [...this.#times].sort((a, b) => a - b)[PICTURES >> 1];
    this.#times = [];
    return middle > SLOW;
  }
}
