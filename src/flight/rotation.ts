import { pow } from "../math/elementary.js";
import { normalize, type Quat, rotate } from "../math/quat.js";
import { length, normalize as normalizeVector, scale, type Vec3 } from "../math/vec3.js";
import { momentRatios } from "./rotation-bounds.js";
import { DEGREE, SPIN, Steps, TURN } from "./rotation-steps.js";
import { spinInvariants } from "./spin-invariants.js";

/** The torque-free turning of a rigid body as a continuous function of time. */
export interface Rotation {
  /** World frame, constant, kg m²/s. */
  readonly angularMomentum: Vec3;
  /** Constant, J. */
  readonly energy: number;
  /** Writes the unit quaternion [x, y, z, w] that turns the principal frame onto the world. Allocates nothing. */
  orientationInto(t: number, out: Float64Array, offset: number): void;
  /** Writes the angular velocity in the principal frame, rad/s. Allocates nothing. */
  spinInto(t: number, out: Float64Array, offset: number): void;
}

/** The last terms of a step's series are this small beside the whole: half a rounding error. */
const TAIL = 1.1e-16;

/**
 * Solves Euler's equations ω_a' = k_a ω_b ω_c and q' = ½ q ⊗ ω from time 0 to `duration`. The arguments are as in
 * `Launch`, `orientation` of unit length; `greatestRate` is a bound of |ω|, rad/s.
 *
 * Both equations are quadratic, so every step's Taylor coefficients come by Cauchy products, and the step's length from
 * the last of them (Jorba & Zou, Experimental Mathematics 14, 99, 2005); the polynomial is the dense output. At the end of
 * a step the motion is put back to what the launch fixed: the spin onto its polhode, that is to |L| and the energy, and
 * the orientation by the smallest rotation that lays the body's momentum along L. The spin evolves without the
 * orientation, so that one exactly about a principal axis stays exactly there.
 */
export function rotation(
  orientation: Quat,
  spin: Vec3,
  moments: Vec3,
  duration: number,
  greatestRate: number,
): Rotation {
  const ratios = momentRatios(moments);
  const bodyMomentum: Vec3 = [moments[0] * spin[0], moments[1] * spin[1], moments[2] * spin[2]];
  const angularMomentum = rotate(orientation, bodyMomentum);
  const steps = new Steps();

  const q = Float64Array.from(orientation);
  const state = { high: Float64Array.from(spin), low: new Float64Array(3) };
  const holdInvariants = spinInvariants(spin, moments);
  for (let start = 0; ; ) {
    const step = steps.add(start);
    expand(steps, step, q, state.high, ratios);
    const longest = stepLength(steps, step, greatestRate);
    const end = Math.min(start + longest, duration);
    steps.close(step, end - start);
    if (end === duration) break;
    steps.turnInto(step, 1, q, 0);
    steps.endSpin(step, state);
    holdInvariants(state);
    alignMomentum(q, state.high, moments, angularMomentum);
    start = end;
  }

  return {
    angularMomentum,
    energy: 0.5 * (bodyMomentum[0] * spin[0] + bodyMomentum[1] * spin[1] + bodyMomentum[2] * spin[2]),
    orientationInto(t, out, offset) {
      const step = steps.find(t);
      steps.turnInto(step, steps.fraction(step, t), out, offset);
    },
    spinInto(t, out, offset) {
      const step = steps.find(t);
      steps.spinInto(step, steps.fraction(step, t), out, offset);
    },
  };
}

/** Fills in a step's Taylor coefficients, per second to the power, from the state at its start. */
function expand(steps: Steps, step: number, q: Float64Array, w: Float64Array, k: Vec3): void {
  const turn = steps.turns.subarray(step * TURN, (step + 1) * TURN);
  const spin = steps.spins.subarray(step * SPIN, (step + 1) * SPIN);
  turn.set(q);
  spin.set(w);
  for (let n = 0; n < DEGREE; n++) {
    let sx = 0;
    let sy = 0;
    let sz = 0;
    let tx = 0;
    let ty = 0;
    let tz = 0;
    let tw = 0;
    for (let i = 0; i <= n; i++) {
      const a = 3 * i;
      const b = 3 * (n - i);
      const c = 4 * i;
      const x = spin[b];
      const y = spin[b + 1];
      const z = spin[b + 2];
      sx += spin[a + 1] * z;
      sy += spin[a + 2] * x;
      sz += spin[a] * y;
      const qx = turn[c];
      const qy = turn[c + 1];
      const qz = turn[c + 2];
      const qw = turn[c + 3];
      tx += qw * x + qy * z - qz * y;
      ty += qw * y + qz * x - qx * z;
      tz += qw * z + qx * y - qy * x;
      tw -= qx * x + qy * y + qz * z;
    }
    const s = 3 * (n + 1);
    spin[s] = (k[0] * sx) / (n + 1);
    spin[s + 1] = (k[1] * sy) / (n + 1);
    spin[s + 2] = (k[2] * sz) / (n + 1);
    const t = 4 * (n + 1);
    const half = 0.5 / (n + 1);
    turn[t] = tx * half;
    turn[t + 1] = ty * half;
    turn[t + 2] = tz * half;
    turn[t + 3] = tw * half;
  }
}

/**
 * The longest step, s, whose last two terms stay under `TAIL`: two, as a series may lack its odd or even ones. Each
 * component of the spin is held to its own size, however small, because near the middle axis small components grow.
 */
function stepLength(steps: Steps, step: number, rate: number): number {
  const turn = step * TURN;
  const spin = step * SPIN;
  let longest = Number.POSITIVE_INFINITY;
  for (let n = DEGREE - 1; n <= DEGREE; n++) {
    let tail = 0;
    for (let a = 0; a < 4; a++) tail = Math.max(tail, Math.abs(steps.turns[turn + 4 * n + a]));
    for (let a = 0; a < 3; a++) {
      const last = Math.abs(steps.spins[spin + 3 * n + a]);
      const size = Math.max(Math.abs(steps.spins[spin + a]), Math.abs(steps.spins[spin + 3 + a]) / rate);
      if (last > 0 && size > 0) tail = Math.max(tail, last / size);
    }
    if (tail > 0) longest = Math.min(longest, pow(TAIL / tail, 1 / n));
  }
  return longest;
}

/** Turns q so that the body's momentum R I ω points along the one in the world; the angle is of rounding size. */
function alignMomentum(q: Float64Array, w: Float64Array, moments: Vec3, momentum: Vec3): void {
  const size = length(momentum);
  if (size === 0) return;
  const body = rotate([q[0], q[1], q[2], q[3]], [moments[0] * w[0], moments[1] * w[1], moments[2] * w[2]]);
  const [x, y, z] = normalizeVector(body);
  const target = scale(momentum, 1 / size);
  // half the vector of the rotation from the one onto the other
  const hx = 0.5 * (y * target[2] - z * target[1]);
  const hy = 0.5 * (z * target[0] - x * target[2]);
  const hz = 0.5 * (x * target[1] - y * target[0]);
  q.set(
    normalize([
      q[0] + hx * q[3] + hy * q[2] - hz * q[1],
      q[1] + hy * q[3] + hz * q[0] - hx * q[2],
      q[2] + hz * q[3] + hx * q[1] - hy * q[0],
      q[3] - hx * q[0] - hy * q[1] - hz * q[2],
    ]),
  );
}
