/**
 * Cuts 0 … `last` into few segments: from each end on, the longest one that `fits`, found by gallop from the length of
 * the one before and then bisection. `taken` is told of each segment once it is settled; it is then the last one that did
 * fit. Returns the ends in order, 0 and `last` among them; undefined where a segment of a single step does not fit.
 *
 * Greedy is optimal where a part of a fitting segment always fits. With keys on the curve that is nearly so: on the
 * flights this was planned with, dynamic programming found as many keys.
 */
export function longestSegments(
  last: number,
  fits: (from: number, to: number) => boolean,
  taken: (from: number, to: number) => void = () => undefined,
): number[] | undefined {
  const ends = [0];
  let length = 1;
  for (let from = 0; from < last; from = ends[ends.length - 1]) {
    let good = from;
    let bad = last + 1;
    let to = Math.min(from + length, last);
    // A sixteenth of the last length at first, then twice as far each time.
    for (let hop = Math.max(1, length >> 4); ; hop *= 2) {
      if (fits(from, to)) good = to;
      else bad = to;
      const up = bad > last;
      if (up ? good === last : good > from || bad === from + 1) break;
      to = up ? Math.min(to + hop, last) : Math.max(to - hop, from + 1);
    }
    while (bad - good > 1) {
      const middle = (good + bad) >> 1;
      if (fits(from, middle)) good = middle;
      else bad = middle;
    }
    if (good === from) return undefined;
    taken(from, good);
    ends.push(good);
    length = good - from;
  }
  return ends;
}
