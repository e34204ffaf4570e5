import { type Crossing, crossings, gridOver } from "./lines.js";
import { type Box, boxOf } from "./vertex.js";

/** A closed part as matter or as a cavity. */
export interface Filled {
  readonly positions: Float64Array;
  readonly triangles: Uint32Array;
  /** 1 where what the triangles enclose as they face is matter; -1 where it is the other way round. */
  readonly sign: number;
  readonly density: number;
}

export interface Overlap {
  /** kg counted more than once, of matter in matter. */
  readonly mass: number;
  /** The two that most of it is between, as places in the list; one twice: a part within itself. */
  readonly pair: readonly [number, number];
}

/**
 * Roughly how much mass is counted more than once where parts overlap or lie in one another; undefined where none is. Along
 * lines through the region the parts are met exactly: between two crossings, the depth is how many are there. Of what shares a place
 * the densest counts once, and the rest is too much.
 */
export function overlap(parts: readonly Filled[]): Overlap | undefined {
  const region = sharedRegion(parts.map(({ positions }) => boxOf(positions)));
  if (!region) return undefined;
  const { cell, found } = gridOver(region.box, (grid) =>
    region.parts.flatMap((n) => crossings(parts[n], n, parts[n].sign, grid)),
  );
  found.sort((a, b) => a.line - b.line || a.depth - b.depth || a.part - b.part);
  const between = new Map<number, number>();
  let mass = 0;
  let there = new Presence(parts);
  found.forEach((crossing, i) => {
    if (i === 0 || crossing.line !== found[i - 1].line) there = new Presence(parts);
    there.pass(crossing);
    const next = found[i + 1];
    if (next?.line !== crossing.line) return;
    const density = there.tooMuch();
    if (density === 0) return;
    const more = density * (next.depth - crossing.depth) * cell;
    mass += more;
    const pair = there.pair();
    between.set(pair, (between.get(pair) ?? 0) + more);
  });
  const [worst] = [...between].sort(([, a], [, b]) => b - a);
  return worst && { mass, pair: [Math.trunc(worst[0] / parts.length), worst[0] % parts.length] };
}

/** What is at a place on a line. */
class Presence {
  /** Layers of each part, in the order in which they began; below 0 those of a cavity. */
  readonly #layers = new Map<number, number>();
  /** Layers of matter of each density. */
  readonly #matter = new Map<number, number>();
  #total = 0;
  /** The last two that began. */
  #latest = -1;
  #earlier = -1;

  constructor(readonly parts: readonly Filled[]) {}

  pass({ part, turn }: Crossing): void {
    const before = this.#layers.get(part) ?? 0;
    const layers = before + turn;
    if (layers === 0) this.#layers.delete(part);
    else this.#layers.set(part, layers);
    this.#total += turn;
    if (layers > before && part !== this.#latest) [this.#earlier, this.#latest] = [this.#latest, part];
    const { density } = this.parts[part];
    const more = Math.max(0, layers) - Math.max(0, before);
    this.#matter.set(density, (this.#matter.get(density) ?? 0) + more);
  }

  /** kg/m³; a cavity takes the densest away. */
  tooMuch(): number {
    if (this.#total < 2) return 0;
    let layers = 0;
    let sum = 0;
    let densest = 0;
    for (const [density, count] of this.#matter) {
      if (count === 0) continue;
      layers += count;
      sum += count * density;
      densest = Math.max(densest, density);
    }
    return Math.max(0, sum - densest * (1 + layers - this.#total));
  }

  /** Two that are there, as one number; of one that is there twice, itself and itself. */
  pair(): number {
    let other = this.#earlier;
    if (!this.#layers.has(other)) [other] = this.#layers.keys();
    let latest = this.#latest;
    if (!this.#layers.has(latest)) latest = other;
    return Math.min(latest, other) * this.parts.length + Math.max(latest, other);
  }
}

/** Pairs of boxes that are looked at before it is all taken for one heap. */
const PAIRS = 20_000_000;

/** The box around all places where boxes overlap, and the numbers of those boxes. */
function sharedRegion(boxes: readonly Box[]): { box: Box; parts: number[] } | undefined {
  const order = [...boxes.keys()].sort((a, b) => boxes[a].low[0] - boxes[b].low[0] || a - b);
  const isShared = new Uint8Array(boxes.length);
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  let pairs = 0;
  for (let a = 0; a < order.length; a++) {
    const one = boxes[order[a]];
    if (pairs > PAIRS) return heap(boxes);
    for (let b = a + 1; b < order.length; b++) {
      const two = boxes[order[b]];
      if (two.low[0] >= one.high[0]) break;
      pairs++;
      if (two.low[1] >= one.high[1] || one.low[1] >= two.high[1]) continue;
      if (two.low[2] >= one.high[2] || one.low[2] >= two.high[2]) continue;
      isShared[order[a]] = isShared[order[b]] = 1;
      for (let i = 0; i < 3; i++) {
        low[i] = Math.min(low[i], Math.max(one.low[i], two.low[i]));
        high[i] = Math.max(high[i], Math.min(one.high[i], two.high[i]));
      }
    }
  }
  const parts = [...boxes.keys()].filter((n) => isShared[n] === 1);
  return parts.length > 0 ? { box: { low, high }, parts } : undefined;
}

const heap = (boxes: readonly Box[]) => ({
  box: {
    low: [0, 1, 2].map((i) => boxes.reduce((least, { low }) => Math.min(least, low[i]), Infinity)),
    high: [0, 1, 2].map((i) => boxes.reduce((most, { high }) => Math.max(most, high[i]), -Infinity)),
  },
  parts: [...boxes.keys()],
});
