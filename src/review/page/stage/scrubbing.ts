/** Dragging the prop along its arc. */

import { Mesh, MeshBasicMaterial, Raycaster, Vector2, Vector3 } from "three";
import { ArcOnScreen } from "./arc-on-screen.js";
import type { CameraRig } from "./camera-rig.js";
import { matrixOf } from "./clip-poses.js";
import type { ShownThrow } from "./shown-throw.js";
import type { TakeScene } from "./take-scene.js";

const SAMPLES = 240;
/** px from the centre of mass and from its way in which a mouse or a finger takes hold. */
const NEAR_PROP = { fine: 18, coarse: 32 };
const NEAR_WAY = { fine: 8, coarse: 20 };

export class Scrubbing {
  readonly #rig: CameraRig;
  #held?: { x: number; y: number; dx: number; dy: number };

  constructor(rig: CameraRig) {
    this.#rig = rig;
  }

  /** Whether the prop or its way is there. */
  holds(x: number, y: number, coarse: boolean, scene: TakeScene, shown: ShownThrow): boolean {
    if (scene.course.duration === 0) return false;
    const kind = coarse ? "coarse" : "fine";
    if (this.#onProp(x, y, scene, shown) || this.#fromProp(x, y, scene) < NEAR_PROP[kind]) return true;
    const arc = this.#arc(scene);
    return arc.isWay && arc.nearest({ x, y }).distance < NEAR_WAY[kind];
  }

  /** Answers the time that the hold alone means: that of the way's nearest place where it is not the prop that is held. */
  grab(x: number, y: number, scene: TakeScene, shown: ShownThrow, time: number): number {
    const isOnProp = this.#onProp(x, y, scene, shown) || this.#fromProp(x, y, scene) < NEAR_PROP.fine;
    const arc = this.#arc(scene);
    const at = isOnProp || !arc.isWay ? time : arc.nearest({ x, y }).time;
    const place = this.#rig.project(scene.place(at));
    this.#held = { x, y, dx: x - place.x, dy: y - place.y };
    return at;
  }

  drag(x: number, y: number, scene: TakeScene, time: number): number {
    const held = this.#held!;
    const moved = Math.hypot(x - held.x, y - held.y);
    const right = x - held.x;
    [held.x, held.y] = [x, y];
    const arc = this.#arc(scene);
    const { duration } = scene.course;
    if (!arc.isWay) return Math.max(0, Math.min(duration, time + (right / this.#rig.width) * 2 * duration));
    return arc.follow({ x: x - held.dx, y: y - held.dy }, time, moved);
  }

  drop(): void {
    this.#held = undefined;
  }

  #arc(scene: TakeScene): ArcOnScreen {
    const { duration } = scene.course;
    const points = Array.from({ length: SAMPLES + 1 }, (_, i) =>
      this.#rig.project(scene.place((duration * i) / SAMPLES)),
    );
    return new ArcOnScreen(points, duration);
  }

  #fromProp(x: number, y: number, scene: TakeScene): number {
    const place = this.#rig.project(new Vector3(...scene.pose().centerOfMass));
    return Math.hypot(x - place.x, y - place.y);
  }

  #onProp(x: number, y: number, scene: TakeScene, shown: ShownThrow): boolean {
    const { width, height, camera } = this.#rig;
    const caster = new Raycaster();
    caster.setFromCamera(new Vector2((2 * x) / width - 1, 1 - (2 * y) / height), camera);
    const { centerOfMass } = shown.prop;
    const mesh = new Mesh(shown.body.geometry, PICKED);
    mesh.matrixWorld = matrixOf(scene.pose(), centerOfMass);
    mesh.matrixWorld.multiply(mesh.matrix.makeTranslation(...(centerOfMass as [number, number, number])));
    return caster.intersectObject(mesh, false).length > 0;
  }
}

const PICKED = new MeshBasicMaterial({ side: 2 });
