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
const GROWTH = 2.8;
/** The error aimed at: somewhat below 1, so that half the tries do not miss it. */
const AIM = 0.99;
/** A segment is long enough where the aim is within this part of it, or within this part of a step. */
const SLACK = 1 / 200;
const LEAST = 0.6;
/** Tries after which a step further has to be twice the last; and after which the errors, having led nowhere, are looked at no more. */
const TRUST = 6;
const PATIENCE = 8;

/**
 * The same for segments with an `error`, as a part of what is allowed, that grows with the length: a segment fits up to 1. The
 * errors lead in two or three tries to a segment that is hardly shorter than the longest, by a thirtieth at most where they are smooth. Where they are 0 or
 * infinite, and so say nothing of the length, the longest is found by gallop and then bisection.
 */
export function longestWithin(
  last: number,
  error: (from: number, to: number) => number,
  taken: (from: number, to: number) => void = () => undefined,
): number[] | undefined {
  const ends = [0];
  let length = Math.max(1, last >> 6);
  let lengthBefore = length;
  for (let from = 0; from < last; from = ends[ends.length - 1]) {
    let good = from;
    let goodError = 0;
    let bad = last + 1;
    let badError = Number.POSITIVE_INFINITY;
    // Lengths rise and fall evenly.
    const guess = Math.min(Math.max(2 * length - lengthBefore, (length + 1) >> 1), 2 * length);
    let to = Math.min(from + guess, last);
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
      const led = tries < PATIENCE ? ledTo(from, good, goodError, bad, badError) : Number.NaN;
      // Enough where little more is to be had; the longer the search, the less is asked.
      const slack = SLACK * Math.min(Math.max(1, 2 * (tries - 2)), 4);
      if (goodError > 0 && led - good < Math.max(LEAST, (good - from) * slack)) break;
      if (bad > last) {
        to = led > 0 && tries < TRUST ? Math.floor(led) : good + Math.max(hop, Math.floor(led - good) || 0);
        hop = Math.max(hop, 2 * (to - good));
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
    lengthBefore = from === 0 ? good : length;
    length = good - from;
  }
  return ends;
}

/** Where the error should be what is aimed at, judging by those found; NaN where they do not say. */
function ledTo(from: number, good: number, goodError: number, bad: number, badError: number): number {
  // The error's root goes up more nearly on a straight line.
  const low = Math.sqrt(goodError);
  const high = Math.sqrt(badError);
  const aim = Math.sqrt(AIM);
  const above = high < Number.POSITIVE_INFINITY;
  if (low > 0 && above) return good + ((bad - good) * Math.max(0, aim - low)) / (high - low);
  if (low > 0) return from + (good - from) / (1 + (low - aim) / (GROWTH / 2));
  if (above) return from + (bad - from) / (1 + (high - aim) / (GROWTH / 2));
  return Number.NaN;
}
