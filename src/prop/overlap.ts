import { type Box, boxOf } from "./vertex.js";

/** A closed part as matter or as a cavity. */
export interface Filled {
  readonly positions: Float64Array;
  readonly triangles: Uint32Array;
  /** 1 for each time the triangles' winding encloses a place with matter, -1 where that is the other way round. */
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
 * Roughly how much mass is counted more than once where parts overlap or lie in one another; undefined where no two boxes do.
 * Along 64 × 64 lines through the region the parts are met exactly: between two crossings, the depth is how many are there.
 * Of what shares a place the densest counts once, and the rest is too much.
 */
export function overlap(parts: readonly Filled[]): Overlap | undefined {
  const boxes = parts.map(({ positions }) => boxOf(positions));
  const region = sharedRegion(boxes);
  if (!region) return undefined;
  const grid = gridOver(region.box);
  const hits = region.parts.flatMap((n) => crossings(parts[n], n, grid));
  hits.sort((a, b) => a.column - b.column || a.depth - b.depth || a.part - b.part);
  const between = new Map<string, { mass: number; pair: [number, number] }>();
  let mass = 0;
  const inside = new Map<number, number>();
  for (let i = 0; i < hits.length; i++) {
    const { column, part, turn, depth } = hits[i];
    if (i === 0 || column !== hits[i - 1].column) inside.clear();
    const layers = (inside.get(part) ?? 0) + turn;
    if (layers === 0) inside.delete(part);
    else inside.set(part, layers);
    const next = hits[i + 1];
    if (!next || next.column !== column) continue;
    const found = tooMuch(inside, parts);
    if (!found) continue;
    const more = found.density * (next.depth - depth) * grid.cell;
    mass += more;
    const key = found.pair.join();
    const entry = between.get(key) ?? { mass: 0, pair: found.pair };
    entry.mass += more;
    between.set(key, entry);
  }
  const worst = [...between.values()].reduce<{ mass: number; pair: [number, number] } | undefined>(
    (most, entry) => (most && most.mass >= entry.mass ? most : entry),
    undefined,
  );
  return worst && { mass, pair: worst.pair };
}

/** Lines a side of the grid. */
const LINES = 64;
/** Where in its cell a line lies: off the middle, lest it run along edges of models made to a grid. */
const OFF_GRID = [0.4142135623730951, 0.7320508075688772];

/** kg/m³ too much where each part is present so many times; cavities take away from what is there. */
function tooMuch(
  inside: ReadonlyMap<number, number>,
  parts: readonly Filled[],
): { density: number; pair: [number, number] } | undefined {
  let layers = 0;
  let sum = 0;
  let densest = -1;
  let other = -1;
  for (const [part, count] of inside) {
    layers += count;
    if (count < 0) continue;
    sum += count * parts[part].density;
    if (densest < 0 || parts[part].density > parts[densest].density) [densest, other] = [part, densest];
    else if (other < 0) other = part;
  }
  if (layers < 2) return undefined;
  if (other < 0) other = densest;
  // Where a cavity is there too, some layer is taken away already.
  const density =
    inside.size < 2 || layers === positive(inside)
      ? sum - parts[densest].density
      : parts[other].density * (layers - 1);
  return { density, pair: densest < other ? [densest, other] : [other, densest] };
}

function positive(inside: ReadonlyMap<number, number>): number {
  let sum = 0;
  for (const count of inside.values()) sum += Math.max(0, count);
  return sum;
}

/** The box around all places where boxes overlap, and the numbers of those boxes. */
function sharedRegion(boxes: readonly Box[]): { box: Box; parts: number[] } | undefined {
  const order = [...boxes.keys()].sort((a, b) => boxes[a].low[0] - boxes[b].low[0] || a - b);
  const parts = new Set<number>();
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  for (let a = 0; a < order.length; a++)
    for (let b = a + 1; b < order.length; b++) {
      const [one, two] = [boxes[order[a]], boxes[order[b]]];
      if (two.low[0] >= one.high[0]) break;
      const from = one.low.map((value, i) => Math.max(value, two.low[i]));
      const to = one.high.map((value, i) => Math.min(value, two.high[i]));
      if (from.some((value, i) => value >= to[i])) continue;
      parts.add(order[a]).add(order[b]);
      for (let i = 0; i < 3; i++) {
        low[i] = Math.min(low[i], from[i]);
        high[i] = Math.max(high[i], to[i]);
      }
    }
  return parts.size > 0 ? { box: { low, high }, parts: [...parts].sort((a, b) => a - b) } : undefined;
}

interface Grid {
  /** The two axes across the lines, and the one along them. */
  readonly axes: readonly [number, number, number];
  readonly low: readonly [number, number];
  readonly step: readonly [number, number];
  /** m² */
  readonly cell: number;
}

/** Lines along the region's longest side, so that they lie close. */
function gridOver({ low, high }: Box): Grid {
  const size = [0, 1, 2].map((i) => high[i] - low[i]);
  const along = size.indexOf(Math.max(...size));
  const [u, v] = [(along + 1) % 3, (along + 2) % 3];
  const step = [size[u] / LINES, size[v] / LINES] as const;
  return {
    axes: [u, v, along],
    low: [low[u] + OFF_GRID[0] * step[0], low[v] + OFF_GRID[1] * step[1]],
    step,
    cell: step[0] * step[1],
  };
}

interface Crossing {
  column: number;
  depth: number;
  part: number;
  /** Layers of matter that begin (less those that end) there. */
  turn: number;
}

/** Where the lines cross a part's triangles. */
function crossings({ positions, triangles, sign }: Filled, part: number, grid: Grid): Crossing[] {
  const [u, v, along] = grid.axes;
  const found: Crossing[] = [];
  const range = (axis: 0 | 1, corners: readonly number[]): [number, number] => [
    Math.max(0, Math.ceil((Math.min(...corners) - grid.low[axis]) / grid.step[axis])),
    Math.min(LINES - 1, Math.floor((Math.max(...corners) - grid.low[axis]) / grid.step[axis])),
  ];
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [triangles[t], triangles[t + 1], triangles[t + 2]];
    const x = (p: number) => positions[3 * p + u];
    const y = (p: number) => positions[3 * p + v];
    const [fromI, toI] = range(0, [x(a), x(b), x(c)]);
    const [fromJ, toJ] = range(1, [y(a), y(b), y(c)]);
    for (let i = fromI; i <= toI; i++)
      for (let j = fromJ; j <= toJ; j++) {
        const px = grid.low[0] + i * grid.step[0];
        const py = grid.low[1] + j * grid.step[1];
        // An edge is seen from its lower vertex, so that two triangles judge alike on which side of it a line runs.
        const side = (p: number, q: number): number => {
          const [from, to] = p < q ? [p, q] : [q, p];
          const value = (x(to) - x(from)) * (py - y(from)) - (y(to) - y(from)) * (px - x(from));
          return p < q ? value : -value;
        };
        const [ab, bc, ca] = [side(a, b), side(b, c), side(c, a)];
        const left = ab > 0 && bc > 0 && ca > 0;
        if (!left && !(ab < 0 && bc < 0 && ca < 0)) continue;
        const z = (p: number) => positions[3 * p + along];
        const depth = (bc * z(a) + ca * z(b) + ab * z(c)) / (ab + bc + ca);
        found.push({ column: i * LINES + j, depth, part, turn: left ? -sign : sign });
      }
  }
  return found;
}
