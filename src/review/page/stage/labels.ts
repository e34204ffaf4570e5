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
}

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
    { anchor = [0.5, 0.5] }: LabelPlace = {},
  ): Sprite {
    const { texture, width, height } = this.#texture(text, color);
    const sprite = new Sprite(
      new SpriteMaterial({ map: texture, depthTest: false, depthWrite: false, transparent: true }),
    );
    sprite.center.set(...anchor);
    sprite.position.copy(at);
    sprite.renderOrder = 20;
    sprite.userData = { width, height };
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

  /** Before each picture. */
  fit(rig: CameraRig): void {
    const place = new Vector3();
    for (const sprite of this.#sprites) {
      const metres = rig.metresPerPixel(sprite.getWorldPosition(place));
      sprite.scale.set(sprite.userData.width * metres, sprite.userData.height * metres, 1);
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
    const context = canvas.getContext("2d")!;
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
