import { type Accessor, Node, type Primitive, Skin, type vec3 } from "@gltf-transform/core";
import { length, type Vec3 } from "../math/vec3.js";

const IDENTITY = [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1];

/** A ball round the geometry at and below a node. */
export interface NodeBall {
  /** In the node's frame after its own scale: the clip's rotation turns it about the node's origin. */
  center: Vec3;
  radius: number;
  /** How much the scales of the nodes above can lengthen a way at most. */
  outerScale: number;
}

/**
 * Undefined where there is no geometry. Nodes below count as they rest; a joint has the vertices of the skins that it moves: one that several
 * joints move is shown at a mean of where each would have it, so never further off than the worst of them (glTF 2.0, 3.7.3.3).
 */
export function nodeBall(node: Node): NodeBall | undefined {
  const points: number[] = [];
  const scale = node.getScale();
  collect(node, (p) => [p[0] * scale[0], p[1] * scale[1], p[2] * scale[2]], points);
  if (points.length === 0) return undefined;
  const low = [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY];
  const high = low.map((x) => -x);
  for (let i = 0; i < points.length; i++) {
    low[i % 3] = Math.min(low[i % 3], points[i]);
    high[i % 3] = Math.max(high[i % 3], points[i]);
  }
  const center: Vec3 = [(low[0] + high[0]) / 2, (low[1] + high[1]) / 2, (low[2] + high[2]) / 2];
  let radius = 0;
  for (let i = 0; i < points.length; i += 3)
    radius = Math.max(
      radius,
      length([points[i] - center[0], points[i + 1] - center[1], points[i + 2] - center[2]]),
    );
  let outerScale = 1;
  for (let parent = node.getParentNode(); parent; parent = parent.getParentNode())
    outerScale *= Math.max(...parent.getScale().map(Math.abs));
  return { center, radius, outerScale };
}

/** Vertices of the node's mesh and of all below, through `place`. */
function collect(node: Node, place: (p: vec3) => vec3, points: number[]): void {
  const element: vec3 = [0, 0, 0];
  // a skinned mesh does not move with its own node
  for (const primitive of (!node.getSkin() && node.getMesh()?.listPrimitives()) || []) {
    const positions = primitive.getAttribute("POSITION");
    for (let i = 0; i < (positions?.getCount() ?? 0); i++)
      points.push(...place(positions!.getElement(i, element) as vec3));
  }
  for (const skin of node.listParents()) if (skin instanceof Skin) collectSkinned(skin, node, place, points);
  for (const child of node.listChildren()) collect(child, through(child.getMatrix(), place), points);
}

const through =
  (m: readonly number[], place: (p: vec3) => vec3) =>
  ([x, y, z]: vec3): vec3 =>
    place([
      m[0] * x + m[4] * y + m[8] * z + m[12],
      m[1] * x + m[5] * y + m[9] * z + m[13],
      m[2] * x + m[6] * y + m[10] * z + m[14],
    ]);

/** Vertices that the joint has a share in, as its inverse bind matrix puts them into its frame. */
function collectSkinned(skin: Skin, joint: Node, place: (p: vec3) => vec3, points: number[]): void {
  const number = skin.listJoints().indexOf(joint);
  // the skeleton's root need not be a joint
  if (number < 0) return;
  const bind = skin.getInverseBindMatrices()?.getElement(number, []) ?? IDENTITY;
  const bound = through(bind, place);
  const element: vec3 = [0, 0, 0];
  const primitives = skin
    .listParents()
    .flatMap((shown) => (shown instanceof Node ? (shown.getMesh()?.listPrimitives() ?? []) : []));
  for (const primitive of primitives) {
    const positions = primitive.getAttribute("POSITION");
    const shares = sharesOf(primitive, number);
    for (let i = 0; i < (positions?.getCount() ?? 0); i++)
      if (shares(i)) points.push(...bound(positions!.getElement(i, element) as vec3));
  }
}

/** Whether a joint moves a vertex at all. */
function sharesOf(primitive: Primitive, joint: number): (vertex: number) => boolean {
  const sets: [Accessor, Accessor][] = [];
  for (let set = 0; ; set++) {
    const joints = primitive.getAttribute(`JOINTS_${set}`);
    const weights = primitive.getAttribute(`WEIGHTS_${set}`);
    if (!joints || !weights) break;
    sets.push([joints, weights]);
  }
  const [numbers, parts]: [number[], number[]] = [[], []];
  return (vertex) =>
    sets.some(([joints, weights]) => {
      joints.getElement(vertex, numbers);
      weights.getElement(vertex, parts);
      return numbers.some((number, i) => number === joint && parts[i] !== 0);
    });
}
