import { productError } from "../math/elementary/exact.js";
import { CompensatedSum } from "../math/sum.js";
import { cross, dot, type Vec3 } from "../math/vec3.js";

/** The spin in the principal frame, rad/s, as the unevaluated sum high + low of about twice a double's digits. */
export interface LongSpin {
  high: Float64Array;
  low: Float64Array;
}

/** The rounding of `lacking` as a part of its terms is below this: 2 · 15² times the square of a double's 2^-53. */
const NOISE = 1.3e-29;

/**
 * Makes the function that puts a spin which numerical error has moved slightly back onto the polhode of the spin at
 * release. Two quadratic forms with constant weights stay constant: |L|² = Σ I_a² ω_a², and
 * D = |L|² − 2E I₂ = Σ I_a (I_a − I₂) ω_a² with the middle moment I₂, which is zero on the separatrix.
 *
 * Held are these two because D alone decides how soon a body near the separatrix flips. It may be 1e-8 of |L|² and
 * less: while the body flips, the last digit of a double is too coarse to hold it, hence twice the digits.
 */
export function spinInvariants(spin: Vec3, moments: Vec3): (state: LongSpin) => void {
  const greatest = Math.max(...moments);
  const middle = [...moments].sort((a, b) => a - b)[1];
  // differences before any rounding: those of a near-symmetric body are small and exact
  const weights = (lessen: number): Vec3 => {
    const weight = (moment: number): number => (moment / greatest) * ((moment - lessen) / greatest);
    return [weight(moments[0]), weight(moments[1]), weight(moments[2])];
  };
  const ofSquare = weights(0);
  const ofMiddle = weights(middle);
  const across = cross(ofMiddle, ofSquare);

  return ({ high, low }) => {
    const momentum = (a: number): number => ofSquare[a] * high[a];
    const p: Vec3 = [momentum(0), momentum(1), momentum(2)];
    const size = 2 * (p[0] * high[0] + p[1] * high[1] + p[2] * high[2]);
    if (size === 0) return;
    const growth = lacking(ofSquare, spin, high, low) / size;
    for (let a = 0; a < 3; a++) low[a] += growth * high[a];

    // with |L| kept, D moves along p × (∇D × ∇L²); the inner product is along the motion, and is zero for a pure spin
    const v: Vec3 = [
      across[0] * high[1] * high[2],
      across[1] * high[2] * high[0],
      across[2] * high[0] * high[1],
    ];
    const square = dot(v, v);
    const lost = lacking(ofMiddle, spin, high, low);
    let terms = 0;
    for (let a = 0; a < 3; a++) terms += Math.abs(ofMiddle[a]) * high[a] * high[a];
    // near a stable axis v is small and D is not: what is lost may be nothing but this difference's own rounding
    if (square > 0 && Math.abs(lost) > NOISE * terms) {
      const along = cross(p, v);
      for (let a = 0; a < 3; a++) low[a] += (lost / (2 * square)) * along[a];
    }
    for (let a = 0; a < 3; a++) {
      const sum = high[a] + low[a];
      low[a] -= sum - high[a];
      high[a] = sum;
    }
  };
}

/** Σ weight (spin² − (high + low)²), exact to about the square of a double's rounding. */
function lacking(weights: Vec3, spin: Vec3, high: Float64Array, low: Float64Array): number {
  const sum = new CompensatedSum();
  for (let a = 0; a < 3; a++) {
    const was = spin[a] * spin[a];
    const is = high[a] * high[a];
    addProduct(sum, weights[a], was);
    addProduct(sum, -weights[a], is);
    const rest = productError(spin[a], spin[a], was) - productError(high[a], high[a], is);
    sum.add(weights[a] * (rest - 2 * high[a] * low[a]));
  }
  return sum.value;
}

function addProduct(sum: CompensatedSum, a: number, b: number): void {
  const product = a * b;
  sum.add(product);
  sum.add(productError(a, b, product));
}
