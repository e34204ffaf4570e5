/** The 3D scene of the preview page: takes played from their baked files, and what explains them. */

import { CameraRig } from "./stage/camera-rig.js";
import type { Pose } from "./stage/clip-poses.js";
import { Finder } from "./stage/finder.js";
import { listen } from "./stage/gestures.js";
import { Grid } from "./stage/grid.js";
import { hand } from "./stage/hand.js";
import type { FileSource, StageProp, StageThrow } from "./stage/input.js";
import { Labels } from "./stage/labels.js";
import { FIRST_LAYERS, type Layer, type View } from "./stage/layers.js";
import { OnDemand } from "./stage/on-demand.js";
import { type Palette, palette } from "./stage/palette.js";
import { StageRenderer } from "./stage/renderer.js";
import { Scrubbing } from "./stage/scrubbing.js";
import { type Setting, settingOf } from "./stage/setting.js";
import { ShownThrow } from "./stage/shown-throw.js";
import { Siblings } from "./stage/siblings.js";
import { TakeScene } from "./stage/take-scene.js";

export type { StageProp, StageTake, StageThrow } from "./stage/input.js";

export type { Layer, View } from "./stage/layers.js";

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

  readonly #renderer: StageRenderer;
  readonly #rig = new CameraRig();
  readonly #labels = new Labels();
  readonly #grid = new Grid(this.#labels);
  readonly #scrubbing = new Scrubbing(this.#rig);
  readonly #finder = new Finder();
  readonly #siblings = new Siblings();
  readonly #picture = new OnDemand((waited) => this.#draw(waited));
  readonly #layers: Record<Layer, boolean> = { ...FIRST_LAYERS };
  readonly #stopListening: () => void;
  #colors: Palette;
  #shown?: ShownThrow;
  #scene?: TakeScene;
  /** Left, and to be let go of when the next picture is drawn. */
  #left: { dispose(): void }[] = [];
  #setting?: Setting;
  #selected: { take: number; second?: number } = { take: 0 };
  #time = 0;
  #view: View = "side";
  #showing = 0;
  #selecting = 0;
  #isMoved = false;

  constructor(
    readonly canvas: HTMLCanvasElement,
    readonly options: StageOptions,
  ) {
    this.#renderer = new StageRenderer(canvas);
    this.#renderer.behind.add(this.#grid.group);
    this.#renderer.front.add(this.#finder.group);
    this.#colors = palette(options.dark);
    this.#paint();
    const target = hand({
      rig: this.#rig,
      scrubbing: this.#scrubbing,
      now: () => this.#scene && this.#shown && { scene: this.#scene, shown: this.#shown, time: this.#time },
      scrub: (t) => {
        this.time = t;
        this.onScrub(this.#time);
      },
      dropped: () => this.onScrubEnd(),
      moved: () => this.#moved(),
    });
    this.#stopListening = listen(canvas, target);
    this.resize();
  }

  /**
   * Shows a throw: the baked files its takes are in are loaded through `file` and played as any engine plays them. Old content goes only when the
   * new one is there; rejects with what is wrong in words, and then the old content stays.
   */
  async show(data: StageThrow, prop: StageProp, file: FileSource): Promise<void> {
    const turn = ++this.#showing;
    const shown = await ShownThrow.open(data, prop, file);
    if (turn !== this.#showing) return shown.dispose();
    const old = this.#shown;
    this.#leave();
    this.#shown = shown;
    this.#siblings.reset();
    this.#isMoved = false;
    await this.select(0);
    if (old) this.#left.push(old);
    void shown.readAll(() => turn === this.#showing && this.#rebuild()).catch(() => {});
  }

  /** Indices into the throw's takes; the second is shown beside it in its own tint. */
  async select(take: number, second?: number): Promise<void> {
    const shown = this.#shown;
    if (!shown) return;
    const turn = ++this.#selecting;
    const takes = second === undefined ? [take] : [take, second];
    for (const each of takes) if (!shown.isLoaded(each)) await shown.load(each);
    if (shown !== this.#shown || turn !== this.#selecting) return;
    this.#selected = { take, second };
    this.#rebuild();
    shown.keepOnly(takes);
  }

  set time(t: number) {
    this.#time = Math.max(0, Math.min(this.duration, t));
    this.#scene?.seek(this.#time);
    this.#picture.request();
  }
  /** s within the clip. */
  get time(): number {
    return this.#time;
  }
  get duration(): number {
    return this.#scene?.course.duration ?? 0;
  }
  /** s between two exposures of the strobe. */
  get strobeStep(): number {
    return this.#scene?.strobeStep ?? 0;
  }

  setView(view: View): void {
    this.#view = view;
    this.resetView();
  }
  get view(): View {
    return this.#view;
  }

  setLayer(layer: Layer, on: boolean): void {
    this.#layers[layer] = on;
    this.#scene?.setLayer(layer, on);
    this.time = this.#time;
    this.#tell();
  }

  setDark(dark: boolean): void {
    this.#colors = palette(dark);
    this.#paint();
    this.#rebuild();
  }

  resize(): void {
    const { clientWidth, clientHeight } = this.canvas;
    this.#renderer.resize(clientWidth, clientHeight);
    this.#rig.resize(clientWidth, clientHeight);
    if (this.#isMoved) this.#rig.update();
    else this.resetView();
    this.#picture.request();
  }

  /** For keys: turns the camera of the free and following views (elsewhere it goes along the picture), in degrees to the right and up. */
  turn(right: number, up: number): void {
    if (this.#rig.isFlat) this.#rig.pan(-right * 4, up * 4);
    else this.#rig.turn((right * Math.PI) / 180, (up * Math.PI) / 180);
    this.#moved();
  }

  /** For keys: greater than 1 comes nearer. */
  zoom(factor: number): void {
    this.#rig.zoom(factor);
    this.#moved();
  }

  /** The view as `setView` first gave it. */
  resetView(): void {
    this.#isMoved = false;
    if (this.#setting) this.#rig.frame(this.#view, this.#setting.framing);
    this.#picture.request();
  }

  /** Read from the scene graph: place of the centre of mass, m, and what turns the model from as modelled. */
  pose(): Pose {
    return this.#scene?.pose() ?? { centerOfMass: [0, 0, 0], rotation: [0, 0, 0, 1] };
  }

  /** Greatest distance of the prop's points between the true flight and the played clip, at `samples` even times; mm. */
  differences(samples: number): { times: number[]; millimetres: number[] } {
    if (!this.#scene || !this.#shown) return { times: [], millimetres: [] };
    const { course } = this.#scene;
    const { outer } = this.#shown.body;
    const times = Array.from({ length: samples }, (_, i) => (course.duration * i) / Math.max(1, samples - 1));
    return { times, millimetres: times.map((t) => course.difference(t, outer)) };
  }

  /** What is left out to stay fluent, or cannot be shown, in words for the page, or "". */
  get thinned(): string {
    return this.#siblings.words;
  }

  /** Where a moment's centre of mass is in the picture, px from its upper left corner. */
  screenPlace(t: number): { x: number; y: number } {
    return this.#scene ? this.#rig.project(this.#scene.place(t)) : { x: 0, y: 0 };
  }

  /** How many other takes there are in the scene, whether it shows them or not. */
  get siblingsDrawn(): number {
    return this.#scene?.siblings ?? 0;
  }

  /** What the graphics memory holds. */
  get memory(): { geometries: number; textures: number } {
    return this.#renderer.memory;
  }

  dispose(): void {
    this.#showing++;
    this.#picture.cancel();
    this.#stopListening();
    this.#leave();
    this.#letGo();
    this.#shown?.dispose();
    this.#shown = undefined;
    this.#grid.clear();
    this.#finder.dispose();
    this.#labels.dispose();
    this.#renderer.dispose();
  }

  #paint(): void {
    this.#renderer.ground = this.#colors.ground;
    this.#labels.halo = this.#colors.ground;
    this.#finder.color = this.#colors.path;
  }

  /** Makes the scene of the selected take anew. */
  #rebuild(): void {
    const shown = this.#shown;
    const { take, second } = this.#selected;
    const course = shown?.courses[take];
    if (!shown || !course) return;
    const old = this.#setting;
    this.#setting = settingOf(course, shown.courses);
    this.#leave();
    const siblings = this.#siblings.drawn(shown, [take, second]);
    const { room } = this.#setting;
    this.#scene = new TakeScene({
      shown,
      take,
      second,
      colors: this.#colors,
      labels: this.#labels,
      room,
      siblings,
    });
    this.#renderer.behind.add(this.#scene.behind);
    this.#renderer.front.add(this.#scene.front);
    for (const [layer, on] of Object.entries(this.#layers)) this.#scene.setLayer(layer as Layer, on);
    const isNew = JSON.stringify(old?.framing) !== JSON.stringify(this.#setting.framing);
    if (isNew && !this.#isMoved) this.resetView();
    this.time = this.#time;
    this.#tell();
  }

  #leave(): void {
    if (!this.#scene) return;
    this.#scene.leave();
    this.#left.push(this.#scene);
    this.#scene = undefined;
  }

  #letGo(): void {
    for (const scene of this.#left) scene.dispose();
    this.#left = [];
    this.#labels.forget();
  }

  #tell(): void {
    const { take, second } = this.#selected;
    if (this.#siblings.tell(this.#shown, [take, second], this.#layers)) this.onThinned();
  }

  /** By hand: it stays so until another view or throw is wanted. */
  #moved(): void {
    this.#isMoved = true;
    this.#picture.request();
  }

  #draw(waited: () => number): void {
    const scene = this.#scene;
    if (scene && this.#shown && this.#setting) {
      const place = scene.place(this.#time);
      this.#rig.follow(place);
      this.#grid.fit(this.#rig, this.#setting.grid, this.#colors);
      this.#finder.fit(this.#rig, place, this.#shown.prop.reach);
      scene.fit(this.#rig);
      this.#labels.fit(this.#rig);
    }
    this.#renderer.draw(this.#rig);
    this.#letGo();
    const { take, second } = this.#selected;
    if (this.#siblings.picture(waited(), this.#layers.siblings, this.#shown, [take, second])) this.#rebuild();
  }
}
