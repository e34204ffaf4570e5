/** Draws the stage: what lies behind first, and nothing of it before what is looked at. */

import {
  type BufferGeometry,
  Color,
  DirectionalLight,
  HemisphereLight,
  type Mesh,
  type Object3D,
  Scene,
  type ShaderMaterial,
  Vector2,
  Vector3,
  WebGLRenderer,
} from "three";
import type { CameraRig } from "./camera-rig.js";

/** Above two pixels a pixel nobody sees a difference. */
const MOST_RATIO = 2;

export class StageRenderer {
  readonly behind = new Scene();
  readonly front = new Scene();
  readonly #renderer: WebGLRenderer;
  readonly #lights: Object3D[] = [];

  constructor(canvas: HTMLCanvasElement) {
    this.#renderer = new WebGLRenderer({ canvas, antialias: true, powerPreference: "high-performance" });
    // the coloured background clears all the same
    this.#renderer.autoClear = false;
    for (const scene of [this.behind, this.front]) {
      const sun = new DirectionalLight("#ffffff", 2);
      const sky = new HemisphereLight("#ffffff", "#b8ac98", 2);
      scene.add(sun, sun.target, sky);
      this.#lights.push(sun);
    }
  }

  set ground(color: string) {
    this.behind.background = new Color(color);
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
        // of lines and outlines, whose width is in pixels
        (object as Partial<Mesh<BufferGeometry, ShaderMaterial>>).material?.uniforms?.resolution?.value.copy(
          size,
        );
      });
    this.#renderer.render(this.behind, camera);
    this.#renderer.clearDepth();
    this.#renderer.render(this.front, camera);
  }

  /** What the graphics memory holds, for tests. */
  get memory() {
    return { ...this.#renderer.info.memory };
  }

  dispose(): void {
    this.#renderer.dispose();
  }
}
