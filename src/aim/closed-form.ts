import { atan2 } from "../math/elementary.js";
import { type Mat3, multiplyVector, transpose } from "../math/mat3.js";
import { cross, dot, normalize, type Vec3 } from "../math/vec3.js";
import { carlsonF, carlsonJ } from "./carlson.js";
import type { ReducedBody } from "./reduced-body.js";

/**
 * The curve on which the direction m of the angular momentum moves in the body, per unit of |L|·t: m_c = ±A_c cn, m_b = A_b sn, m_a = ±A_a dn
 * with the axis a it goes round (Landau & Lifshitz, Mechanics, §37), b the middle one.
 */
export interface Polhode {
  /** Index of the axis a it goes round, 2 (greatest moment) or 0 (least), and of the third axis c. */
  own: 0 | 2;
  other: 0 | 2;
  /** Sign of m_a. */
  sign: number;
  /** 2E/L² = m·Jm. */
  energy: number;
  /** J_a. */
  ownInverse: number;
  /** Rate of the elliptic functions' argument. */
  rate: number;
  /** k², and k'² = 1 − k² with its own digits. */
  modulus: number;
  complement: number;
  /** (A_b/A_c)² − 1. */
  spread: number;
  /** A_a, A_b, A_c by the axes' own indices. */
  amplitude: Vec3;
  /** Gain of azimuth per unit of time: J_a + gain / (1 + spread·sn²). */
  gain: number;
}

/** The polhode through the unit vector m; on the separatrix itself its complement, and near symmetry its rate, may be 0. */
export function polhodeThrough(body: ReducedBody, m: Vec3): Polhode {
  const { d12, d23, d13, inverse } = body;
  const [x, y, z] = [m[0] * m[0], m[1] * m[1], m[2] * m[2]];
  const overLeast = d13 * x + d23 * y;
  const underMost = d12 * y + d13 * z;
  const overMiddle = d12 * x - d23 * z;
  const energy = inverse[2] + overLeast;
  const extremes = [Math.sqrt(overLeast / d13), Math.sqrt(underMost / d13)];
  if (overMiddle <= 0)
    return {
      own: 2,
      other: 0,
      sign: m[2] < 0 ? -1 : 1,
      energy,
      ownInverse: inverse[2],
      rate: Math.sqrt(underMost * d23),
      modulus: (d12 * overLeast) / (d23 * underMost),
      complement: (-d13 * overMiddle) / (d23 * underMost),
      spread: d12 / d23,
      amplitude: [extremes[0], Math.sqrt(overLeast / d23), extremes[1]],
      gain: d13,
    };
  return {
    own: 0,
    other: 2,
    sign: m[0] < 0 ? -1 : 1,
    energy,
    ownInverse: inverse[0],
    rate: Math.sqrt(overLeast * d12),
    modulus: (d23 * underMost) / (d12 * overLeast),
    complement: (d13 * overMiddle) / (d12 * overLeast),
    spread: d23 / d12,
    amplitude: [extremes[0], Math.sqrt(underMost / d12), extremes[1]],
    gain: -d13,
  };
}

/** Sine and cosine of the amplitude θ (sn = sin θ, cn = cos θ) at the point m of the polhode; θ grows with time. */
function amplitudeAt(body: ReducedBody, polhode: Polhode, m: Vec3): { sin: number; cos: number } {
  // A_b and A_c but for a common factor: a pure spin, where both are 0, counts as θ = 0
  const b = m[1] * Math.sqrt(polhode.own === 2 ? body.d23 : body.d12);
  const c = polhode.sign * m[polhode.other] * Math.sqrt(body.d13);
  const [sin, cos] = normalize([b, c, 0]);
  return sin === 0 && cos === 0 ? { sin: 0, cos: 1 } : { sin, cos };
}

/** What the passages from one direction of the momentum in the body to another have in common, in units of 1/|L|. */
export interface Passage {
  polhode: Polhode;
  /** Amplitudes at start and end, −π to π. */
  theta0: number;
  theta1: number;
  /** Azimuth about the momentum that the end pose asks of the axis a, −π to π. */
  azimuth: number;
  /** Time from start to end, as the amplitudes stand, and the polhode's period; with w periods more it is time + w·period. */
  time: number;
  period: number;
  /** Azimuth the motion gains in these. */
  turned: number;
  turnedPerPeriod: number;
}

/**
 * The passages that lead from the momentum's direction `m` at the start to the one it has in the end pose.
 *
 * @param end rows of the rotation from the ordered principal frame at the end to that at the start
 * @returns undefined where both directions do not lie on one branch of a polhode that is passed in finite time
 */
export function passage(body: ReducedBody, m: Vec3, end: Mat3): Passage | undefined {
  const polhode = polhodeThrough(body, m);
  const m1 = multiplyVector(transpose(end), m);
  if (!(m1[polhode.own] * polhode.sign > 0 && polhode.rate > 0 && polhode.complement > 0)) return undefined;
  const start = amplitudeAt(body, polhode, m);
  const stop = amplitudeAt(body, polhode, m1);
  const { complement, spread, rate } = polhode;
  const quarterF = carlsonF(0, complement, 1);
  const quarterPi =
    spread === 0 ? quarterF : quarterF - (spread / 3) * carlsonJ(0, complement, 1, 1 + spread);
  const from = integrals(polhode, start.sin, start.cos, quarterF, quarterPi);
  const to = integrals(polhode, stop.sin, stop.cos, quarterF, quarterPi);
  const time = (to[0] - from[0]) / rate;
  const period = (4 * quarterF) / rate;
  const own = polhode.ownInverse;
  return {
    polhode,
    theta0: atan2(start.sin, start.cos),
    theta1: atan2(stop.sin, stop.cos),
    azimuth: azimuthAsked(body, polhode, m, m1, start, stop, end),
    time,
    period,
    turned: own * time + (polhode.gain * (to[1] - from[1])) / rate,
    turnedPerPeriod: own * period + (4 * polhode.gain * quarterPi) / rate,
  };
}

/** Legendre's F(θ, k) and Π(θ, −spread, k) for −π ≤ θ ≤ π (DLMF 19.25.5 and 19.25.14). */
function integrals(
  polhode: Polhode,
  sin: number,
  cos: number,
  quarterF: number,
  quarterPi: number,
): [number, number] {
  const c = cos * cos;
  const d = c + polhode.complement * sin * sin;
  // beyond a right angle: θ = θ' ± π, and both grow by twice the complete one per half turn
  const s = cos < 0 ? -sin : sin;
  const halves = cos < 0 ? (sin < 0 ? -2 : 2) : 0;
  const f = s * carlsonF(c, d, 1);
  const { spread } = polhode;
  const pi = spread === 0 ? f : f - (spread / 3) * s * s * s * carlsonJ(c, d, 1, 1 + spread * s * s);
  return [f + halves * quarterF, pi + halves * quarterPi];
}

/** The angle about m from where the axis a points at the start to where it points in the end pose. */
function azimuthAsked(
  body: ReducedBody,
  polhode: Polhode,
  m0: Vec3,
  m1: Vec3,
  start: { sin: number; cos: number },
  stop: { sin: number; cos: number },
  end: Mat3,
): number {
  const across = acrossMomentum(body, polhode, m0, start);
  const asked = multiplyVector(end, acrossMomentum(body, polhode, m1, stop));
  return atan2(dot(asked, cross(m0, across)), dot(asked, across));
}

/** The unit vector square to m towards the axis a, which for a pure spin is the limit along θ. */
function acrossMomentum(
  body: ReducedBody,
  polhode: Polhode,
  m: Vec3,
  at: { sin: number; cos: number },
): Vec3 {
  const b = at.sin / Math.sqrt(polhode.own === 2 ? body.d23 : body.d12);
  const c = (polhode.sign * at.cos) / Math.sqrt(body.d13);
  const [ub, uc] = normalize([b, c, 0]);
  const off = Math.sqrt(m[1] * m[1] + m[polhode.other] * m[polhode.other]);
  const along = m[polhode.own];
  return polhode.own === 2 ? [-uc * along, -ub * along, off] : [off, -ub * along, -uc * along];
}
