import { add, cross, dot, length, normalize, scale, subtract, type Vec3, ZERO } from "../math/vec3.js";
import { solidIntegrals } from "./solid.js";
import type { Part } from "./split.js";
import { boxOf, diagonal, triangleArea, vertex } from "./vertex.js";

/** How much of the volume the caps may be wrong by, for their loops not being flat. */
const FLATNESS = 0.01;
/** Area of an opening over that of the part below which it is a crack: edges that lie on each other without being one. */
const CRACK = 1e-6;
/** Volume over (area × size) below which nothing is enclosed. */
const EMPTY = 1e-9;

/**
 * The part with its openings closed, each by a fan of triangles round its middle, where that states a volume: a fan over a
 * flat loop bounds exactly what a flat face does, and one over a loop that leaves its plane by d is wrong by at most d × its area,
 * which must be under 1 % of the volume altogether.
 *
 * @param cracksOnly close nothing but cracks
 * @returns undefined where the openings are not flat, or nothing is enclosed; `openings` are counted without cracks
 */
export function withCaps(
  part: Part,
  cracksOnly: boolean,
): { part: Part; openings: number; share: number } | undefined {
  const area = part.owners.reduce((sum, _, t) => sum + triangleArea(part.positions, part.triangles, t), 0);
  const loops = simpleLoops(part.rim).map((loop) =>
    openingOf(
      loop.map((v) => vertex(part.positions, v)),
      loop,
    ),
  );
  const openings = loops.filter((loop) => loop.area > CRACK * area);
  if (cracksOnly && openings.length > 0) return undefined;
  const capped = cap(part, loops);
  const volume = Math.abs(solidIntegrals(capped.positions, capped.triangles).volume);
  if (!(volume > EMPTY * area * diagonal(boxOf(part.positions)))) return undefined;
  if (loops.reduce((sum, loop) => sum + loop.error, 0) > FLATNESS * volume) return undefined;
  const capArea = openings.reduce((sum, loop) => sum + loop.area, 0);
  return { part: capped, openings: openings.length, share: capArea / (area + capArea) };
}

interface Opening {
  readonly loop: readonly number[];
  readonly middle: Vec3;
  /** Of the fan, m². */
  readonly area: number;
  /** Bound of what the fan's volume can be wrong by, m³. */
  readonly error: number;
}

function openingOf(corners: readonly Vec3[], loop: readonly number[]): Opening {
  const middle = scale(corners.reduce(add, ZERO), 1 / corners.length);
  const arms = corners.map((corner) => subtract(corner, middle));
  const faces = arms.map((arm, i) => scale(cross(arm, arms[(i + 1) % arms.length]), 0.5));
  const area = faces.reduce((sum, face) => sum + length(face), 0);
  const normal = normalize(faces.reduce(add, ZERO));
  const depth = arms.reduce((greatest, arm) => Math.max(greatest, Math.abs(dot(arm, normal))), 0);
  return { loop, middle, area, error: depth * area };
}

/** Closed loops that pass no vertex twice, of edges (pairs of vertices) that leave each vertex as often as they come to it. */
function simpleLoops(rim: readonly number[]): number[][] {
  const leaving = new Map<number, number[]>();
  for (let i = 0; i < rim.length; i += 2) {
    const ends = leaving.get(rim[i]);
    if (ends) ends.push(rim[i + 1]);
    else leaving.set(rim[i], [rim[i + 1]]);
  }
  const loops: number[][] = [];
  for (const start of leaving.keys()) {
    const path = [start];
    const at = new Map([[start, 0]]);
    while (path.length > 0) {
      const next = leaving.get(path[path.length - 1])!.pop();
      if (next === undefined) break;
      const before = at.get(next);
      if (before === undefined) {
        at.set(next, path.length);
        path.push(next);
        continue;
      }
      const loop = path.splice(before + 1);
      for (const v of loop) at.delete(v);
      loops.push([next, ...loop]);
    }
  }
  return loops;
}

function cap(part: Part, loops: readonly Opening[]): Part {
  const first = part.positions.length / 3;
  const positions = new Float64Array(part.positions.length + 3 * loops.length);
  positions.set(part.positions);
  const added: number[] = [];
  loops.forEach(({ loop, middle }, n) => {
    positions.set(middle, 3 * (first + n));
    // The edge the other way round closes it.
    loop.forEach((v, i) => {
      added.push(loop[(i + 1) % loop.length], v, first + n);
    });
  });
  const owners = new Uint32Array(part.owners.length + added.length / 3).fill(part.owners[0]);
  owners.set(part.owners);
  const triangles = new Uint32Array(part.triangles.length + added.length);
  triangles.set(part.triangles);
  triangles.set(added, part.triangles.length);
  return {
    positions,
    triangles,
    owners,
    openEdges: 0,
    contraryEdges: 0,
    crowdedEdges: part.crowdedEdges,
    rim: [],
  };
}
