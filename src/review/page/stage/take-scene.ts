/** The take that is looked at, with all that explains it; made anew when another one is. */

import { Group, type Mesh, MeshStandardMaterial, Vector3 } from "three";
import { Arrows } from "./arrows.js";
import type { CameraRig } from "./camera-rig.js";
import { poseOf } from "./clip-poses.js";
import type { Course } from "./course.js";
import { Ghosts } from "./ghosts.js";
import type { Labels } from "./labels.js";
import type { Layer } from "./layers.js";
import { niceStep } from "./nice-step.js";
import { outlineMesh } from "./outline-mesh.js";
import type { Palette } from "./palette.js";
import type { PlayedTake } from "./played-take.js";
import type { ShownThrow } from "./shown-throw.js";
import { chained, discard, strokes } from "./strokes.js";
import { type Room, Surroundings } from "./surroundings.js";

const MOST_EXPOSURES = 24;
const FEWEST_EXPOSURES = 5;

export interface TakeSceneOptions {
  shown: ShownThrow;
  take: number;
  second?: number;
  colors: Palette;
  labels: Labels;
  room: Room;
  /** Indices of the takes that are shown pale. */
  siblings: readonly number[];
}

export class TakeScene {
  /** What lies behind, and what is never hidden by that. */
  readonly behind = new Group();
  readonly front = new Group();
  readonly played: PlayedTake;
  readonly course: Course;
  /** s between two exposures. */
  readonly strobeStep: number;
  readonly #options: TakeSceneOptions;
  readonly #second?: { played: PlayedTake; course: Course };
  readonly #siblings: Ghosts;
  readonly #strobe: Ghosts;
  readonly #paths = new Group();
  readonly #arrows: Arrows;
  readonly #surroundings: Surroundings;
  readonly #truth: ReturnType<typeof outlineMesh>;
  readonly #tint: MeshStandardMaterial;
  readonly #names: ReturnType<Labels["add"]>[] = [];
  readonly #pathNames: ReturnType<Labels["add"]>[] = [];

  constructor(options: TakeSceneOptions) {
    this.#options = options;
    const { shown, take, second, colors, labels, room, siblings } = options;
    const { prop, body } = shown;
    this.course = shown.courses[take]!;
    this.played = shown.play(take);
    if (second !== undefined)
      this.#second = { played: shown.play(second, true), course: shown.courses[second]! };
    this.#tint = new MeshStandardMaterial({ color: colors.second, roughness: 0.8 });
    this.#siblings = new Ghosts(body, prop.centerOfMass, siblings.length, colors.sibling);
    this.strobeStep = exposureStep(this.course, prop.reach);
    this.#strobe = this.#exposures();
    this.behind.add(this.#siblings.mesh, this.#strobe.mesh);
    this.#surroundings = new Surroundings(this.course.take.motion.parts, room, labels, colors);
    // what stays is written first: what moves gives way to it
    this.#drawPaths();
    this.#arrows = new Arrows(labels, colors);
    this.#truth = outlineMesh(shown.outline, colors.truth);
    this.front.add(
      this.played.object,
      this.#paths,
      this.#arrows.group,
      this.#surroundings.group,
      this.#truth,
    );
    if (this.#second) this.#tintSecond();
  }

  setLayer(layer: Layer, on: boolean): void {
    const groups = {
      siblings: this.#siblings.mesh,
      strobe: this.#strobe.mesh,
      paths: this.#paths,
      arrows: this.#arrows.group,
      surroundings: this.#surroundings.group,
      truth: this.#truth,
    };
    groups[layer].visible = on;
  }

  seek(t: number): void {
    const { shown, siblings } = this.#options;
    this.played.seek(t);
    this.#second?.played.seek(t);
    if (this.#siblings.mesh.visible) {
      const poses = siblings.flatMap((take) => shown.courses[take]?.played ?? []);
      this.#siblings.put(poses.length, (i, out) => poses[i](t, out));
    }
    const truth = this.course.truth(t);
    this.#truth.position.set(...(truth.centerOfMass as [number, number, number]));
    this.#truth.quaternion.set(...(truth.rotation as [number, number, number, number]));
    this.#arrows.set(this.place(t), shown.prop.reach, this.course.turning(t));
    [this.course, this.#second?.course].forEach((course, i) => {
      if (course) this.#names[i]?.position.copy(course.place(t, shown.prop.centerOfMass));
    });
  }

  /** How many there are. */
  get siblings(): number {
    return this.#options.siblings.length;
  }

  /** Of the centre of mass. */
  place(t: number): Vector3 {
    return this.course.place(t, this.#options.shown.prop.centerOfMass);
  }

  pose() {
    return poseOf(this.played.matrix(), this.#options.shown.prop.centerOfMass);
  }

  /** Before each picture. */
  fit(rig: CameraRig): void {
    this.#arrows.fit(rig);
    this.#surroundings.fit((place) => rig.metresPerPixel(place));
  }

  /** Leaves the stage; what it holds in the graphics memory stays until `dispose`, so that a scene that takes its place need not compile the same again. */
  leave(): void {
    this.#options.labels.remove([...this.#names, ...this.#pathNames]);
    this.played.dispose();
    this.#second?.played.dispose();
    this.behind.removeFromParent();
    this.front.removeFromParent();
  }

  /** After `leave`. */
  dispose(): void {
    this.#siblings.dispose();
    this.#strobe.dispose();
    this.#arrows.dispose();
    this.#surroundings.dispose();
    this.#tint.dispose();
    this.#truth.material.dispose();
    discard(this.#paths);
  }

  #exposures(): Ghosts {
    const { shown, colors } = this.#options;
    const count = Math.floor(this.course.duration / this.strobeStep + 1e-9) + 1;
    const ghosts = new Ghosts(shown.body, shown.prop.centerOfMass, count, colors.strobe);
    ghosts.put(count, (i, out) => this.course.played(i * this.strobeStep, out));
    return ghosts;
  }

  #drawPaths(): void {
    const { shown, colors, labels } = this.#options;
    const { prop } = shown;
    const samples = Math.round(Math.max(120, Math.min(2400, this.course.turns * 60)));
    const line = (
      course: Course,
      point: typeof prop.centerOfMass,
      color: string,
      width: number,
      isDashed: boolean,
    ) => {
      const way = course.way(point, samples);
      const dash: [number, number] | undefined = isDashed ? [0.05, 0.03] : undefined;
      this.#paths.add(strokes(chained(way), { color, width, dash }));
      return new Vector3().fromArray(way, way.length - 3);
    };
    line(this.course, prop.centerOfMass, colors.path, 2.4, false);
    for (const [name, point] of Object.entries(prop.points)) {
      const end = line(this.course, point, colors.pointPath, 1.2, false);
      this.#pathNames.push(labels.add(this.#paths, name, colors.pointPath, end, { anchor: [-0.1, 0.5] }));
    }
    if (this.#second) line(this.#second.course, prop.centerOfMass, colors.second, 2.4, true);
  }

  #tintSecond(): void {
    const { shown, take, second, colors, labels } = this.#options;
    const { played } = this.#second!;
    played.object.traverse((object) => {
      if ((object as Mesh).isMesh) (object as Mesh).material = this.#tint;
    });
    this.front.add(played.object);
    this.#names.push(
      ...([take, second!] as const).map((index, i) =>
        labels.add(
          this.front,
          `take ${shown.takes[index].motion.take}`,
          [colors.path, colors.second][i],
          new Vector3(),
          { anchor: [0.5, -1.2] },
        ),
      ),
    );
  }
}

/** So that neighbours lie about a reach apart. */
function exposureStep(course: Course, reach: number): number {
  const way = course.way(course.prop.centerOfMass, 60);
  let length = 0;
  for (let i = 3; i < way.length; i += 3)
    length += Math.hypot(way[i] - way[i - 3], way[i + 1] - way[i - 2], way[i + 2] - way[i - 1]);
  const count = Math.max(FEWEST_EXPOSURES, Math.min(MOST_EXPOSURES, length / reach));
  return niceStep(course.duration / count);
}
