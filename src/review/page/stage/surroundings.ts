/** What a take was asked to keep to: marks, floor, heights and boxes. */

import {
  BoxGeometry,
  DoubleSide,
  EdgesGeometry,
  Group,
  Mesh,
  MeshBasicMaterial,
  Quaternion,
  Vector3,
} from "three";
import type { FlownPart, Mark } from "../../../bake/take-motion.js";
import type { Labels } from "./labels.js";
import type { Palette } from "./palette.js";
import { discard, strokes } from "./strokes.js";

/** Level room in which heights are drawn, m. */
export interface Room {
  low: Vector3;
  high: Vector3;
}

export class Surroundings {
  readonly group = new Group();
  readonly #labels: Labels;
  readonly #colors: Palette;
  readonly #sprites: ReturnType<Labels["add"]>[] = [];
  /** Crosses are of one size in the picture. */
  readonly #crosses: Group[] = [];

  constructor(parts: readonly FlownPart[], room: Room, labels: Labels, colors: Palette) {
    this.#labels = labels;
    this.#colors = colors;
    parts.forEach((part, i) => {
      this.#mark(part.release, i === 0 ? "leaves here" : "");
      this.#mark(part.arrival, i === parts.length - 1 ? "arrives here" : "passed on here");
    });
    const once = (pick: (part: FlownPart) => number | undefined) => [
      ...new Set(parts.flatMap((part) => pick(part) ?? [])),
    ];
    for (const height of once(({ floor }) => floor)) this.#level(height, room, "floor");
    for (const height of once(({ minHeight }) => minHeight)) this.#level(height, room, "not below");
    for (const height of once(({ maxHeight }) => maxHeight)) this.#level(height, room, "not above");
    const boxes = new Map(parts.flatMap(({ boxes }) => boxes.map((box) => [JSON.stringify(box), box])));
    for (const box of boxes.values()) this.#box(box);
  }

  /** @param metresPerPixel at a place */
  fit(metresPerPixel: (place: Vector3) => number): void {
    for (const cross of this.#crosses) cross.scale.setScalar(metresPerPixel(cross.position));
  }

  dispose(): void {
    this.#labels.remove(this.#sprites);
    discard(this.group);
  }

  #say(text: string, at: Vector3, anchor: readonly [number, number], color: string): void {
    this.#sprites.push(this.#labels.add(this.group, text, color, at, { anchor }));
  }

  #mark({ asked, point }: Mark, what: string): void {
    if (!asked) return;
    const at = new Vector3(...asked);
    const arm = 9;
    const cross = new Group();
    const axes = [0, 1, 2].flatMap((axis) =>
      [-arm, arm].flatMap((end) => [0, 1, 2].map((i) => (i === axis ? end : 0))),
    );
    cross.add(strokes(axes, { color: this.#colors.mark, width: 2, through: true }));
    cross.position.copy(at);
    this.#crosses.push(cross);
    this.group.add(cross);
    const whose = point === "centerOfMass" ? "" : `${point} `;
    if (what) this.#say(`${whose}${what}`, at, [0.5, 1.6], this.#colors.mark);
  }

  #level(height: number, { low, high }: Room, what: string): void {
    const corners = [
      [low.x, low.z],
      [high.x, low.z],
      [high.x, high.z],
      [low.x, high.z],
    ];
    const lines = corners.flatMap(([x, z], i) => {
      const [nextX, nextZ] = corners[(i + 1) % 4];
      return [x, height, z, nextX, height, nextZ];
    });
    const color = this.#colors.limit;
    const size = Math.max(high.x - low.x, high.z - low.z);
    const dash: [number, number] | undefined = what === "floor" ? undefined : [size / 40, size / 60];
    this.group.add(strokes(lines, { color, width: 2, dash }));
    const text = `${what} ${Number(height.toFixed(3))} m`;
    const at = new Vector3(low.x + 0.75 * (high.x - low.x), height, low.z + 0.75 * (high.z - low.z));
    this.#say(text, at, [0.5, what === "not above" ? -0.2 : 1.2], color);
  }

  #box({ center, half, rotation }: FlownPart["boxes"][number]): void {
    const color = this.#colors.limit;
    const solid = new BoxGeometry(...(half.map((value) => 2 * value) as [number, number, number]));
    const fill = new Mesh(
      solid,
      new MeshBasicMaterial({ color, transparent: true, opacity: 0.14, depthWrite: false, side: DoubleSide }),
    );
    const edges = new EdgesGeometry(solid);
    const box = new Group();
    box.add(fill, strokes(edges.getAttribute("position").array, { color, width: 1.5 }));
    edges.dispose();
    box.position.set(...(center as [number, number, number]));
    box.quaternion.copy(new Quaternion(...rotation));
    this.group.add(box);
    this.#say("keep out", new Vector3(center[0], center[1] + half[1], center[2]), [0.5, -0.2], color);
  }
}
