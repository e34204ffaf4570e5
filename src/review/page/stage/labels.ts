/** Short texts in the scene, of the same size wherever they are. */

import {
  CanvasTexture,
  LinearFilter,
  type Object3D,
  Sprite,
  SpriteMaterial,
  SRGBColorSpace,
  Vector3,
} from "three";
import type { CameraRig } from "./camera-rig.js";

/** px */
const SIZE = 13;
const MARGIN = 3;

export interface LabelPlace {
  /** Which of the text's points lies at the place: 0 to 1 from the left, and from below. */
  anchor?: readonly [number, number];
  /** Stays where it is, whatever lies there too. */
  isFixed?: boolean;
}

type LabelData = Required<LabelPlace> & { width: number; height: number };

interface Box {
  left: number;
  top: number;
  width: number;
  height: number;
}

/** Lines by which a text may give way, upwards where negative. */
const STEPS = [0, 0.9, -0.9, 1.8, -1.8, 2.7, -2.7, 3.6];

/** What is written below or above its place gives way to that side alone, off the place. */
const stepsOf = (up: number): number[] =>
  STEPS.filter((step) => (up > 1 ? step >= 0 : up < 0 ? step <= 0 : true));

export class Labels {
  readonly #made = new Map<string, { texture: CanvasTexture; width: number; height: number }>();
  readonly #sprites = new Set<Sprite>();
  /** Behind the text, so that it can be read over anything. */
  halo = "#ffffff";

  add(
    to: Object3D,
    text: string,
    color: string,
    at: Vector3,
    { anchor = [0.5, 0.5], isFixed = false }: LabelPlace = {},
  ): Sprite {
    const { texture, width, height } = this.#texture(text, color);
    const sprite = new Sprite(
      new SpriteMaterial({ map: texture, depthTest: false, depthWrite: false, transparent: true }),
    );
    sprite.center.set(...anchor);
    sprite.position.copy(at);
    sprite.renderOrder = 20;
    sprite.userData = { width, height, anchor, isFixed } satisfies LabelData;
    this.#sprites.add(sprite);
    to.add(sprite);
    return sprite;
  }

  remove(sprites: Iterable<Sprite>): void {
    for (const sprite of sprites) {
      sprite.removeFromParent();
      sprite.material.dispose();
      this.#sprites.delete(sprite);
    }
  }

  /** Before each picture: sizes them, keeps those in the picture that name something in it, and moves those up or down that would lie on others. */
  fit(rig: CameraRig): void {
    const place = new Vector3();
    const taken: Box[] = [];
    const isFixed = (sprite: Sprite) => (sprite.userData as LabelData).isFixed;
    const all = [...this.#sprites];
    for (const sprite of [...all.filter(isFixed), ...all.filter((each) => !isFixed(each))]) {
      const { width, height, anchor } = sprite.userData as LabelData;
      const metres = rig.metresPerPixel(sprite.getWorldPosition(place));
      sprite.scale.set(width * metres, height * metres, 1);
      if (!isShown(sprite)) continue;
      const { x, y } = rig.project(place);
      const left = x < 0 || x > rig.width ? x - anchor[0] * width : within(x - anchor[0] * width, width, rig);
      const boxAt = (lines: number): Box => ({
        left,
        top: y - (1 - anchor[1] - lines) * height,
        width,
        height,
      });
      const isFree = (step: number) => !taken.some((box) => overlap(box, boxAt(step)));
      const lines = isFixed(sprite) ? 0 : (stepsOf(anchor[1]).find(isFree) ?? 0);
      sprite.center.set((x - left) / width, anchor[1] + lines);
      taken.push(boxAt(lines));
    }
  }

  /** Of texts that nothing shows any more. */
  forget(): void {
    const used = new Set(Array.from(this.#sprites, ({ material }) => material.map));
    for (const [key, { texture }] of this.#made)
      if (!used.has(texture)) {
        texture.dispose();
        this.#made.delete(key);
      }
  }

  dispose(): void {
    this.remove([...this.#sprites]);
    this.forget();
  }

  #texture(text: string, color: string) {
    const key = `${color} ${this.halo} ${text}`;
    const known = this.#made.get(key);
    if (known) return known;
    const ratio = Math.max(2, Math.min(3, devicePixelRatio));
    const canvas = document.createElement("canvas");
    // kept in plain memory, as it is copied into a texture once
    const context = canvas.getContext("2d", { willReadFrequently: true })!;
    const font = `${SIZE}px system-ui, sans-serif`;
    context.font = font;
    const width = Math.ceil(context.measureText(text).width) + 2 * MARGIN;
    const height = SIZE + 2 * MARGIN + 2;
    canvas.width = width * ratio;
    canvas.height = height * ratio;
    context.scale(ratio, ratio);
    context.font = font;
    context.textBaseline = "middle";
    context.lineJoin = "round";
    context.lineWidth = 3;
    context.strokeStyle = this.halo;
    context.strokeText(text, MARGIN, height / 2);
    context.fillStyle = color;
    context.fillText(text, MARGIN, height / 2);
    const texture = new CanvasTexture(canvas);
    texture.colorSpace = SRGBColorSpace;
    texture.generateMipmaps = false;
    texture.minFilter = LinearFilter;
    const made = { texture, width, height };
    this.#made.set(key, made);
    return made;
  }
}

const within = (left: number, width: number, rig: CameraRig): number =>
  Math.max(0, Math.min(rig.width - width, left));

/** Within a scene, and with all that it is part of. */
function isShown(sprite: Sprite): boolean {
  let object: Object3D = sprite;
  for (; object.parent; object = object.parent) if (!object.visible) return false;
  return "isScene" in object;
}

const overlap = (a: Box, b: Box): boolean =>
  a.left < b.left + b.width &&
  b.left < a.left + a.width &&
  a.top + 3 < b.top + b.height &&
  b.top + 3 < a.top + a.height;
