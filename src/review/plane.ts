/** Plane geometry of pictures. */

export type Point = readonly [number, number];

export interface Bounds {
  left: number;
  right: number;
  low: number;
  high: number;
}

export const NOWHERE: Bounds = {
  left: Number.POSITIVE_INFINITY,
  right: Number.NEGATIVE_INFINITY,
  low: Number.POSITIVE_INFINITY,
  high: Number.NEGATIVE_INFINITY,
};

export const around = (bounds: Bounds, [x, y]: Point): Bounds => ({
  left: Math.min(bounds.left, x),
  right: Math.max(bounds.right, x),
  low: Math.min(bounds.low, y),
  high: Math.max(bounds.high, y),
});

/** A thing that a picture may be enlarged for; where it has no end, its bounds have none. */
export interface Thing {
  bounds: Bounds;
  /** Drawn whole or not at all. */
  isWhole: boolean;
}

/** The bounds of both, the thing's reaching out by no more than `most` to each side. */
export function grown(bounds: Bounds, { bounds: other, isWhole }: Thing, most: number): Bounds {
  const { left, right, low, high } = bounds;
  const out = [left - other.left, other.right - right, low - other.low, other.high - high];
  if (isWhole && out.some((way) => way > most)) return bounds;
  const [l, r, d, u] = out.map((way) => Math.max(0, Math.min(most, way)));
  return { left: left - l, right: right + r, low: low - d, high: high + u };
}

/** Counter-clockwise (Andrew, Information Processing Letters 9, 216, 1979: the monotone chain). */
export function convexHull2d(points: readonly Point[]): Point[] {
  const sorted = [...points].sort((a, b) => a[0] - b[0] || a[1] - b[1]);
  const half = (order: readonly Point[]): Point[] => {
    const chain: Point[] = [];
    for (const p of order) {
      while (chain.length > 1 && turn(chain[chain.length - 2], chain[chain.length - 1], p) <= 0) chain.pop();
      chain.push(p);
    }
    chain.pop();
    return chain;
  };
  return [...half(sorted), ...half(sorted.reverse())];
}

const turn = (a: Point, b: Point, c: Point): number =>
  (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0]);

/** What of a polygon lies within the bounds (Sutherland & Hodgman, Communications of the ACM 17, 32, 1974). */
export function clipped(polygon: readonly Point[], { left, right, low, high }: Bounds): Point[] {
  const sides: ((p: Point) => number)[] = [
    ([x]) => x - left,
    ([x]) => right - x,
    ([, y]) => y - low,
    ([, y]) => high - y,
  ];
  return sides.reduce<Point[]>(
    (rest, inside) =>
      rest.flatMap((p, i) => {
        const q = rest[(i + 1) % rest.length];
        const [a, b] = [inside(p), inside(q)];
        const share = a / (a - b);
        const crossing: Point = [p[0] + share * (q[0] - p[0]), p[1] + share * (q[1] - p[1])];
        return [...(a >= 0 ? [p] : []), ...(a >= 0 !== b >= 0 ? [crossing] : [])];
      }),
    [...polygon],
  );
}

/** Even-odd area of rings and the middle of that area; m², m. */
export function areaOf(rings: readonly Float64Array[]): number {
  let sum = 0;
  for (const ring of rings)
    for (let i = 0; i < ring.length; i += 2) {
      const j = (i + 2) % ring.length;
      sum += ring[i] * ring[j + 1] - ring[j] * ring[i + 1];
    }
  return Math.abs(sum) / 2;
}
