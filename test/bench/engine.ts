/** A general rigid-body engine (Rapier, in WebAssembly) stepping a thrown prop, and recorded as a game would record it. */

import RAPIER from "@dimforge/rapier3d-compat";
import type { Body } from "../../src/clip/linear.js";
import type { Launch } from "../../src/flight/launch.js";
import { conjugate, multiply, type Quat, rotate } from "../../src/math/quat.js";
import { subtract, type Vec3 } from "../../src/math/vec3.js";

const STEPS_PER_SECOND = 240;

/** The node's pose at each recorded frame. */
export interface Recording {
  times: Float32Array<ArrayBuffer>;
  translations: Float32Array<ArrayBuffer>;
  rotations: Float32Array<ArrayBuffer>;
}

export class Engine {
  private constructor(private readonly world: RAPIER.World) {}

  static async load(): Promise<Engine> {
    await RAPIER.init();
    const world = new RAPIER.World({ x: 0, y: 0, z: 0 });
    world.timestep = 1 / STEPS_PER_SECOND;
    return new Engine(world);
  }

  /** Steps the flight and keeps a pose `perSecond` times a second (a divisor of 240), to the first frame at or past its end. */
  record(launch: Launch, body: Body, perSecond: number): Recording {
    const count = Math.ceil(launch.duration * perSecond - 1e-6) + 1;
    const recording = {
      times: new Float32Array(count),
      translations: new Float32Array(3 * count),
      rotations: new Float32Array(4 * count),
    };
    const thrown = this.throw(launch, body);
    for (let i = 0; i < count; i++) {
      const { x, y, z } = thrown.translation();
      const turn = thrown.rotation();
      recording.times[i] = i / perSecond;
      recording.translations.set([x, y, z], 3 * i);
      recording.rotations.set([turn.x, turn.y, turn.z, turn.w], 4 * i);
      for (let k = 0; k < STEPS_PER_SECOND / perSecond; k++) this.world.step();
    }
    this.world.removeRigidBody(thrown);
    return recording;
  }

  private throw({ centerOfMass, velocity, gravity, orientation, spin, moments }: Launch, body: Body) {
    const turn = multiply(orientation, conjugate(body.axes));
    const place = subtract(centerOfMass, rotate(turn, body.centerOfMass));
    this.world.gravity = vector(gravity);
    return this.world.createRigidBody(
      RAPIER.RigidBodyDesc.dynamic()
        .setTranslation(...place)
        .setRotation(quaternion(turn))
        .setLinvel(...velocity)
        .setAngvel(vector(rotate(orientation, spin)))
        .setAdditionalMassProperties(1, vector(body.centerOfMass), vector(moments), quaternion(body.axes))
        .setCanSleep(false),
    );
  }
}

const vector = ([x, y, z]: Vec3) => ({ x, y, z });
const quaternion = ([x, y, z, w]: Quat) => ({ x, y, z, w });
