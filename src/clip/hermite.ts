/** glTF 2.0, Appendix C: cubic spline interpolation, with tangents already scaled by the segment's length. */

/** The weights of start, start tangent, end and end tangent at the share `s` of a segment, into `out`. */
export function hermiteWeights(s: number, out: Float64Array): void {
  const square = s * s;
  const cube = square * s;
  out[0] = 2 * cube - 3 * square + 1;
  out[1] = cube - 2 * square + s;
  out[2] = 3 * square - 2 * cube;
  out[3] = cube - square;
}

/** What the derivatives of a segment by its share, as lengths, never exceed. */
export interface HermiteBounds {
  first: number;
  second: number;
}

/**
 * Bounds for a segment of `size` components. The first derivative is a quadratic with the Bézier points m₀, 3(p₁ − p₀) − m₀ − m₁ and
 * m₁, which it lies in the convex hull of; the second is linear, greatest at an end.
 */
export function hermiteBounds(
  size: number,
  from: Float64Array,
  fromTangent: Float64Array,
  to: Float64Array,
  toTangent: Float64Array,
): HermiteBounds {
  let atStart = 0;
  let inside = 0;
  let atEnd = 0;
  let bendStart = 0;
  let bendEnd = 0;
  for (let i = 0; i < size; i++) {
    const way = to[i] - from[i];
    const m = fromTangent[i];
    const n = toTangent[i];
    atStart += m * m;
    atEnd += n * n;
    inside += (3 * way - m - n) * (3 * way - m - n);
    bendStart += (6 * way - 4 * m - 2 * n) * (6 * way - 4 * m - 2 * n);
    bendEnd += (6 * way - 2 * m - 4 * n) * (6 * way - 2 * m - 4 * n);
  }
  return {
    first: Math.sqrt(Math.max(atStart, inside, atEnd)),
    second: Math.sqrt(Math.max(bendStart, bendEnd)),
  };
}
