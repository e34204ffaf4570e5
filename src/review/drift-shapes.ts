/** What flew in a bake, to be drawn: of the props themselves, or read back from the files of clips. */

import type { LoadedProp } from "../bake/props.js";
import type { Model } from "../gltf/model.js";
import { conjugate, multiply, type Quat, rotateBack } from "../math/quat.js";
import { subtract, type Vec3 } from "../math/vec3.js";
import type { ClipRecord } from "../record/clip-record.js";
import { type ClipMotion, clipMotions } from "./clip-motion.js";
import { type SheetProp, sheetProp } from "./sheet-input.js";
import { type Solid, solidOf } from "./solid.js";

export interface DriftShape {
  prop: SheetProp;
  /** Turns the shape's own axes onto those of the model as modelled. */
  toModel: Quat;
}

/** Of a clip, its record being in glTF's coordinates; undefined where it is not at hand. */
export type DriftShapes = (clip: ClipRecord) => Promise<DriftShape | undefined>;

/** Each prop's surface is read once. */
export function shapesOfProps(props: ReadonlyMap<string, Pick<LoadedProp, "prop" | "model">>): DriftShapes {
  const ready = new Map<string, DriftShape>();
  return async ({ prop: name }) => {
    const loaded = props.get(name);
    const known = ready.get(name);
    if (known || !loaded) return known;
    const { prop, model } = loaded;
    const shape: DriftShape = { prop: sheetProp(prop, await solidOf(model, prop)), toModel: [0, 0, 0, 1] };
    ready.set(name, shape);
    return shape;
  };
}

/**
 * Each file is read once.
 *
 * @param read answers undefined for a file that is not there or cannot be read
 */
export function shapesOfFiles(read: (name: string) => Promise<Model | undefined>): DriftShapes {
  const files = new Map<string, ClipMotion[]>();
  const motionsIn = async (name: string): Promise<ClipMotion[]> => {
    const model = await read(name);
    return model ? (await clipMotions(model)).flatMap((clip) => ("reason" in clip ? [] : [clip])) : [];
  };
  return async (clip) => {
    const motions = files.get(clip.file) ?? (await motionsIn(clip.file));
    files.set(clip.file, motions);
    const found = motions.find(({ name }) => name === clip.name);
    return found && shapeOfClip(found, clip);
  };
}

/** m: what is nearer than keys may be off is no other centre of mass. */
const SAME_CENTER = 0.002;

function shapeOfClip({ motion, flights, body: { prop } }: ClipMotion, clip: ClipRecord): DriftShape {
  const { start } = clip.flight ?? clip.parts?.[0] ?? { start: 0 };
  const turned = motion.rotation(start);
  const toModel = multiply(conjugate(clip.release.rotation), turned);
  // what a host's clip says of its centre of mass could not be read, but its record can
  const off = rotateBack(turned, subtract(clip.release.centerOfMass, motion.centerOfMass(start)));
  const isElsewhere =
    flights !== undefined && off.some((way) => Math.abs(way) > SAME_CENTER) && travels(motion);
  return { prop: isElsewhere ? { ...prop, solid: shifted(prop.solid, off) } : prop, toModel };
}

const travels = ({ centerOfMass, duration }: ClipMotion["motion"]): boolean =>
  centerOfMass(0).some((c, axis) => Math.abs(c - centerOfMass(duration / 2)[axis]) > SAME_CENTER);

/** About a centre that is elsewhere in its own axes. */
const shifted = (solid: Solid, by: Vec3): Solid => ({
  ...solid,
  positions: solid.positions.map((value, i) => value - by[i % 3]),
});
