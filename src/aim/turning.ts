import { atan2, exp, log, sin } from "../math/elementary.js";
import type { Mat3 } from "../math/mat3.js";
import { dot, length, scale, type Vec3 } from "../math/vec3.js";
import { type Passage, passage } from "./closed-form.js";
import type { ReducedBody } from "./reduced-body.js";

const TURN = 2 * Math.PI;

/** How much a body turns within a flight and about which of its axes (ordered principal frame). */
export interface Turning {
  /** About the angular momentum: 2ET/(2π|L|). */
  turns: number;
  /** ∫|ω|dt/2π; never less. */
  turning: number;
  /** ∫|ω_a|dt/∫|ω|dt, and ∫ω_a dt/∫|ω|dt; zeros at rest. */
  share: Vec3;
  signedShare: Vec3;
  /** Factor by which a slight error at release has grown at the end, at most about. */
  growth: number;
}

/** The axes of a momentum whose sine to one of them is below this count as that axis. */
const PURE = 1e-9;

/**
 * The turning of the motion with the momentum `momentum` (ordered principal frame, the flight lasting 1) that ends in the pose `end`. All but
 * ∫|ω|dt by elementary functions of the amplitude (Byrd & Friedman, Handbook of Elliptic Integrals, 310.01, 312.01, 314.01), that by Gauss–Legendre
 * quadrature, to about 1e-10.
 */
export function turningOf(body: ReducedBody, momentum: Vec3, end: Mat3): Turning {
  const time = length(momentum);
  if (time === 0) return { turns: 0, turning: 0, share: [0, 0, 0], signedShare: [0, 0, 0], growth: 1 };
  const m = scale(momentum, 1 / time);
  const { inverse, d12, d23 } = body;
  const spin: Vec3 = [inverse[0] * m[0], inverse[1] * m[1], inverse[2] * m[2]];
  const turns = (dot(spin, m) * time) / TURN;
  const isPure = [0, 1, 2].some((a) => length([m[(a + 1) % 3], m[(a + 2) % 3], 0]) < PURE);
  const path = body.d13 > 0 && !isPure ? passage(body, m, end) : undefined;
  const unstable = Math.sqrt(d12 * d23);
  if (!path) {
    const rate = length(spin);
    const signedShare = scale(spin, 1 / rate);
    const share: Vec3 = [Math.abs(signedShare[0]), Math.abs(signedShare[1]), Math.abs(signedShare[2])];
    const growth = Math.abs(m[1]) > 0.5 ? exp(unstable * time) : 1;
    return { turns, turning: (rate * time) / TURN, share, signedShare, growth };
  }
  const windings = Math.round((time - path.time) / path.period);
  const part = integrals(body, path);
  const { own, other, sign } = path.polhode;
  const over = (f: (theta: number) => number, halfTurn: number): number =>
    rising(f, halfTurn, path.theta1) - rising(f, halfTurn, path.theta0) + 2 * windings * halfTurn;
  const whole = over(part.rate, part.rate(Math.PI / 2) * 2);
  const ownAngle = part.own * (path.theta1 - path.theta0 + TURN * windings);
  const signed = [0, 0, 0];
  const absolute = [0, 0, 0];
  signed[own] = (sign * ownAngle) / whole;
  absolute[own] = ownAngle / whole;
  signed[other] = (sign * (part.cosine(path.theta1) - part.cosine(path.theta0))) / whole;
  absolute[other] = over(part.cosine, 2 * part.cosine(Math.PI / 2)) / whole;
  const middle = (theta: number): number => part.sine(theta) - part.sine(0);
  const middleRising = (theta: number): number => (theta < 0 ? -1 : 1) * middle(Math.abs(theta));
  signed[1] = (part.sine(path.theta1) - part.sine(path.theta0)) / whole;
  absolute[1] = over(middleRising, 2 * middle(Math.PI / 2)) / whole;
  return {
    turns,
    turning: whole / TURN,
    share: [absolute[0], absolute[1], absolute[2]],
    signedShare: [signed[0], signed[1], signed[2]],
    // errors grow along the middle axis and shrink again on the way to its other end: one passage counts, and its delay each time
    growth: exp(unstable * Math.min(time, path.period / 2)) * (1 + (2 * time) / path.period),
  };
}

/** An odd integral known up to a right angle, for any angle: it gains `halfTurn` every π. */
function rising(f: (theta: number) => number, halfTurn: number, theta: number): number {
  const halves = Math.round(theta / Math.PI);
  return f(theta - halves * Math.PI) + halves * halfTurn;
}

/** Integrals over time from amplitude 0 to θ: of the rate, and of the components of the spin but for their signs. */
function integrals(body: ReducedBody, path: Passage) {
  const { own, other, amplitude, rate, modulus, complement } = path.polhode;
  const k = Math.sqrt(modulus);
  const amount = (a: number): number => (body.inverse[a] * amplitude[a]) / rate;
  const [ownSquare, middleSquare, otherSquare] = [own, 1, other].map((a) => amount(a) * amount(a));
  const integrand = (s: number, c: number): number => {
    const d = c + complement * s;
    return Math.sqrt(ownSquare * d + middleSquare * s + otherSquare * c) / Math.sqrt(d);
  };
  const upTo = quarterIntegral((c) => integrand(1 - c, c), Math.sqrt(complement));
  return {
    own: amount(own),
    cosine: (theta: number): number => {
      const s = sin(theta);
      return amount(other) * (k < 1e-6 ? s : atan2(k * s, Math.sqrt(1 - s * s + complement * s * s)) / k);
    },
    sine: (theta: number): number => {
      const c = sin(Math.PI / 2 - theta);
      return -amount(1) * (k < 1e-6 ? c : arsinh((k * c) / Math.sqrt(complement)) / k);
    },
    rate: upTo,
  };
}

function arsinh(x: number): number {
  const size = Math.abs(x);
  if (size < 1e-3) return x * (1 - (x * x) / 6);
  const value = log(size + Math.sqrt(1 + size * size));
  return x < 0 ? -value : value;
}

/**
 * ∫₀^θ f(cos²θ) dθ up to a right angle, for an f with a peak there no narrower than `width`: with tan θ = sinh v, dθ = dv/cosh v, the integrand is
 * smooth on a long range. Gauss–Legendre quadrature, ten points a panel of 2.
 */
function quarterIntegral(f: (cosSquare: number) => number, width: number): (theta: number) => number {
  const at = (cosh: number): number => f(1 / (cosh * cosh)) / cosh;
  const farthest = log(1e12 / width);
  const sums = [0];
  for (let panel = 0; panel < Math.ceil(farthest / PANEL); panel++) {
    let sum = 0;
    for (let i = 0; i < 10; i++) sum += WEIGHTS[i >> 1] * at(panelCosh(panel, i));
    sums.push(sums[panel] + (sum * PANEL) / 2);
  }
  return (theta) => {
    const size = Math.abs(theta);
    const s = sin(size);
    const c = sin(Math.PI / 2 - size);
    const v = c > 1e-15 ? log((1 + s) / c) : Number.POSITIVE_INFINITY;
    const panel = Math.min(Math.floor(v / PANEL), sums.length - 1);
    let value = sums[panel];
    if (panel < sums.length - 1) {
      const half = (v - panel * PANEL) / 2;
      const middle = panel * PANEL + half;
      for (let i = 0; i < 10; i++) value += WEIGHTS[i >> 1] * half * at(cosh(middle + half * node(i)));
    }
    return theta < 0 ? -value : value;
  };
}

const PANEL = 2;
/** Abramowitz & Stegun, table 25.4. */
const NODES = [
  0.14887433898163122, 0.4333953941292472, 0.6794095682990244, 0.8650633666889845, 0.9739065285171717,
];
const WEIGHTS = [
  0.29552422471475287, 0.26926671930999635, 0.21908636251598204, 0.1494513491505806, 0.06667134430868814,
];
const node = (i: number): number => (i % 2 === 0 ? NODES[i >> 1] : -NODES[i >> 1]);

/** The same panels serve every integral. */
const panelCosines: number[] = [];
function panelCosh(panel: number, i: number): number {
  const index = 10 * panel + i;
  panelCosines[index] ??= cosh(panel * PANEL + (PANEL / 2) * (1 + node(i)));
  return panelCosines[index];
}

function cosh(v: number): number {
  const e = exp(v);
  return (e + 1 / e) / 2;
}
