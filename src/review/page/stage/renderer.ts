/** Draws the stage: what lies behind first, and nothing of it before what is looked at. */

import {
  DataTexture,
  DirectionalLight,
  EquirectangularReflectionMapping,
  HemisphereLight,
  type Object3D,
  Scene,
  SRGBColorSpace,
  Vector2,
  Vector3,
  WebGLRenderer,
} from "three";
import type { LineMaterial } from "three/examples/jsm/lines/LineMaterial.js";
import type { CameraRig } from "./camera-rig.js";

/** Above two pixels a pixel nobody sees a difference. */
const MOST_RATIO = 2;

export class StageRenderer {
  readonly behind = new Scene();
  readonly front = new Scene();
  readonly #renderer: WebGLRenderer;
  readonly #surroundings = studio();
  readonly #lights: Object3D[] = [];

  constructor(canvas: HTMLCanvasElement) {
    this.#renderer = new WebGLRenderer({ canvas, antialias: true, powerPreference: "high-performance" });
    this.#renderer.autoClear = false;
    // metal shows what is round it
    this.front.environment = this.#surroundings;
    for (const scene of [this.behind, this.front]) {
      const sun = new DirectionalLight("#ffffff", 2);
      const sky = new HemisphereLight("#ffffff", "#b8ac98", scene === this.front ? 0.6 : 2);
      scene.add(sun, sun.target, sky);
      this.#lights.push(sun);
    }
  }

  set ground(color: string) {
    this.#renderer.setClearColor(color);
  }

  resize(width: number, height: number): void {
    this.#renderer.setPixelRatio(Math.min(MOST_RATIO, devicePixelRatio));
    this.#renderer.setSize(width, height, false);
  }

  draw(rig: CameraRig): void {
    const { camera } = rig;
    // the light comes from over the viewer's shoulder in every view
    const from = rig.back.add(rig.up.multiplyScalar(0.9)).add(rig.right.multiplyScalar(-0.6));
    for (const light of this.#lights) light.position.copy(new Vector3().addScaledVector(from, 10));
    const size = this.#renderer.getSize(new Vector2());
    for (const scene of [this.behind, this.front])
      scene.traverseVisible((object) => {
        const { material } = object as unknown as { material?: LineMaterial };
        if (material?.isLineMaterial) material.resolution.copy(size);
      });
    this.#renderer.clear();
    this.#renderer.render(this.behind, camera);
    this.#renderer.clearDepth();
    this.#renderer.render(this.front, camera);
  }

  /** What the graphics memory holds, for tests. */
  get memory() {
    return { ...this.#renderer.info.memory };
  }

  dispose(): void {
    this.#surroundings.dispose();
    this.#renderer.dispose();
  }
}

/** A bright room with a darker floor, as a small picture of all directions. */
function studio(): DataTexture {
  const [width, height] = [64, 32];
  const pixels = new Uint8Array(4 * width * height);
  for (let y = 0; y < height; y++)
    for (let x = 0; x < width; x++) {
      const up = y / (height - 1);
      const window =
        Math.max(0, Math.cos(((x / width) * 2 - 0.5) * Math.PI)) ** 8 * (up > 0.55 && up < 0.85 ? 90 : 0);
      const value = Math.min(255, 90 + 110 * up + window);
      pixels.set([value, value * 0.985, value * 0.96, 255], 4 * (y * width + x));
    }
  const texture = new DataTexture(pixels, width, height);
  texture.mapping = EquirectangularReflectionMapping;
  texture.colorSpace = SRGBColorSpace;
  texture.needsUpdate = true;
  return texture;
}
