import type { Vec3 } from "../math/vec3.js";
import type { Support } from "./support.js";

/** Points in a leaf: so few are quicker looked at than divided. */
const LEAF = 12;
/** Of a box's points, that either half has at least: so many levels at most, log 1e9 / log(8/7), and a few. */
const LEAST_SHARE = 1 / 8;
const MOST_DEPTH = 192;

/**
 * The support of a cloud of points (3 numbers each, from the centre of mass): exactly the lowest of them all, found without looking at
 * most. The points are divided again and again across the longest side of their box; a box whose lowest corner lies no lower than the lowest point
 * found is passed over (branch and bound).
 */
export function pointsSupport(source: Float64Array): Support {
  const { points, nodes, boxes } = divide(source);
  const stack = new Int32Array(MOST_DEPTH);

  return {
    lowest([x, y, z]): Vec3 {
      const [ax, ay, az] = [Math.abs(x), Math.abs(y), Math.abs(z)];
      const floorOf = (node: number): number => {
        const b = 6 * node;
        const middle = boxes[b] * x + boxes[b + 1] * y + boxes[b + 2] * z;
        return middle - (boxes[b + 3] * ax + boxes[b + 4] * ay + boxes[b + 5] * az);
      };
      let least = Number.POSITIVE_INFINITY;
      let found = 0;
      stack[0] = 0;
      for (let depth = 1; depth > 0; ) {
        const node = stack[--depth];
        if (floorOf(node) >= least) continue;
        const from = nodes[3 * node];
        const to = nodes[3 * node + 1];
        const child = nodes[3 * node + 2];
        if (child === 0) {
          for (let i = from; i < to; i += 3) {
            const height = points[i] * x + points[i + 1] * y + points[i + 2] * z;
            if (height < least) {
              least = height;
              found = i;
            }
          }
          continue;
        }
        // the lower half is looked at first, so it goes on top
        const swap = floorOf(child) < floorOf(child + 1) ? 1 : 0;
        stack[depth++] = child + swap;
        stack[depth++] = child + 1 - swap;
      }
      return [points[found], points[found + 1], points[found + 2]];
    },
  };
}

interface Divided {
  /** The points, those of a node side by side. */
  points: Float64Array;
  /** Per node: its first number in `points`, the end, and the first of its two children (0 for a leaf). */
  nodes: Int32Array;
  /** Per node: middle and half sides, the halves widened by rounding. */
  boxes: Float64Array;
}

function divide(source: Float64Array): Divided {
  const order = Uint32Array.from({ length: source.length / 3 }, (_, i) => i);
  const nodes: number[] = [0, order.length, 0];
  const boxes: number[] = [];
  for (let node = 0; 3 * node < nodes.length; node++) {
    const from = nodes[3 * node];
    const to = nodes[3 * node + 1];
    const box = boxOf(source, order.subarray(from, to));
    boxes.push(...box);
    if (to - from <= LEAF) continue;
    const axis = box[3] >= box[4] && box[3] >= box[5] ? 0 : box[4] >= box[5] ? 1 : 2;
    const middle = from + halve(source, order.subarray(from, to), axis, box[axis]);
    nodes[3 * node + 2] = nodes.length / 3;
    nodes.push(from, middle, 0, middle, to, 0);
  }
  const points = new Float64Array(source.length);
  order.forEach((index, i) => {
    points.set(source.subarray(3 * index, 3 * index + 3), 3 * i);
  });
  return {
    points,
    nodes: Int32Array.from(nodes, (value, i) => (i % 3 === 2 ? value : 3 * value)),
    boxes: Float64Array.from(boxes),
  };
}

/** Puts those below a coordinate first and answers how many; where these or the others are few, the lower half. */
function halve(source: Float64Array, order: Uint32Array, axis: number, coordinate: number): number {
  let low = 0;
  for (let i = 0; i < order.length; i++) {
    const index = order[i];
    if (source[3 * index + axis] >= coordinate) continue;
    order[i] = order[low];
    order[low++] = index;
  }
  if (Math.min(low, order.length - low) >= LEAST_SHARE * order.length) return low;
  order.sort((a, b) => source[3 * a + axis] - source[3 * b + axis] || a - b);
  return order.length >>> 1;
}

function boxOf(source: Float64Array, indices: Uint32Array): number[] {
  const low = [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY];
  const high = low.map((value) => -value);
  for (const index of indices)
    for (let a = 0; a < 3; a++) {
      low[a] = Math.min(low[a], source[3 * index + a]);
      high[a] = Math.max(high[a], source[3 * index + a]);
    }
  const size = Math.max(...low.map(Math.abs), ...high.map(Math.abs));
  return [
    ...low.map((value, a) => (value + high[a]) / 2),
    ...low.map((value, a) => (high[a] - value) / 2 + 1e-15 * size),
  ];
}
