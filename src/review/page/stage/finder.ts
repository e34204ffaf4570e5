/** A ring round a prop that is too small in the picture to be found and taken hold of. */

import { Group, type Vector3 } from "three";
import type { CameraRig } from "./camera-rig.js";
import { discard, strokes } from "./strokes.js";

/** px */
const RADIUS = 14;
const SMALL = 8;
const SIDES = 40;

export class Finder {
  readonly group = new Group();

  set color(color: string) {
    for (const child of [...this.group.children]) discard(child);
    const points = Array.from({ length: SIDES }, (_, i) =>
      [i, i + 1].flatMap((k) => {
        const angle = (2 * Math.PI * k) / SIDES;
        return [RADIUS * Math.cos(angle), RADIUS * Math.sin(angle), 0];
      }),
    );
    this.group.add(strokes(points.flat(), { color, width: 1.5, through: true }));
  }

  /** Before each picture. */
  fit(rig: CameraRig, place: Vector3, reach: number): void {
    const metres = rig.metresPerPixel(place);
    this.group.visible = reach < SMALL * metres;
    this.group.position.copy(place);
    this.group.quaternion.copy(rig.camera.quaternion);
    this.group.scale.setScalar(metres);
  }

  dispose(): void {
    discard(this.group);
  }
}
