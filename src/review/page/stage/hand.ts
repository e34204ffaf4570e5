/** What mouse, pen and fingers do on the stage: on the prop they scrub, elsewhere they move the camera. */

import type { CameraRig } from "./camera-rig.js";
import type { GestureTarget } from "./gestures.js";
import type { Scrubbing } from "./scrubbing.js";
import type { ShownThrow } from "./shown-throw.js";
import type { TakeScene } from "./take-scene.js";

/** What is under the hand. */
export interface Held {
  rig: CameraRig;
  scrubbing: Scrubbing;
  /** The scene of the moment; none: nothing can be dragged. */
  now(): { scene: TakeScene; shown: ShownThrow; time: number } | undefined;
  scrub(t: number): void;
  dropped(): void;
  /** The camera was moved. */
  moved(): void;
}

/** Radians that the camera turns for a px. */
const TURN = 0.008;

export function hand({ rig, scrubbing, now, scrub, dropped, moved }: Held): GestureTarget {
  return {
    holds(x, y, coarse) {
      const held = now();
      return held !== undefined && scrubbing.holds(x, y, coarse, held.scene, held.shown);
    },
    grab(x, y) {
      const { scene, shown, time } = now()!;
      scrub(scrubbing.grab(x, y, scene, shown, time));
    },
    drag(x, y) {
      const held = now();
      if (held) scrub(scrubbing.drag(x, y, held.scene, held.time));
    },
    drop() {
      scrubbing.drop();
      dropped();
    },
    turn(right, down) {
      if (rig.isFlat) rig.pan(right, down);
      else rig.turn(-right * TURN, down * TURN);
      moved();
    },
    pan(right, down) {
      rig.pan(right, down);
      moved();
    },
    zoom(factor, x, y) {
      rig.zoom(factor, x, y);
      moved();
    },
  };
}
