/** Clips of any glTF file as motions of a rigid body with a shape and a centre of mass. */

import type { Motion } from "../bake/take-motion.js";
import { playRotation, playTranslation } from "../clip/play-track.js";
import { type ReadClip, readClips } from "../gltf/clips.js";
import type { Model } from "../gltf/model.js";
import { type PathNode, type RigidClip, rigidClip } from "../gltf/rigid-clip.js";
import { multiply, type Quat, rotate } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { add, scale, type Vec3, ZERO } from "../math/vec3.js";
import { weigh } from "../prop/prop.js";
import { recordedCenter, recordedFlights } from "./recorded-flight.js";
import { type SheetFlight, type SheetProp, sheetProp } from "./sheet-input.js";
import { solidOf } from "./solid.js";

/** A clip that moves one rigid piece. */
export interface ClipMotion {
  /** As the file has it; "" where it has none. */
  name: string;
  /** From its first key on. */
  motion: Motion;
  /** When that is, s within the clip. */
  start: number;
  body: ClipBody;
  /** When it flies, s of the motion; only where the clip says so. */
  flights?: SheetFlight[];
}

/** The piece moved, in the frame of its node; clips that move the same node share it. */
export interface ClipBody {
  prop: SheetProp;
  /** Of its weighing. */
  warnings: readonly string[];
}

/** A clip that is passed over, and why. */
export interface LeftClip {
  name: string;
  reason: string;
}

/** Where a node is and how it is turned, in the scene. */
export interface NodePose {
  place: Vec3;
  rotation: Quat;
}

/**
 * All clips of a model, in its order. Whatever of a piece's matter is not known is as `weigh` has it by default; but a clip that tossbake baked
 * says itself where its centre of mass goes.
 *
 * @throws ModelError for a model whose keys or meshes cannot be read
 */
export async function clipMotions(model: Model): Promise<(ClipMotion | LeftClip)[]> {
  const bodies = new Map<number, ClipBody[]>();
  const motions: (ClipMotion | LeftClip)[] = [];
  for (const clip of await readClips(model)) motions.push(await clipMotion(clip));
  return motions;

  async function clipMotion(clip: ReadClip): Promise<ClipMotion | LeftClip> {
    const { name } = clip;
    const rigid = rigidClip(model, clip);
    if ("reason" in rigid) return { name, reason: rigid.reason };
    const start = clip.channels.reduce((least, { times }) => Math.min(least, times[0]), Infinity);
    const end = clip.channels.reduce((most, { times }) => Math.max(most, times[times.length - 1]), 0);
    if (!(end > start)) return { name, reason: "all its keys are at one time" };
    const pose = poseOf(rigid.path);
    const body = await bodyOf(rigid, recordedCenter(clip.extras, rigid, pose));
    if ("reason" in body) return { name, ...body };
    const motion = motionOf(pose, body.prop.centerOfMass, start, end);
    const flights = start === 0 ? recordedFlights(clip.extras, end) : undefined;
    return { name, start, body, motion, ...(flights && { flights }) };
  }

  async function bodyOf(
    { node, name, piece }: RigidClip,
    center: ReturnType<typeof recordedCenter>,
  ): Promise<ClipBody | { reason: string }> {
    const known = bodies.get(node) ?? [];
    bodies.set(node, known);
    const same = known.find(({ prop }) => center === undefined || center.fits(prop.centerOfMass));
    if (same) return same;
    try {
      const prop = await weigh(name || "prop", piece, center && { centerOfMass: center.place });
      const body = { prop: sheetProp(prop, await solidOf(piece, prop)), warnings: prop.warnings };
      known.push(body);
      return body;
    } catch (error) {
      if (error instanceof RequestError) return { reason: `what it moves ${error.fault}` };
      throw error;
    }
  }
}

/** Each node's frame in that of the one above it. */
function poseOf(path: readonly PathNode[]): (t: number) => NodePose {
  return (t) => {
    let place = ZERO;
    let rotation: Quat = [0, 0, 0, 1];
    let size = 1;
    for (const node of path) {
      const moved = node.translation ? playTranslation(node.translation, t) : node.rest.translation;
      place = add(place, scale(rotate(rotation, moved), size));
      rotation = multiply(rotation, turned(node, t));
      size *= node.scale;
    }
    return { place, rotation };
  };
}

function turned({ rest, rotation }: PathNode, t: number): Quat {
  if (!rotation) return rest.rotation;
  // a spline from q to −q may pass through nothing, which is no rotation: what it comes from is
  const played = [t, t - INSTANT].map((time) => playRotation(rotation, time));
  return played.find(([, , , w]) => Number.isFinite(w)) ?? rest.rotation;
}

/** s */
const INSTANT = 1e-6;

const motionOf = (pose: (t: number) => NodePose, centerOfMass: Vec3, start: number, end: number): Motion => ({
  duration: end - start,
  centerOfMass(t) {
    const { place, rotation } = pose(start + t);
    return add(place, rotate(rotation, centerOfMass));
  },
  rotation: (t) => pose(start + t).rotation,
});
