/** Where a clip puts the prop: computed from its keys, for the many takes that no player plays. */

import type { GLTF } from "@gltf-transform/core";
import { Matrix4, Quaternion, Vector3 } from "three";
import { playTrack } from "../../../clip/play-track.js";
import type { Quat } from "../../../math/quat.js";
import type { Vec3 } from "../../../math/vec3.js";
import type { ClipChannels } from "./clip-channels.js";

/** Writes what turns and moves the model, as modelled and in m, into the world at `t` in s. */
export type ClipPoses = (t: number, out: Matrix4) => Matrix4;

/** How the clips of a file move what it shows. */
export interface Carrier {
  /** The node, by index, that carries all that is the prop's. */
  content: number;
  /** From metres as modelled to the frame of that node. */
  toContent: Matrix4;
}

/**
 * Finds the node that carries the prop, in any layout. What its place is as modelled is in the file, but for a node of the model's own in a file of one
 * clip, which rests at the first key: that key is taken to be where the motion starts.
 *
 * @param start the true pose at time 0
 */
export function carrierOf(
  json: GLTF.IGLTF,
  { nodes }: ClipChannels,
  propName: string,
  start: () => Matrix4,
): Carrier {
  const { translation, rotation } = nodes;
  const node = json.nodes![rotation];
  if (translation !== rotation) {
    const content = node.children![0];
    return { content, toContent: unscaled(json.nodes![content]) };
  }
  const { scenes, scene = 0 } = json;
  const roots = scenes?.[scene].nodes ?? [];
  if (roots.length === 1 && roots[0] === rotation && node.name === propName)
    return { content: rotation, toContent: unscaled(node) };
  const clips = (json.animations ?? []).filter(({ channels }) =>
    channels.some(({ target }) => target.node === rotation),
  );
  const rest = sceneMatrix(json, rotation);
  return {
    content: rotation,
    toContent: clips.length > 1 ? rest.invert() : rest.invert().multiply(start()),
  };
}

const unscaled = ({ scale = [1, 1, 1] }: GLTF.INode): Matrix4 =>
  new Matrix4().makeScale(1 / scale[0], 1 / scale[1], 1 / scale[2]);

export function clipPoses(json: GLTF.IGLTF, { nodes, track }: ClipChannels, carrier: Carrier): ClipPoses {
  const above = parentMatrix(json, nodes.translation ?? nodes.rotation);
  const node = json.nodes![nodes.rotation];
  const still = new Vector3(...(node.translation ?? [0, 0, 0]));
  const below = new Matrix4().makeScale(...((node.scale ?? [1, 1, 1]) as [number, number, number]));
  if (carrier.content !== nodes.rotation) below.multiply(localMatrix(json.nodes![carrier.content]));
  below.multiply(carrier.toContent);
  const place = new Vector3();
  const turn = new Quaternion();
  const one = new Vector3(1, 1, 1);
  return (t, out) => {
    const { translation, rotation } = playTrack(track, t);
    if (nodes.translation === undefined) place.copy(still);
    else place.set(...translation);
    return out
      .compose(place, turn.set(...rotation), one)
      .premultiply(above)
      .multiply(below);
  };
}

function localMatrix({ matrix, translation, rotation, scale }: GLTF.INode): Matrix4 {
  if (matrix) return new Matrix4().fromArray(matrix);
  return new Matrix4().compose(
    new Vector3(...(translation ?? [0, 0, 0])),
    new Quaternion(...(rotation ?? [0, 0, 0, 1])),
    new Vector3(...(scale ?? [1, 1, 1])),
  );
}

function parentMatrix(json: GLTF.IGLTF, node: number): Matrix4 {
  const parent = json.nodes!.findIndex(({ children }) => children?.includes(node));
  return parent < 0 ? new Matrix4() : sceneMatrix(json, parent);
}

const sceneMatrix = (json: GLTF.IGLTF, node: number): Matrix4 =>
  parentMatrix(json, node).multiply(localMatrix(json.nodes![node]));

export interface Pose {
  /** World frame, m. */
  centerOfMass: Vec3;
  /** Turns the model from as modelled. */
  rotation: Quat;
}

export function poseOf(matrix: Matrix4, centerOfMass: Vec3): Pose {
  const place = new Vector3(...centerOfMass).applyMatrix4(matrix);
  const rotation = new Quaternion();
  matrix.decompose(new Vector3(), rotation, new Vector3());
  return {
    centerOfMass: [place.x, place.y, place.z],
    rotation: [rotation.x, rotation.y, rotation.z, rotation.w],
  };
}

/** From the model as modelled, in m, to the world. */
export function matrixOf({ centerOfMass: c, rotation }: Pose, modelCenter: Vec3): Matrix4 {
  const matrix = new Matrix4().makeRotationFromQuaternion(new Quaternion(...rotation));
  const arm = new Vector3(...modelCenter).applyMatrix4(matrix);
  return matrix.setPosition(c[0] - arm.x, c[1] - arm.y, c[2] - arm.z);
}
