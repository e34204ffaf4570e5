import { normalize, type Quat, rotate } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { addScaled, type Vec3 } from "../math/vec3.js";
import { checkLaunch, type Launch } from "./launch.js";
import { rotation } from "./rotation.js";
import { rotationBounds } from "./rotation-bounds.js";

/**
 * The motion of a free rigid body in uniform gravity, without air: continuous functions of the time t in s, 0 to
 * `duration`. Each throws a RangeError for a time outside (by more than rounding, 1e-9 s).
 */
export interface Flight {
  readonly launch: Launch;
  /** s */
  readonly duration: number;
  /** About the centre of mass, world frame, constant, kg m²/s. */
  readonly angularMomentum: Vec3;
  /** Of the rotation, constant, J. */
  readonly energy: number;
  /** World frame, m. */
  centerOfMass(t: number): Vec3;
  /** Of the centre of mass, world frame, m/s. */
  velocity(t: number): Vec3;
  /** Turns the principal frame onto the world, unit length. */
  orientation(t: number): Quat;
  /** The same, written to `out` from `offset` on, for inner loops: allocates nothing. */
  orientationInto(t: number, out: Float64Array, offset?: number): void;
  /** Angular velocity in the principal frame, rad/s. */
  spin(t: number): Vec3;
  /** Angular velocity in the world frame, rad/s. */
  angularVelocity(t: number): Vec3;
  /** Never exceeded by |ω| at any time, rad/s: the least bound that energy and angular momentum allow. */
  readonly greatestRate: number;
  /** Never exceeded by |dω/dt| in the world frame, rad/s²; likewise. */
  readonly greatestAngularAcceleration: number;
}

/** Radians a flight may turn, about 32,000 turns: beyond that a float32 animation says nothing and memory runs out. */
export const MOST_TURNING = 2e5;

/** Times this far outside a flight, s, count as its ends. */
const SLACK = 1e-9;

/**
 * The flight that follows from `launch`: the centre of mass on its parabola, the body turning freely about it
 * (`rotation.ts` says how). Throws a RangeError for a launch that no body can have, a RequestError for more than 200,000 rad
 * of turning.
 */
export function fly(launch: Launch): Flight {
  checkLaunch(launch);
  const { centerOfMass, velocity, gravity, duration } = launch;
  const bounds = rotationBounds(launch.spin, launch.moments);
  if (!(bounds.rate * duration <= MOST_TURNING))
    throw new RequestError(
      ["spin"],
      `turning at ${bounds.rate} rad/s for ${duration} s is too much for a clip`,
      `at most ${MOST_TURNING} rad in all`,
    );
  const turning = rotation(normalize(launch.orientation), launch.spin, launch.moments, duration, bounds.rate);
  const scratch = new Float64Array(4);

  const within = (t: number): number => {
    if (!(t >= -SLACK && t <= duration + SLACK))
      throw new RangeError(`time ${t} s is outside the flight, which lasts from 0 to ${duration} s`);
    return Math.min(duration, Math.max(0, t));
  };
  const orientation = (t: number): Quat => {
    turning.orientationInto(within(t), scratch, 0);
    return [scratch[0], scratch[1], scratch[2], scratch[3]];
  };
  const spin = (t: number): Vec3 => {
    turning.spinInto(within(t), scratch, 0);
    return [scratch[0], scratch[1], scratch[2]];
  };

  return {
    launch,
    duration,
    angularMomentum: turning.angularMomentum,
    energy: turning.energy,
    centerOfMass(time) {
      const t = within(time);
      const half = 0.5 * t * t;
      // One vector, as clips ask for many.
      return [
        centerOfMass[0] + t * velocity[0] + half * gravity[0],
        centerOfMass[1] + t * velocity[1] + half * gravity[1],
        centerOfMass[2] + t * velocity[2] + half * gravity[2],
      ];
    },
    velocity: (t) => addScaled(velocity, gravity, within(t)),
    orientation,
    orientationInto: (t, out, offset = 0) => turning.orientationInto(within(t), out, offset),
    spin,
    angularVelocity: (t) => rotate(orientation(t), spin(t)),
    greatestRate: bounds.rate,
    greatestAngularAcceleration: bounds.angularAcceleration,
  };
}
