import type { Accessor, GLTF } from "@gltf-transform/core";
import { add as addMatrices, type Mat3, scale as scaleMatrix } from "../math/mat3.js";
import { addScaled, scale, type Vec3 } from "../math/vec3.js";
import type { GltfJson } from "./model.js";
import type { Primitives } from "./primitives.js";
import { compose, type Frame, matrixFrame, sceneFrames, treeRoots } from "./scene.js";

/** Indices of the accessors that place a skinned primitive; none where it is not skinned. */
export function skinAccessors(json: GltfJson, node: number, primitive: GLTF.IMeshPrimitive): number[] {
  const skin = skinOf(json, node);
  if (!skin) return [];
  return [
    ...influences(primitive).flat(),
    ...(skin.inverseBindMatrices === undefined ? [] : [skin.inverseBindMatrices]),
  ];
}

/** Whether joints place the primitive where that node shows it. */
export const isSkinned = (json: GltfJson, node: number, primitive: GLTF.IMeshPrimitive): boolean =>
  skinOf(json, node) !== undefined && influences(primitive).length > 0;

/**
 * What places the vertices of skinned primitives: for a node and a primitive, the frame that takes a vertex into the scene,
 * the sum of its joints' frames, each after its inverse bind matrix, by weight (glTF 2.0, 3.7.3). Undefined where the
 * node has no skin or the primitive no joints.
 */
export function skinFrames(
  json: GltfJson,
  { plain, accessor }: Pick<Primitives, "plain" | "accessor">,
): (node: number, primitive: GLTF.IMeshPrimitive) => ((vertex: number) => Frame) | undefined {
  if (!json.skins?.length) return () => undefined;
  const frames = sceneFrames(json, treeRoots(json));
  const jointsOf = new Map<GLTF.ISkin, Map<number, Frame>>();
  return (node, primitive) => {
    const skin = skinOf(json, node);
    const sets = influences(primitive).map((pair) => pair.map((index) => accessor(primitive, index)));
    if (!skin || sets.length === 0) return undefined;
    const inverse = plain.get(skin.inverseBindMatrices ?? -1);
    const joints = jointsOf.get(skin) ?? new Map<number, Frame>();
    jointsOf.set(skin, joints);
    const jointFrame = (number: number): Frame | undefined => {
      const known = joints.get(number);
      const frame = frames.get(skin.joints[number]);
      if (known || !frame) return known;
      const made = inverse ? compose(frame, matrixFrame(inverse.getElement(number, []))) : frame;
      joints.set(number, made);
      return made;
    };
    return (vertex) => blend(jointFrame, sets, vertex);
  };
}

function blend(jointFrame: (number: number) => Frame | undefined, sets: Accessor[][], vertex: number): Frame {
  let linear = NOTHING;
  let origin: Vec3 = [0, 0, 0];
  let total = 0;
  for (const [numbers, weights] of sets) {
    const weight = weights.getElement(vertex, []);
    numbers.getElement(vertex, []).forEach((number, i) => {
      const joint = weight[i] ? jointFrame(number) : undefined;
      if (!joint) return;
      total += weight[i];
      linear = addMatrices(linear, scaleMatrix(joint.linear, weight[i]));
      origin = addScaled(origin, joint.origin, weight[i]);
    });
  }
  // Weights rounded to integers do not quite add up to 1.
  return { linear: scaleMatrix(linear, 1 / total), origin: scale(origin, 1 / total) };
}

const NOTHING: Mat3 = [
  [0, 0, 0],
  [0, 0, 0],
  [0, 0, 0],
];

const skinOf = (json: GltfJson, node: number): GLTF.ISkin | undefined => {
  const { skin } = json.nodes![node];
  return skin === undefined ? undefined : json.skins![skin];
};

/** Pairs of accessor indices: joint numbers and weights. */
function influences({ attributes }: GLTF.IMeshPrimitive): [number, number][] {
  const pairs: [number, number][] = [];
  for (let i = 0; attributes[`JOINTS_${i}`] !== undefined && attributes[`WEIGHTS_${i}`] !== undefined; i++)
    pairs.push([attributes[`JOINTS_${i}`], attributes[`WEIGHTS_${i}`]]);
  return pairs;
}
