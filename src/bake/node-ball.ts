import type { Node, vec3 } from "@gltf-transform/core";
import { length, type Vec3 } from "../math/vec3.js";

/** A ball round the geometry at and below a node. */
export interface NodeBall {
  /** In the node's frame after its own scale: the clip's rotation turns it about the node's origin. */
  center: Vec3;
  radius: number;
  /** How much the scales of the nodes above can lengthen a way at most. */
  outerScale: number;
}

/** Undefined where there is no geometry. Nodes below count as they rest. */
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
  for (const primitive of node.getMesh()?.listPrimitives() ?? []) {
    const positions = primitive.getAttribute("POSITION");
    for (let i = 0; i < (positions?.getCount() ?? 0); i++)
      points.push(...place(positions!.getElement(i, element) as vec3));
  }
  for (const child of node.listChildren()) {
    const m = child.getMatrix();
    collect(
      child,
      ([x, y, z]) =>
        place([
          m[0] * x + m[4] * y + m[8] * z + m[12],
          m[1] * x + m[5] * y + m[9] * z + m[13],
          m[2] * x + m[6] * y + m[10] * z + m[14],
        ]),
      points,
    );
  }
}
