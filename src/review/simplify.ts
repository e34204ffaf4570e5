/**
 * A closed ring with as few of its points as stay within `tolerance` of it (D. Douglas & T. Peucker, Cartographica 10, 112, 1973),
 * begun at two points far from each other. x y x y…, in and out.
 */
export function simplified(ring: ArrayLike<number>, tolerance: number): Float64Array {
  const count = ring.length / 2;
  if (count < 4) return Float64Array.from(ring);
  const first = furthest(ring, 0);
  const second = furthest(ring, first);
  const kept = new Uint8Array(count);
  kept[first] = 1;
  kept[second] = 1;
  // Pairs of kept points whose way between is still to be looked at; the second may be past the ring's end.
  const pending =
    first < second ? [first, second, second, first + count] : [second, first, first, second + count];
  while (pending.length > 0) {
    const to = pending.pop()!;
    const from = pending.pop()!;
    const [at, away] = furthestFromChord(ring, from, to);
    if (!(away > tolerance * tolerance)) continue;
    kept[at % count] = 1;
    pending.push(from, at, at, to);
  }
  return picked(ring, kept);
}

function furthest(ring: ArrayLike<number>, from: number): number {
  let greatest = -1;
  let at = from;
  for (let i = 0; 2 * i < ring.length; i++) {
    const dx = ring[2 * i] - ring[2 * from];
    const dy = ring[2 * i + 1] - ring[2 * from + 1];
    if (dx * dx + dy * dy <= greatest) continue;
    greatest = dx * dx + dy * dy;
    at = i;
  }
  return at;
}

/** The point between furthest from the straight line from one point to another, and the square of how far. */
function furthestFromChord(ring: ArrayLike<number>, from: number, to: number): [at: number, square: number] {
  const count = ring.length / 2;
  const x = ring[2 * (from % count)];
  const y = ring[2 * (from % count) + 1];
  const dx = ring[2 * (to % count)] - x;
  const dy = ring[2 * (to % count) + 1] - y;
  const square = dx * dx + dy * dy;
  let greatest = -1;
  let at = from;
  for (let i = from + 1; i < to; i++) {
    const px = ring[2 * (i % count)] - x;
    const py = ring[2 * (i % count) + 1] - y;
    const share = square === 0 ? 0 : Math.min(1, Math.max(0, (px * dx + py * dy) / square));
    const qx = px - share * dx;
    const qy = py - share * dy;
    if (qx * qx + qy * qy <= greatest) continue;
    greatest = qx * qx + qy * qy;
    at = i;
  }
  return [at, greatest];
}

function picked(ring: ArrayLike<number>, kept: Uint8Array): Float64Array {
  const points: number[] = [];
  for (let i = 0; i < kept.length; i++) if (kept[i]) points.push(ring[2 * i], ring[2 * i + 1]);
  return Float64Array.from(points);
}
