import { checkNodeExtensions } from "./check-geometry-extensions.js";
import type { Checker, JsonObject } from "./checker.js";

/** Far more than any rig; players recurse over the hierarchy and give out at some thousands. */
const GREATEST_DEPTH = 1000;

/** Checks nodes, scenes and skins: every index, and that the nodes are trees of bounded depth. */
export function checkNodes(json: JsonObject, check: Checker): void {
  const nodes = check.objects(json, "nodes");
  const count = (key: string): number => check.objects(json, key).length;
  const counts = { meshes: count("meshes"), skins: count("skins"), cameras: count("cameras") };
  const accessors = check.objects(json, "accessors");
  nodes.forEach((node, i) => {
    const where = `nodes[${i}]`;
    checkNodeExtensions(node, where, nodes.length, accessors, check);
    check.index(node.mesh, `${where}.mesh`, counts.meshes, "meshes", "optional");
    check.index(node.skin, `${where}.skin`, counts.skins, "skins", "optional");
    check.index(node.camera, `${where}.camera`, counts.cameras, "cameras", "optional");
    if (node.name !== undefined) check.string(node.name, `${where}.name`);
    if (node.weights !== undefined) check.numbers(node.weights, `${where}.weights`);
    checkTransform(node, where, check);
  });
  const parents = checkChildren(nodes, check);
  checkDepth(nodes, parents, check);

  const scenes = check.objects(json, "scenes");
  check.index(json.scene, "scene", scenes.length, "scenes", "optional");
  scenes.forEach((scene, s) => {
    const where = `scenes[${s}].nodes`;
    for (const node of indices(scene.nodes, where, nodes.length, check))
      if (parents[node] >= 0)
        check.refuse(
          `${where} has node ${node}`,
          `it must be a root, but node ${parents[node]} has it as a child`,
        );
  });
  check.objects(json, "skins").forEach((skin, i) => {
    const joints = indices(skin.joints, `skins[${i}].joints`, nodes.length, check);
    if (joints.length === 0) check.refuse(`skins[${i}] has no joints`, "it must have one at least");
    check.index(skin.skeleton, `skins[${i}].skeleton`, nodes.length, "nodes", "optional");
  });
}

function checkTransform(node: JsonObject, where: string, check: Checker): void {
  if (node.matrix !== undefined) {
    const m = check.numbers(node.matrix, `${where}.matrix`, 16);
    if (m[3] !== 0 || m[7] !== 0 || m[11] !== 0 || m[15] !== 1)
      check.refuse(`${where}.matrix has the last row ${[m[3], m[7], m[11], m[15]]}`, "it must be 0, 0, 0, 1");
    if (node.translation !== undefined || node.rotation !== undefined || node.scale !== undefined)
      check.refuse(
        `${where} has a matrix beside translation, rotation or scale`,
        "it must have one or the other",
      );
  }
  if (node.translation !== undefined) check.numbers(node.translation, `${where}.translation`, 3);
  if (node.scale !== undefined) check.numbers(node.scale, `${where}.scale`, 3);
  if (node.rotation !== undefined) {
    const q = check.numbers(node.rotation, `${where}.rotation`, 4);
    const length = Math.sqrt(q[0] * q[0] + q[1] * q[1] + q[2] * q[2] + q[3] * q[3]);
    // The specification asks for unit length; 1 % is leave enough for coarse rounding.
    if (!(Math.abs(length - 1) < 0.01))
      check.refuse(`${where}.rotation has the length ${length}`, "it must be a unit quaternion");
  }
}

/** Each node's parent, -1 for roots. */
function checkChildren(nodes: JsonObject[], check: Checker): Int32Array {
  const parents = new Int32Array(nodes.length).fill(-1);
  nodes.forEach((node, i) => {
    for (const child of indices(node.children, `nodes[${i}].children`, nodes.length, check)) {
      if (parents[child] >= 0)
        check.refuse(
          `node ${child} is a child of node ${parents[child]} and of node ${i}`,
          "a node must have one parent at most",
        );
      parents[child] = i;
    }
  });
  return parents;
}

/** With one parent each, nodes that cannot be reached from a root are in a cycle. */
function checkDepth(nodes: JsonObject[], parents: Int32Array, check: Checker): void {
  const depth = new Int32Array(nodes.length);
  const open: number[] = [];
  parents.forEach((parent, i) => {
    if (parent < 0) {
      depth[i] = 1;
      open.push(i);
    }
  });
  for (let node = open.pop(); node !== undefined; node = open.pop())
    for (const child of (nodes[node].children as number[] | undefined) ?? []) {
      depth[child] = depth[node] + 1;
      if (depth[child] > GREATEST_DEPTH)
        check.refuse(
          `node ${child} lies more than ${GREATEST_DEPTH} deep`,
          "no player of glTF follows that far",
        );
      open.push(child);
    }
  const lost = depth.indexOf(0);
  if (lost >= 0)
    check.refuse(`node ${lost} is its own ancestor`, "the nodes must form trees, without a cycle");
}

/** A list of different node indices; empty where it is missing. */
function indices(value: unknown, where: string, count: number, check: Checker): number[] {
  if (value === undefined) return [];
  const list = check.indices(value, where, count, "nodes");
  if (new Set(list).size !== list.length)
    check.refuse(`${where} names a node twice`, "each may stand there once");
  return list;
}
