/**
 * Flights from a place to a point that lies `level` m ahead and `rise` m higher, in the vertical plane.
 *
 * With t the time to the point, the two numbers of such a flight are the climb c = w t (w the upward speed of launch: the height it would reach
 * there without gravity) and the sag G t²/2 = c − rise that gravity takes off it. Elevation, apex and a point on the way fix the sag, whatever
 * gravity and time are; the time, the speed or a known gravity then fix the rest.
 */

/** Upward part of the launch, without the scale of time: metres. */
export interface Shape {
  climb: number;
  sag: number;
}

/** A flight to the point: its time, the climb, and the strength of gravity. */
export interface Passage {
  time: number;
  climb: number;
  gravity: number;
}

/** Launched at this slope (tangent of the elevation). The sag is not positive where the point lies on or above the line of launch. */
export const shapeBySlope = (level: number, rise: number, slope: number): Shape => ({
  climb: level * slope,
  sag: level * slope - rise,
});

/** Passing at `height` above the start after the share `s` of the level way (y = s c − s² k, k the sag). Not positive: not above the straight line. */
export function shapeByPoint(rise: number, s: number, height: number): Shape {
  const sag = (height - s * rise) / (s * (1 - s));
  return { climb: rise + sag, sag };
}

/**
 * Rising `apex` m in all, apex ≥ rise: √k = √apex ± √(apex − rise), since the way down from the top takes √(2 (apex − rise) / G).
 *
 * @param descending whether the top lies before the point (else behind it, which has sense for rise > 0 alone)
 */
export function shapeByApex(rise: number, apex: number, descending: boolean): Shape {
  const up = Math.sqrt(apex);
  const down = Math.sqrt(Math.max(0, apex - rise));
  const root = descending ? up + down : rise / (up + down);
  return { climb: 2 * up * root, sag: root * root };
}

/** Under a known gravity > 0. */
export const passageByGravity = (shape: Shape, gravity: number): Passage => ({
  time: Math.sqrt((2 * shape.sag) / gravity),
  climb: shape.climb,
  gravity,
});

/** In a known time, gravity solved. */
export const passageByTime = (shape: Shape, time: number): Passage => ({
  time,
  climb: shape.climb,
  gravity: (2 * shape.sag) / (time * time),
});

/** At a known speed of launch, gravity solved: speed² t² = level² + climb². */
export const passageBySpeed = (shape: Shape, level: number, speed: number): Passage =>
  passageByTime(shape, Math.sqrt(level * level + shape.climb * shape.climb) / speed);

/**
 * The passages at a known speed under a known gravity, lower launch first; none below `leastSpeed`.
 *
 * From speed² t² = level² + (rise + G t²/2)², a quadratic in t²; both roots in the form without cancellation.
 */
export function passagesAtSpeed(level: number, rise: number, speed: number, gravity: number): Passage[] {
  const slant = level * level + rise * rise;
  const reach = Math.sqrt(slant);
  const half = speed * speed - gravity * rise;
  const excess = speed * speed - leastSpeedSquared(level, rise, gravity);
  // A speed that is the least one but for rounding is taken for it.
  if (excess < -1e-15 * speed * speed || half <= 0) return [];
  const sum = half + Math.sqrt(Math.max(0, excess) * (half + gravity * reach));
  const squares =
    gravity === 0 ? [slant / (speed * speed)] : [(2 * slant) / sum, (2 * sum) / (gravity * gravity)];
  return squares
    .filter((square) => square > 0)
    .map((square) => ({ time: Math.sqrt(square), climb: rise + 0.5 * gravity * square, gravity }));
}

/** The least speed that reaches the point, m/s (the envelope of all parabolas: Torricelli's parabola of safety). */
export const leastSpeed = (level: number, rise: number, gravity: number): number =>
  Math.sqrt(leastSpeedSquared(level, rise, gravity));

/** At a known speed in a known time, gravity solved: the climb is ±√(speed² t² − level²). Lower launch first; sags not positive included. */
export function shapesAtSpeedAndTime(level: number, rise: number, speed: number, time: number): Shape[] {
  const way = speed * time;
  if (way < level) return [];
  const climb = Math.sqrt((way - level) * (way + level));
  return (climb === 0 ? [0] : [-climb, climb]).map((c) => ({ climb: c, sag: c - rise }));
}

/** G (rise + √(level² + rise²)), without cancellation for a point below. */
function leastSpeedSquared(level: number, rise: number, gravity: number): number {
  const reach = Math.sqrt(level * level + rise * rise);
  if (rise >= 0) return gravity * (rise + reach);
  return (gravity * level * level) / (reach - rise);
}
