import { fly } from "../flight/flight.js";
import { type Mat3, solve, transpose } from "../math/mat3.js";
import { conjugate, multiply, type Quat, toRotationVector } from "../math/quat.js";
import { add, dot, length, scale, type Vec3, ZERO } from "../math/vec3.js";

/** A launch's turning: what stays the same while the spin is sought. */
export interface Turn {
  /** In the principal frame; any order, kg m². */
  moments: Vec3;
  /** Principal frame → world at release and at the end. */
  start: Quat;
  end: Quat;
  /** s */
  duration: number;
}

export interface Polished {
  /** rad/s, principal frame. */
  spin: Vec3;
  /** Angle from the end pose to where the flight ends, rad. */
  miss: number;
}

/** A miss below this is left as it is, rad. */
const GOOD = 1e-11;
const ROUNDS = 12;
const HALVINGS = 6;

/**
 * Brings the end of the flight itself onto the end pose by damped Newton iteration with differences as derivatives; keeps the best spin seen.
 *
 * @param growth by how much errors at release have grown at the end: sets the differences' width
 */
export function polish(turn: Turn, spin: Vec3, growth: number): Polished {
  let best = attempt(turn, spin);
  let jacobian: Mat3 | undefined;
  for (let round = 0; round < ROUNDS && length(best.error) > GOOD; round++) {
    const fresh = jacobian === undefined;
    jacobian ??= differences(turn, best, growth);
    const next = damped(turn, best, jacobian);
    const gain = next ? length(best.error) / length(next.error) : 1;
    if (next) best = next;
    if (gain < 10) jacobian = undefined;
    if (fresh && gain < 1.5) break;
  }
  return { spin: best.spin, miss: length(best.error) };
}

interface Attempt {
  spin: Vec3;
  /** Rotation vector from the flight's end to the end pose, in the principal frame at the end, rad. */
  error: Vec3;
}

function attempt(turn: Turn, spin: Vec3): Attempt {
  return { spin, error: toRotationVector(multiply(conjugate(endOf(turn, spin)), turn.end)) };
}

/** Principal frame → world at the end of the flight. */
export function endOf(turn: Omit<Turn, "end">, spin: Vec3): Quat {
  const { moments, start, duration } = turn;
  const still = { centerOfMass: ZERO, velocity: ZERO, gravity: ZERO };
  return fly({ ...still, orientation: start, spin, moments, duration }).orientation(duration);
}

/** Rows of the derivatives of the error by the spin. */
function differences(turn: Turn, at: Attempt, growth: number): Mat3 {
  const step = Math.max(Math.min(1e-6, 1e-4 / growth) / turn.duration, 1e-15 * length(at.spin));
  const column = (a: number): Vec3 => {
    const there = attempt(turn, add(at.spin, [a === 0 ? step : 0, a === 1 ? step : 0, a === 2 ? step : 0]));
    return scale(add(there.error, scale(at.error, -1)), 1 / step);
  };
  return transpose([column(0), column(1), column(2)]);
}

/** The first of ever shorter steps that lessens the miss: Newton's, or where that fails ever more along the steepest descent. */
function damped(turn: Turn, at: Attempt, jacobian: Mat3): Attempt | undefined {
  const before = length(at.error);
  const goal = scale(at.error, -1);
  const newton = limited(turn, at, solve(jacobian, goal));
  for (let halving = 0, size = 1; newton && halving < HALVINGS; halving++, size /= 2) {
    const next = attempt(turn, add(at.spin, scale(newton, size)));
    if (length(next.error) < before) return next;
  }
  // Levenberg's step, for derivatives that leave a direction open
  const columns = transpose(jacobian);
  const trace = dot(columns[0], columns[0]) + dot(columns[1], columns[1]) + dot(columns[2], columns[2]);
  for (let damping = 1e-10 * trace; damping < trace; damping *= 1e3) {
    const normal = (a: number, b: number): number => dot(columns[a], columns[b]) + (a === b ? damping : 0);
    const row = (a: number): Vec3 => [normal(a, 0), normal(a, 1), normal(a, 2)];
    const move = limited(
      turn,
      at,
      solve([row(0), row(1), row(2)], [dot(columns[0], goal), dot(columns[1], goal), dot(columns[2], goal)]),
    );
    const next = move && attempt(turn, add(at.spin, move));
    if (next && length(next.error) < before) return next;
  }
  return undefined;
}

/** No step goes further than a turn within the flight, or half the spin: beyond that the derivatives say nothing. */
function limited({ duration }: Turn, at: Attempt, move: Vec3 | undefined): Vec3 | undefined {
  if (!move) return undefined;
  const most = Math.max((2 * Math.PI) / duration, length(at.spin) / 2);
  const size = length(move);
  return size > most ? scale(move, most / size) : move;
}
