/** How the prop turns: its angular momentum, its angular velocity, and its principal axes, as arrows at the centre of mass. */

import {
  type BufferGeometry,
  ConeGeometry,
  CylinderGeometry,
  Group,
  Mesh,
  MeshBasicMaterial,
  type Sprite,
  Vector3,
} from "three";
import { mergeGeometries } from "three/examples/jsm/utils/BufferGeometryUtils.js";
import type { Vec3 } from "../../../math/vec3.js";
import type { CameraRig } from "./camera-rig.js";
import type { Labels } from "./labels.js";
import type { Palette } from "./palette.js";

/** World frame; lengths are looked at for zero alone, but the angular velocity's, which is a part of `greatestRate`. */
export interface Turning {
  momentum: Vec3;
  angularVelocity: Vec3;
  greatestRate: number;
  /** Unit vectors: long, middle, short. */
  axes: readonly [Vec3, Vec3, Vec3];
}

/** px that the longest arrow is long at least. */
const LEAST = 64;

type ArrowName = "momentum" | "spin" | "long" | "middle" | "short";

interface Arrow {
  group: Group;
  label: Sprite;
}

export class Arrows {
  readonly group = new Group();
  readonly #arrows: Record<ArrowName, Arrow>;
  readonly #labels: Labels;
  #turning?: Turning;
  #reach = 1;

  constructor(labels: Labels, colors: Palette) {
    this.#labels = labels;
    this.#arrows = {
      momentum: this.#arrow("angular momentum", colors.momentum, 2.6),
      spin: this.#arrow("spin axis", colors.spin, 1.8),
      long: this.#arrow("long", colors.long, 1.3),
      middle: this.#arrow("middle", colors.middle, 1.3, 5),
      short: this.#arrow("short", colors.short, 1.3, 13),
    };
  }

  set(place: Vector3, reach: number, turning: Turning): void {
    this.group.position.copy(place);
    this.#reach = reach;
    this.#turning = turning;
  }

  /** Before each picture: small props have arrows that can be seen. */
  fit(rig: CameraRig): void {
    if (!this.#turning) return;
    const { momentum, angularVelocity, greatestRate, axes } = this.#turning;
    const metres = rig.metresPerPixel(this.group.position);
    const length = Math.max(1.7 * this.#reach, LEAST * metres);
    const rate = Math.hypot(...angularVelocity) / (greatestRate || 1);
    this.#lay("momentum", momentum, length, metres);
    this.#lay("spin", angularVelocity, length * 0.85 * rate, metres);
    this.#lay("long", axes[0], length * 0.72, metres);
    this.#lay("middle", axes[1], length * 0.72, metres);
    this.#lay("short", axes[2], length * 0.72, metres);
  }

  dispose(): void {
    this.#labels.remove(Object.values(this.#arrows).map(({ label }) => label));
    this.group.removeFromParent();
    this.group.traverse((object) => {
      const mesh = object as Mesh;
      if (!mesh.isMesh) return;
      mesh.geometry.dispose();
      (mesh.material as MeshBasicMaterial).dispose();
    });
  }

  #lay(name: ArrowName, direction: Vec3, length: number, metres: number): void {
    const { group, label } = this.#arrows[name];
    const way = new Vector3(...direction);
    group.visible = way.length() > 1e-9 && length > 10 * metres;
    label.visible = group.visible;
    if (!group.visible) return;
    way.normalize();
    group.quaternion.setFromUnitVectors(new Vector3(0, 1, 0), way);
    const [shaft, head] = group.children;
    const tip = Math.min(9 * metres, length / 2);
    shaft.scale.set(metres, length - tip, metres);
    head.scale.set(metres, tip, metres);
    head.position.y = length - tip;
    label.position.copy(way).multiplyScalar(length + 10 * metres);
  }

  /** A shaft in so many pieces and a head, of unit length along +Y and in pixels across. */
  #arrow(text: string, color: string, width: number, pieces = 1): Arrow {
    const material = () => new MeshBasicMaterial({ color, depthTest: false, transparent: true });
    const shaft = new Mesh(shaftOf(width, pieces), material());
    const head = new Mesh(new ConeGeometry(width * 1.4 + 1.6, 1, 12).translate(0, 0.5, 0), material());
    for (const mesh of [shaft, head]) mesh.renderOrder = 12;
    const group = new Group();
    group.add(shaft, head);
    this.group.add(group);
    return { group, label: this.#labels.add(this.group, text, color, new Vector3()) };
  }
}

function shaftOf(width: number, pieces: number): BufferGeometry {
  const part = 1 / (2 * pieces - 1);
  const cylinders = Array.from({ length: pieces }, (_, i) =>
    new CylinderGeometry(width / 2, width / 2, part, 6).translate(0, (2 * i + 0.5) * part, 0),
  );
  const shaft = mergeGeometries(cylinders);
  for (const cylinder of cylinders) cylinder.dispose();
  return shaft;
}
