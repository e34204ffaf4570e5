/** Edges put together by where they are, so that those of a surface that faces one way are passed over at a look. */

import type { Solid } from "./solid.js";

/** Directions of the triangles that meet at a group's edges: no further from the axis than an angle of this sine; 4 numbers a group. */
export interface EdgeGroups {
  /** Edge numbers, those of a group side by side. */
  readonly order: Uint32Array;
  /** Edges a group, but for the last. */
  readonly size: number;
  /** Unit axis and sine; a sine above 1: they face every way. */
  readonly cones: Float64Array;
  /** Edges that always count: where not two triangles meet that run on as one surface, or one that has no area. */
  readonly loose: Uint32Array;
}

const GROUP = 64;
/** Cells of the grid along each side of the mesh's box: 10 bits of a 30-bit place. */
const CELLS = 1023;
/** Of a cosine or sine: more than rounding. */
const ROUNDING = 1e-9;

export function edgeGroups(solid: Omit<Solid, "groups">): EdgeGroups {
  const { positions, normals, edges, starts, sides } = solid;
  const hasArea = (t: number) => normals[3 * t] !== 0 || normals[3 * t + 1] !== 0 || normals[3 * t + 2] !== 0;
  const loose: number[] = [];
  const plain: number[] = [];
  for (let e = 0; e + 1 < starts.length; e++) {
    const [a, b] = [sides[starts[e]], sides[starts[e] + 1]];
    const isPlain =
      starts[e + 1] - starts[e] === 2 &&
      a >= 0 !== b >= 0 &&
      hasArea(a < 0 ? ~a : a) &&
      hasArea(b < 0 ? ~b : b);
    (isPlain ? plain : loose).push(e);
  }
  const order = byPlace(Uint32Array.from(plain), positions, edges);
  const count = Math.ceil(order.length / GROUP);
  const cones = new Float64Array(4 * count);
  const directions = new Float64Array(6 * GROUP);
  for (let g = 0; g < count; g++) {
    const end = Math.min(order.length, (g + 1) * GROUP);
    let used = 0;
    for (let i = g * GROUP; i < end; i++)
      for (let s = starts[order[i]]; s < starts[order[i]] + 2; s++) {
        const n = 3 * (sides[s] < 0 ? ~sides[s] : sides[s]);
        const [x, y, z] = [normals[n], normals[n + 1], normals[n + 2]];
        const size = Math.sqrt(x * x + y * y + z * z);
        directions[used++] = x / size;
        directions[used++] = y / size;
        directions[used++] = z / size;
      }
    setCone(cones, 4 * g, directions.subarray(0, used));
  }
  return { order, size: GROUP, cones, loose: Uint32Array.from(loose) };
}

/** Along a curve that goes through the cells of a grid, near ones mostly near each other (Morton's order). */
function byPlace(list: Uint32Array, positions: Float64Array, edges: Uint32Array): Uint32Array {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  for (let i = 0; i < positions.length; i++) {
    low[i % 3] = Math.min(low[i % 3], positions[i]);
    high[i % 3] = Math.max(high[i % 3], positions[i]);
  }
  const cell = Math.max(high[0] - low[0], high[1] - low[1], high[2] - low[2]) / CELLS || 1;
  // the place before, the edge's number behind: numbers of 53 bits sort as they are
  const keys = new Float64Array(list.length);
  for (let i = 0; i < list.length; i++) {
    const v = 3 * edges[2 * list[i]];
    let code = 0;
    for (let axis = 0; axis < 3; axis++)
      code |= spread(Math.floor((positions[v + axis] - low[axis]) / cell)) << axis;
    keys[i] = code * list.length + i;
  }
  keys.sort();
  return Uint32Array.from(keys, (key) => list[key % list.length]);
}

/** The low ten bits, two free places between each. */
function spread(value: number): number {
  let bits = value & 1023;
  bits = (bits | (bits << 16)) & 0x30000ff;
  bits = (bits | (bits << 8)) & 0x300f00f;
  bits = (bits | (bits << 4)) & 0x30c30c3;
  return (bits | (bits << 2)) & 0x9249249;
}

/** About the sum of the unit directions, 3 numbers each, as wide as the furthest of them. */
function setCone(cones: Float64Array, at: number, directions: Float64Array): void {
  let [x, y, z] = [0, 0, 0];
  for (let i = 0; i < directions.length; i += 3) {
    x += directions[i];
    y += directions[i + 1];
    z += directions[i + 2];
  }
  const size = Math.sqrt(x * x + y * y + z * z);
  let least = 1;
  for (let i = 0; i < directions.length; i += 3)
    least = Math.min(least, (directions[i] * x + directions[i + 1] * y + directions[i + 2] * z) / size);
  least -= ROUNDING;
  const isNarrow = least > 0;
  cones[at] = isNarrow ? x / size : 0;
  cones[at + 1] = isNarrow ? y / size : 0;
  cones[at + 2] = isNarrow ? z / size : 0;
  cones[at + 3] = isNarrow ? Math.sqrt(1 - least * least) + ROUNDING : 2;
}
