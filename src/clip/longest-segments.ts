/**
 * Cuts 0 … `last` into few segments: from each end on, the longest one that `fits`. `taken` is told of each segment once it is
 * settled; it is then the last one that did fit. Returns the ends in order, 0 and `last` among them; undefined where a
 * segment of a single step does not fit.
 *
 * Greedy is optimal where a part of a fitting segment always fits. With keys on the curve that is nearly so: on the
 * flights this was planned with, dynamic programming found as many keys.
 */
export const longestSegments = (
  last: number,
  fits: (from: number, to: number) => boolean,
  taken?: (from: number, to: number) => void,
): number[] | undefined =>
  longestWithin(last, (from, to) => (fits(from, to) ? 0 : Number.POSITIVE_INFINITY), taken);

/** About the power of its length with which a segment's error grows: 2 to 3 for chords. */
const GROWTH = 2.5;
/** A segment is long enough where hardly this part of it could be added. */
const SLACK = 1 / 256;
/** Tries after which errors that led nowhere are looked at no more. */
const PATIENCE = 8;

/**
 * The same for segments with an `error`, as a part of what is allowed, that grows with the length: a segment fits up to 1. The
 * errors lead to the longest segment in three or four tries, and one that is shorter by a two-hundredth will do. Where they are 0 or
 * infinite, and so say nothing of the length, it is found by gallop and then bisection.
 */
export function longestWithin(
  last: number,
  error: (from: number, to: number) => number,
  taken: (from: number, to: number) => void = () => undefined,
): number[] | undefined {
  const ends = [0];
  let length = 1;
  for (let from = 0; from < last; from = ends[ends.length - 1]) {
    let good = from;
    let goodError = 0;
    let bad = last + 1;
    let badError = Number.POSITIVE_INFINITY;
    let to = Math.min(from + length, last);
    // A sixteenth of the last length at first, then twice as far each time.
    let hop = Math.max(1, length >> 4);
    for (let tries = 1; ; tries++) {
      const found = error(from, to);
      if (found <= 1) {
        good = to;
        goodError = found;
      } else {
        bad = to;
        badError = found;
      }
      if (good === last || bad - good === 1) break;
      if (good - from > 1 / SLACK && 1 - goodError < GROWTH * SLACK) break;
      const led = tries < PATIENCE ? ledTo(from, good, goodError, bad, badError) : Number.NaN;
      if (bad > last) {
        to = good + Math.max(hop, Math.floor(led - good) || 0);
        hop = 2 * (to - good);
      } else if (led > 0) to = Math.floor(led);
      else if (good > from) to = (good + bad) >> 1;
      else {
        to = bad - hop;
        hop *= 2;
      }
      to = Math.min(Math.max(to, good + 1), bad - 1);
    }
    if (good === from) return undefined;
    taken(from, good);
    ends.push(good);
    length = good - from;
  }
  return ends;
}

/** Where the error should be 1, judging by those found; NaN where they do not say. */
function ledTo(from: number, good: number, goodError: number, bad: number, badError: number): number {
  // The error's root goes up more nearly on a straight line.
  const low = Math.sqrt(goodError);
  const high = Math.sqrt(badError);
  const above = high < Number.POSITIVE_INFINITY;
  if (low > 0 && above) return good + ((bad - good) * (1 - low)) / (high - low);
  if (low > 0) return from + (good - from) / (1 + (low - 1) / (GROWTH / 2));
  if (above) return from + (bad - from) / (1 + (high - 1) / (GROWTH / 2));
  return Number.NaN;
}
