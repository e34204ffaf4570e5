/** The 3D scene of the preview page: takes played from their baked files, and what explains them. */

import type { Quat } from "../../math/quat.js";
import type { Vec3 } from "../../math/vec3.js";
import type { StageProp, StageThrow } from "./stage/input.js";

export type { StageProp, StageTake, StageThrow } from "./stage/input.js";

export type View = "side" | "top" | "along" | "free" | "follow";
export type Layer = "siblings" | "strobe" | "paths" | "arrows" | "surroundings" | "truth";

export interface StageOptions {
  reducedMotion: boolean;
  dark: boolean;
}

export class Stage {
  /** Told while the prop is dragged along its arc. */
  onScrub: (t: number) => void = () => {};
  onScrubEnd: () => void = () => {};
  /** Told when `thinned` has changed. */
  onThinned: () => void = () => {};
  #time = 0;
  #view: View = "side";

  constructor(
    readonly canvas: HTMLCanvasElement,
    readonly options: StageOptions,
  ) {}

  /**
   * Shows a throw: the baked files its takes are in are loaded through `file` and played as any engine plays them. Old content goes only when the
   * new one is there; rejects with what is wrong in words, and then the old content stays.
   */
  async show(
    _data: StageThrow,
    _prop: StageProp,
    _file: (name: string) => Promise<ArrayBuffer>,
  ): Promise<void> {}

  /** Indices into the throw's takes; the second is shown beside it in its own tint. */
  select(_take: number, _second?: number): void {}

  set time(t: number) {
    this.#time = t;
  }
  /** s within the clip. */
  get time(): number {
    return this.#time;
  }
  get duration(): number {
    return 0;
  }

  setView(view: View): void {
    this.#view = view;
  }
  get view(): View {
    return this.#view;
  }

  setLayer(_layer: Layer, _on: boolean): void {}
  setDark(_dark: boolean): void {}
  resize(): void {}

  /** For keys: turns the camera of the free and following views (elsewhere it goes along the picture), in degrees to the right and up. */
  turn(_right: number, _up: number): void {}
  /** For keys: greater than 1 comes nearer. */
  zoom(_factor: number): void {}
  /** The view as `setView` first gave it. */
  resetView(): void {}

  /** Read from the scene graph: place of the centre of mass, m, and what turns the model from as modelled. */
  pose(): { centerOfMass: Vec3; rotation: Quat } {
    return { centerOfMass: [0, 0, 0], rotation: [0, 0, 0, 1] };
  }

  /** Greatest distance of the prop's points between the true flight and the played clip, at `samples` even times; mm. */
  differences(_samples: number): { times: number[]; millimetres: number[] } {
    return { times: [], millimetres: [] };
  }

  /** What is left out to stay fluent, in words for the page, or "". */
  get thinned(): string {
    return "";
  }

  dispose(): void {}
}
