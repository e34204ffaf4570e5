/** How a rotation key is stored, and what comes back from the file. */
export interface RotationStore {
  /** What `values` of this many numbers is made of. */
  create(length: number): Float32Array | Int16Array;
  /** Numbers as stored of the unit quaternion in `q` at `offset`, into `stored`; as played, unit, into `played`. */
  store(q: Float64Array, offset: number, stored: Float64Array, played: Float64Array): void;
  /** |1 − length| of a stored quaternion, at most: a player that does not make it unit scales the prop by twice that. */
  lengthError: number;
}

export const floatStore: RotationStore = {
  create: (length) => new Float32Array(length),
  store(q, offset, stored, played) {
    for (let i = 0; i < 4; i++) stored[i] = Math.fround(q[offset + i]);
    unitInto(stored, played);
  },
  // What the player's own float32 does to a point anyway.
  lengthError: 0,
};

/** The greatest int16, which stands for 1 (glTF 2.0, 3.6.2.2). */
const ONE = 32767;
const WORST_LENGTH = 2e-5;

/**
 * Of the sixteen ways to round the four components up or down the one that turns least, a quaternion's length counting as much as its
 * direction: plain rounding leaves the length up to 3e-5 off, and not every player makes it unit.
 */
export const int16Store: RotationStore = {
  create: (length) => new Int16Array(length),
  store(q, offset, stored, played) {
    let best = Number.POSITIVE_INFINITY;
    let bestWay = 0;
    for (let way = 0; way < 16; way++) {
      let along = 0;
      let square = 0;
      for (let i = 0; i < 4; i++) {
        const c = rounding(q[offset + i], way, i) / ONE;
        along += c * q[offset + i];
        square += c * c;
      }
      const length = Math.sqrt(square);
      // |off direction|² + 4 (length − 1)²
      const cost = square - along * along + 4 * (length - 1) * (length - 1);
      if (cost < best && Math.abs(length - 1) <= WORST_LENGTH) {
        best = cost;
        bestWay = way;
      }
    }
    for (let i = 0; i < 4; i++) stored[i] = rounding(q[offset + i], bestWay, i);
    unitInto(stored, played);
  },
  lengthError: WORST_LENGTH,
};

/** A component as one of its two neighbouring integers; bit `i` of `way` says the upper. */
function rounding(component: number, way: number, i: number): number {
  const whole = Math.floor(component * ONE) + ((way >> i) & 1);
  return Math.max(-ONE, Math.min(ONE, whole));
}

function unitInto(stored: Float64Array, out: Float64Array): void {
  let square = 0;
  for (let i = 0; i < 4; i++) square += stored[i] * stored[i];
  const size = Math.sqrt(square);
  for (let i = 0; i < 4; i++) out[i] = stored[i] / size;
}
