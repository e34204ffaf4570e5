/** Where the stage is looked at from. */

import { type Camera, Matrix4, OrthographicCamera, PerspectiveCamera, Quaternion, Vector3 } from "three";
import type { View } from "./layers.js";

/** What has to be in the picture. */
export interface Framing {
  /** World frame, m. */
  points: readonly Vector3[];
  /** What is seen with them where the ground is seen from above. */
  ground: readonly Vector3[];
  /** Room round each of them, m. */
  reach: number;
  /** Level direction of the flight, radians about +Y from +Z towards +X. */
  heading: number;
}

/** Degrees: a long lens, so that shapes are not bent. */
const FIELD = 24;
/** Of the picture's height or width: what the arc may fill. */
const FILL = 0.8;
const MOST_ZOOM = 200;

export class CameraRig {
  view: View = "side";
  readonly target = new Vector3();
  /** Height of the picture at the target, m. */
  span = 1;
  #azimuth = 0;
  #elevation = 0;
  #width = 1;
  #height = 1;
  #extent = 1;
  #fitted = 1;
  readonly #flat = new OrthographicCamera();
  readonly #lens = new PerspectiveCamera(FIELD);
  readonly #right = new Vector3();
  readonly #up = new Vector3();
  readonly #back = new Vector3();

  get camera(): OrthographicCamera | PerspectiveCamera {
    return this.isFlat ? this.#flat : this.#lens;
  }

  get isFlat(): boolean {
    return this.view === "side" || this.view === "top" || this.view === "along";
  }

  get right(): Vector3 {
    return this.#right.clone();
  }
  get up(): Vector3 {
    return this.#up.clone();
  }
  /** Towards the viewer. */
  get back(): Vector3 {
    return this.#back.clone();
  }
  get width(): number {
    return this.#width;
  }
  get height(): number {
    return this.#height;
  }

  /** m from the target on to the back of what is seen. */
  get depth(): number {
    return 1.5 * (this.#extent + this.span);
  }

  resize(width: number, height: number): void {
    this.#width = Math.max(1, width);
    this.#height = Math.max(1, height);
  }

  /** Puts the camera where the view has it at first. */
  frame(view: View, { points: places, ground, reach, heading }: Framing): void {
    const points = view === "free" ? [...places, ...ground] : places;
    this.view = view;
    // seen from the side the flight goes to the right: the picture's right is (sin heading, 0, cos heading)
    const side = heading - Math.PI / 2;
    [this.#azimuth, this.#elevation] = {
      side: [side, 0],
      top: [side, Math.PI / 2],
      along: [heading + Math.PI, 0],
      free: [side - 0.6, 0.35],
      follow: [side - 0.35, 0.2],
    }[view];
    this.#turnAxes();
    const box = [this.#right, this.#up, this.#back].map((axis) => range(points, axis, reach));
    const [x, y, z] = box;
    this.target.set(0, 0, 0);
    [this.#right, this.#up, this.#back].forEach((axis, i) => {
      this.target.addScaledVector(axis, (box[i].low + box[i].high) / 2);
    });
    this.#extent = Math.max(...box.map(({ low, high }) => high - low));
    this.span = Math.max(y.high - y.low, ((x.high - x.low) * this.#height) / this.#width) / FILL;
    if (view === "follow") this.span = (2 * reach) / 0.4;
    // what is nearer than the target looks larger
    if (view === "free") this.span += (z.high - z.low) * Math.tan((FIELD * Math.PI) / 360);
    this.#fitted = this.span;
    this.update();
  }

  turn(right: number, up: number): void {
    this.#azimuth += right;
    this.#elevation = Math.max(-1.5, Math.min(1.5, this.#elevation + up));
    this.update();
  }

  /** By pixels of the picture. */
  pan(right: number, down: number): void {
    const metres = this.span / this.#height;
    this.target.addScaledVector(this.#right, -right * metres).addScaledVector(this.#up, down * metres);
    this.update();
  }

  /** @param x of the place in the picture that stays where it is, px; default its middle */
  zoom(factor: number, x = this.#width / 2, y = this.#height / 2): void {
    const span = this.span / factor;
    const next = Math.max(this.#fitted / MOST_ZOOM, Math.min(this.#fitted * 6, span));
    const shift = (this.span - next) / this.#height;
    this.span = next;
    if (this.view !== "follow")
      this.target
        .addScaledVector(this.#right, (x - this.#width / 2) * shift)
        .addScaledVector(this.#up, (this.#height / 2 - y) * shift);
    this.update();
  }

  follow(place: Vector3): void {
    if (this.view !== "follow") return;
    this.target.copy(place);
    this.update();
  }

  update(): void {
    this.#turnAxes();
    const aspect = this.#width / this.#height;
    const deep = 4 * (this.#extent + this.span);
    const distance = this.isFlat ? deep / 2 : this.span / 2 / Math.tan((FIELD * Math.PI) / 360);
    const { camera } = this;
    if (camera instanceof OrthographicCamera) {
      camera.top = this.span / 2;
      camera.bottom = -camera.top;
      camera.right = camera.top * aspect;
      camera.left = -camera.right;
    } else camera.aspect = aspect;
    camera.near = this.isFlat ? 0 : distance / 50;
    camera.far = distance + deep;
    camera.position.copy(this.target).addScaledVector(this.#back, distance);
    camera.quaternion.copy(turned(this.#right, this.#up, this.#back));
    camera.updateProjectionMatrix();
    camera.updateMatrixWorld(true);
  }

  /** m that a pixel is wide at a place. */
  metresPerPixel(place: Vector3): number {
    if (this.isFlat) return this.span / this.#height;
    const depth = (this.camera as Camera).position.clone().sub(place).dot(this.#back);
    return (2 * Math.max(depth, 1e-6) * Math.tan((FIELD * Math.PI) / 360)) / this.#height;
  }

  /** Pixels from the picture's upper left corner. */
  project(place: Vector3): { x: number; y: number } {
    const { x, y } = place.clone().project(this.camera);
    return { x: ((x + 1) / 2) * this.#width, y: ((1 - y) / 2) * this.#height };
  }

  #turnAxes(): void {
    const [a, e] = [this.#azimuth, this.#elevation];
    this.#back.set(Math.sin(a) * Math.cos(e), Math.sin(e), Math.cos(a) * Math.cos(e));
    this.#right.set(Math.cos(a), 0, -Math.sin(a));
    this.#up.crossVectors(this.#back, this.#right);
  }
}

const turned = (right: Vector3, up: Vector3, back: Vector3): Quaternion =>
  new Quaternion().setFromRotationMatrix(new Matrix4().makeBasis(right, up, back));

function range(points: readonly Vector3[], axis: Vector3, room: number): { low: number; high: number } {
  const along = points.map((point) => point.dot(axis));
  return { low: Math.min(...along) - room, high: Math.max(...along) + room };
}
