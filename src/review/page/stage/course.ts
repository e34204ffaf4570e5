/** The course of one take through its clip: as played, and as it truly is. */

import { Matrix4, Vector3 } from "three";
import { type Motion, motionOf } from "../../../bake/take-motion.js";
import { type Flight, fly } from "../../../flight/flight.js";
import { multiply, rotate } from "../../../math/quat.js";
import type { Vec3 } from "../../../math/vec3.js";
import type { Turning } from "./arrows.js";
import { type ClipPoses, matrixOf, type Pose } from "./clip-poses.js";
import type { StageProp, StageTake } from "./input.js";

export class Course {
  readonly duration: number;
  /** Flown when they are first looked at: most takes only are among the pale ones. */
  #motion?: Motion;
  #flown?: { start: number; flight: Flight }[];
  readonly #stays?: Vec3;

  /** @param staysAt where the clip keeps the centre of mass, as it turns alone: the true motion is seen as it turns there, too */
  constructor(
    readonly take: StageTake,
    readonly prop: StageProp,
    readonly played: ClipPoses,
    staysAt?: Vec3,
  ) {
    this.duration = take.motion.duration;
    this.#stays = staysAt;
  }

  /** The clip turns the prop where it stands. */
  get turnsAlone(): boolean {
    return this.#stays !== undefined;
  }

  truth(t: number): Pose {
    this.#motion ??= motionOf(this.take.motion, this.prop.axes);
    const time = Math.max(0, Math.min(this.duration, t));
    return {
      centerOfMass: this.#stays ?? this.#motion.centerOfMass(time),
      rotation: this.#motion.rotation(time),
    };
  }

  /** Where the clip has a point of the model, as modelled, in m. */
  place(t: number, point: Vec3): Vector3 {
    return new Vector3(...point).applyMatrix4(this.played(t, new Matrix4()));
  }

  /** x y z at even times, of a point of the model. */
  way(point: Vec3, samples: number): Float64Array {
    const way = new Float64Array(3 * samples);
    for (let i = 0; i < samples; i++)
      this.place((this.duration * i) / (samples - 1), point).toArray(way, 3 * i);
    return way;
  }

  /** Greatest distance of the points, m about the centre of mass, between clip and truth, mm. */
  difference(t: number, points: readonly Vec3[]): number {
    const { centerOfMass: c } = this.prop;
    const clip = this.played(t, new Matrix4());
    const truth = matrixOf(this.truth(t), c);
    let greatest = 0;
    for (const [x, y, z] of points) {
      const point = new Vector3(x + c[0], y + c[1], z + c[2]);
      greatest = Math.max(greatest, point.clone().applyMatrix4(clip).distanceTo(point.applyMatrix4(truth)));
    }
    return 1000 * greatest;
  }

  /** How the prop truly turns; none while it stands still. */
  turning(t: number): Turning {
    const { axes } = this.prop;
    const { rotation } = this.truth(t);
    const principal = multiply(rotation, axes);
    const directions = [
      rotate(principal, [1, 0, 0]),
      rotate(principal, [0, 1, 0]),
      rotate(principal, [0, 0, 1]),
    ];
    const part = this.#flights().find(({ start, flight }) => t >= start && t <= start + flight.duration);
    return {
      momentum: part?.flight.angularMomentum ?? [0, 0, 0],
      angularVelocity: part?.flight.angularVelocity(Math.max(0, t - part.start)) ?? [0, 0, 0],
      greatestRate: part?.flight.greatestRate ?? 0,
      axes: directions as [Vec3, Vec3, Vec3],
    };
  }

  /** Whole turns or more, so that ways of points are drawn finely enough. */
  get turns(): number {
    return this.#flights().reduce(
      (sum, { flight }) => sum + (flight.greatestRate * flight.duration) / 6.28,
      0,
    );
  }

  #flights() {
    this.#flown ??= this.take.motion.parts.map(({ start, launch }) => ({ start, flight: fly(launch) }));
    return this.#flown;
  }
}
