import type { Box } from "./vertex.js";

/** Parallel lines through a box. */
export interface Grid {
  /** The two axes across the lines, and the one along them. */
  readonly axes: readonly [number, number, number];
  /** Lines a side. */
  readonly lines: number;
  readonly low: readonly [number, number];
  readonly step: readonly [number, number];
}

export interface Crossing {
  readonly line: number;
  /** Along the line, m. */
  readonly depth: number;
  readonly part: number;
  /** Layers that begin there (less those that end). */
  readonly turn: number;
}

/** Lines a side, at most and at least, and how many crossings are looked at. */
const MOST = 64;
const LEAST = 8;
const CROSSINGS = 400_000;
/** Where in its cell a line lies: off the middle, lest it run along edges of models made to a grid. */
const OFF_GRID = [0.4142135623730951, 0.7320508075688772];

/** Crossings with as many lines along the box's longest side as are worth it, and the area that each line stands for. */
export function gridOver(box: Box, cross: (grid: Grid) => Crossing[]): { cell: number; found: Crossing[] } {
  const coarse = gridOf(box, LEAST);
  const few = cross(coarse);
  const lines = Math.min(MOST, Math.floor(LEAST * Math.sqrt(CROSSINGS / (few.length + 1))));
  const grid = lines <= LEAST ? coarse : gridOf(box, lines);
  return { cell: grid.step[0] * grid.step[1], found: grid === coarse ? few : cross(grid) };
}

function gridOf({ low, high }: Box, lines: number): Grid {
  const size = [0, 1, 2].map((i) => high[i] - low[i]);
  const along = size.indexOf(Math.max(...size));
  const [u, v] = [(along + 1) % 3, (along + 2) % 3];
  const step = [size[u] / lines, size[v] / lines] as const;
  return {
    axes: [u, v, along],
    lines,
    low: [low[u] + OFF_GRID[0] * step[0], low[v] + OFF_GRID[1] * step[1]],
    step,
  };
}

/**
 * Where the lines cross the triangles of a part. `sign` 1: a layer begins where the line comes to a triangle from outside.
 */
export function crossings(
  { positions, triangles }: { readonly positions: Float64Array; readonly triangles: Uint32Array },
  part: number,
  sign: number,
  { axes: [u, v, along], lines, low, step }: Grid,
): Crossing[] {
  const found: Crossing[] = [];
  const x = (p: number) => positions[3 * p + u];
  const y = (p: number) => positions[3 * p + v];
  const first = (axis: 0 | 1, least: number) => Math.max(0, Math.ceil((least - low[axis]) / step[axis]));
  const last = (axis: 0 | 1, most: number) =>
    Math.min(lines - 1, Math.floor((most - low[axis]) / step[axis]));
  for (let t = 0; t < triangles.length; t += 3) {
    const a = triangles[t];
    const b = triangles[t + 1];
    const c = triangles[t + 2];
    const toI = last(0, Math.max(x(a), x(b), x(c)));
    const toJ = last(1, Math.max(y(a), y(b), y(c)));
    for (let i = first(0, Math.min(x(a), x(b), x(c))); i <= toI; i++)
      for (let j = first(1, Math.min(y(a), y(b), y(c))); j <= toJ; j++) {
        const px = low[0] + i * step[0];
        const py = low[1] + j * step[1];
        // An edge is seen from its lower vertex, so that two triangles judge alike on which side of it a line runs.
        const side = (p: number, q: number): number => {
          if (p > q) return -side(q, p);
          return (x(q) - x(p)) * (py - y(p)) - (y(q) - y(p)) * (px - x(p));
        };
        const ab = side(a, b);
        const bc = side(b, c);
        const ca = side(c, a);
        const isLeft = ab > 0 && bc > 0 && ca > 0;
        if (!isLeft && !(ab < 0 && bc < 0 && ca < 0)) continue;
        const z = (p: number) => positions[3 * p + along];
        const depth = (bc * z(a) + ca * z(b) + ab * z(c)) / (ab + bc + ca);
        found.push({ line: i * lines + j, depth, part, turn: isLeft ? -sign : sign });
      }
  }
  return found;
}
