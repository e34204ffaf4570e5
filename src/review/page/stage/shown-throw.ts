/** A throw's baked files and what is made of them once, whatever take is looked at. */

import { Matrix4, Mesh, MeshStandardMaterial, type Object3D, type Texture } from "three";
import { motionOf } from "../../../bake/take-motion.js";
import { type Body, bodyOf } from "./body.js";
import { type ClipChannels, clipChannels } from "./clip-channels.js";
import { type Carrier, carrierOf, clipPoses, matrixOf, poseOf } from "./clip-poses.js";
import { type Container, openContainer } from "./container.js";
import { Course } from "./course.js";
import type { FileSource, StageProp, StageTake, StageThrow } from "./input.js";
import { type LoadedFile, loadFile } from "./loaded-file.js";
import { PlayedTake } from "./played-take.js";

/** Triangles of all the copies that are drawn at once, and of one of them. */
const MOST_TRIANGLES = 24_000;
const MOST_OF_ONE = 3000;
/** Of the outline of the true flight. */
const MOST_OF_OUTLINE = 12_000;

export class ShownThrow {
  readonly takes: readonly StageTake[];
  /** By take; those of files that are not read yet are missing. */
  readonly courses: (Course | undefined)[];
  body!: Body;
  outline!: Body;
  missing = "";
  readonly #plain = new MeshStandardMaterial({ color: "#b9a98a", flatShading: true, roughness: 0.9 });
  readonly #loaded = new Map<string, LoadedFile>();
  readonly #carriers = new Map<number, { animation: number; carrier: Carrier }>();

  private constructor(
    data: StageThrow,
    readonly prop: StageProp,
    readonly file: FileSource,
  ) {
    this.takes = data.takes;
    this.courses = data.takes.map(() => undefined);
  }

  /** Rejects with an Error in words where the first take cannot be shown. */
  static async open(data: StageThrow, prop: StageProp, file: FileSource): Promise<ShownThrow> {
    if (data.takes.length === 0) throw new Error("there is no take to be shown");
    const shown = new ShownThrow(data, prop, file);
    await shown.load(0);
    const played = shown.play(0);
    const each = Math.floor(MOST_TRIANGLES / data.takes.length);
    shown.body = bodyOf(
      played.content,
      played.matrix(),
      prop,
      Math.max(80, Math.min(MOST_OF_ONE, each)),
      "flat",
    );
    shown.outline = bodyOf(played.content, played.matrix(), prop, MOST_OF_OUTLINE, "smooth");
    played.dispose();
    return shown;
  }

  isLoaded(take: number): boolean {
    return this.#loaded.has(this.takes[take].file);
  }

  /** Loads the file of a take. */
  async load(take: number): Promise<void> {
    const { file: name } = this.takes[take];
    if (this.#loaded.has(name)) return;
    const container = await this.#read(name);
    const loaded = await loadFile(container);
    this.missing = loaded.missing;
    this.#loaded.set(name, loaded);
  }

  /** Reads the courses of takes that are in files of their own. */
  async readAll(done: () => void): Promise<void> {
    const names = new Set(this.takes.flatMap(({ file }, i) => (this.courses[i] ? [] : [file])));
    for (const name of names) {
      await this.#read(name);
      done();
    }
  }

  /** @param asCopy leaves the file's own objects free for another take */
  play(take: number, asCopy = false): PlayedTake {
    const { animation, carrier } = this.#carriers.get(take)!;
    const played = new PlayedTake(this.#loaded.get(this.takes[take].file)!, animation, carrier, asCopy);
    if (this.body?.ownTriangles === 0) played.attach(this.#standIn());
    return played;
  }

  /** Lets go of files that hold none of these takes. */
  keepOnly(takes: readonly number[]): void {
    const kept = new Set(takes.map((take) => this.takes[take].file));
    for (const [name, { scene }] of this.#loaded)
      if (!kept.has(name)) {
        freeModel(scene);
        this.#loaded.delete(name);
      }
  }

  dispose(): void {
    this.keepOnly([]);
    this.#plain.dispose();
    this.body.geometry.dispose();
    this.outline.geometry.dispose();
  }

  async #read(name: string): Promise<Container> {
    const container = await openContainer(name, this.file);
    this.takes.forEach((take, i) => {
      if (take.file === name && !this.courses[i]) this.#course(container, take, i);
    });
    return container;
  }

  #course({ json, buffers }: Container, take: StageTake, i: number): void {
    const { prop } = this;
    const channels: ClipChannels = clipChannels(take.file, { json, buffers }, take.clip);
    const start = () => {
      const motion = motionOf(take.motion, prop.axes);
      const pose = { centerOfMass: motion.centerOfMass(0), rotation: motion.rotation(0) };
      return matrixOf(pose, prop.centerOfMass);
    };
    const carrier = carrierOf(json, channels, prop.name, start);
    const poses = clipPoses(json, channels, carrier);
    const stays =
      channels.nodes.translation === undefined
        ? poseOf(poses(0, new Matrix4()), prop.centerOfMass).centerOfMass
        : undefined;
    this.#carriers.set(i, { animation: channels.animation, carrier });
    this.courses[i] = new Course(take, prop, poses, stays);
  }

  /** Where the file has no mesh. */
  #standIn(): Object3D {
    const mesh = new Mesh(this.body.geometry, this.#plain);
    mesh.position.set(...(this.prop.centerOfMass as [number, number, number]));
    return mesh;
  }
}

/** Geometries, materials and textures of a loaded file. */
function freeModel(scene: Object3D): void {
  scene.traverse((object) => {
    const mesh = object as Mesh;
    if (!mesh.isMesh) return;
    mesh.geometry.dispose();
    for (const material of [mesh.material].flat()) {
      for (const value of Object.values(material) as (Texture | null | undefined)[]) {
        if (!value?.isTexture) continue;
        (value.image as { close?(): void } | undefined)?.close?.();
        value.dispose();
      }
      material.dispose();
    }
    if ("skeleton" in mesh) (mesh.skeleton as { dispose(): void }).dispose();
  });
}
