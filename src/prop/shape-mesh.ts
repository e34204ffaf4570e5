import { cos, hypot, sin } from "../math/elementary.js";
import type { Vec3 } from "../math/vec3.js";
import type { Shape } from "./shape-kind.js";

/** A closed mesh, counter-clockwise from outside; vertices are split where normals or UVs are. */
export interface ShapeMesh {
  /** 3 numbers a vertex, m. */
  positions: number[];
  /** Unit, 3 numbers a vertex. */
  normals: number[];
  /** 2 numbers a vertex. */
  uvs: number[];
  /** 3 a triangle. */
  indices: number[];
}

/**
 * The mesh of a shape: corners lie on the ideal surface, so that a round one is a little smaller.
 *
 * @param around edges round an axis, a multiple of 8; half as many from pole to pole and round the tube of a ring
 */
export function shapeMesh(shape: Shape, around = 32): ShapeMesh {
  const along = around / 2;
  const turned = (...profiles: Profile[]) => lathe(profiles, around);
  if ("box" in shape) return boxMesh(shape.box);
  if ("sphere" in shape) return turned(ball(shape.sphere, 0, 0, along, along));
  if ("ellipsoid" in shape) return stretch(turned(ball(1, 0, 0, along, along)), shape.ellipsoid);
  if ("ring" in shape) return turned(tubeRound(shape.ring.radius, shape.ring.thickness / 2, along));
  if ("tube" in shape) return turned(...tubeProfile(shape.tube.outer, shape.tube.inner, shape.tube.length));
  if ("cylinder" in shape) return turned(...cylinderProfile(shape.cylinder.radius, shape.cylinder.length));
  if ("disc" in shape) return turned(...cylinderProfile(shape.disc.radius, shape.disc.thickness));
  if ("cone" in shape) return turned(...coneProfile(shape.cone.radius, shape.cone.length));
  return turned(capsuleProfile(shape.capsule.radius, shape.capsule.length, along));
}

/** A point of a profile: radius, height, and the normal's share of both. */
type ProfilePoint = readonly [radius: number, height: number, outwards: number, upwards: number];

/** A smooth piece of a profile, from below to above where it faces outwards (the surface lies to the right of the way). */
type Profile = readonly ProfilePoint[];

const line = (from: readonly [number, number], to: readonly [number, number]): Profile => {
  const run = to[0] - from[0];
  const rise = to[1] - from[1];
  const l = hypot(run, rise);
  return [
    [from[0], from[1], rise / l, -run / l],
    [to[0], to[1], rise / l, -run / l],
  ];
};

const cylinderProfile = (radius: number, length: number): Profile[] => [
  line([0, -length / 2], [radius, -length / 2]),
  line([radius, -length / 2], [radius, length / 2]),
  line([radius, length / 2], [0, length / 2]),
];

const tubeProfile = (outer: number, inner: number, length: number): Profile[] => [
  line([inner, -length / 2], [outer, -length / 2]),
  line([outer, -length / 2], [outer, length / 2]),
  line([outer, length / 2], [inner, length / 2]),
  line([inner, length / 2], [inner, -length / 2]),
];

const coneProfile = (radius: number, length: number): Profile[] => [
  line([0, -length / 2], [radius, -length / 2]),
  line([radius, -length / 2], [0, length / 2]),
];

const capsuleProfile = (radius: number, length: number, along: number): Profile => {
  const half = length / 2 - radius;
  const lower = ball(radius, -half, 0, along / 2, along);
  const upper = ball(radius, half, along / 2, along, along);
  return half > 0 ? [...lower, ...upper] : [...lower, ...upper.slice(1)];
};

/** The steps `first` to `last` of a half circle of `along` steps from the lower to the upper pole. */
function ball(radius: number, height: number, first: number, last: number, along: number): Profile {
  return Array.from({ length: last - first + 1 }, (_, i) => {
    const [outwards, upwards] = onCircle(first + i - along / 2, 2 * along);
    return [radius * outwards, height + radius * upwards, outwards, upwards];
  });
}

function tubeRound(radius: number, thickness: number, along: number): Profile {
  return Array.from({ length: along + 1 }, (_, i) => {
    const [outwards, upwards] = onCircle(i - along / 2, along);
    return [radius + thickness * outwards, thickness * upwards, outwards, upwards];
  });
}

/**
 * Cosine and sine of `step` / `steps` of a whole turn (`steps` a multiple of 4), from the first eighth by symmetry: the same
 * point to the last bit wherever a circle comes round to it, and meshes as symmetric as their shapes.
 */
function onCircle(step: number, steps: number): readonly [number, number] {
  const quarter = steps / 4;
  const n = ((step % steps) + steps) % steps;
  const k = n % quarter;
  const eighth = (j: number) => (2 * Math.PI * j) / steps;
  const [c, s] =
    2 * k <= quarter
      ? [cos(eighth(k)), 2 * k === quarter ? cos(eighth(k)) : sin(eighth(k))]
      : [sin(eighth(quarter - k)), cos(eighth(quarter - k))];
  return [
    [c, s],
    [-s, c],
    [-c, -s],
    [s, -c],
  ][(n / quarter) | 0] as [number, number];
}

/** Profiles turned round +Y; each has a band of the texture of its own. */
function lathe(profiles: readonly Profile[], around: number): ShapeMesh {
  const mesh: ShapeMesh = { positions: [], normals: [], uvs: [], indices: [] };
  profiles.forEach((profile, band) => {
    const lengths = [0];
    for (let i = 1; i < profile.length; i++)
      lengths.push(
        lengths[i - 1] + hypot(profile[i][0] - profile[i - 1][0], profile[i][1] - profile[i - 1][1]),
      );
    const base = mesh.positions.length / 3;
    profile.forEach(([radius, height, outwards, upwards], row) => {
      for (let column = 0; column <= around; column++) {
        const [c, s] = onCircle(column, around);
        // From above, +Z turns towards +X: counter-clockwise, as +Y points to the viewer.
        mesh.positions.push(radius * s, height, radius * c);
        mesh.normals.push(outwards * s, upwards, outwards * c);
        const v = (band + lengths[row] / lengths[profile.length - 1]) / profiles.length;
        mesh.uvs.push(column / around, 1 - v);
      }
    });
    for (let row = 0; row + 1 < profile.length; row++)
      for (let column = 0; column < around; column++) {
        const a = base + row * (around + 1) + column;
        const above = a + around + 1;
        // Where the profile ends on the axis, one of the two triangles has no area.
        if (profile[row][0] > 0) mesh.indices.push(a, a + 1, above);
        if (profile[row + 1][0] > 0) mesh.indices.push(a + 1, above + 1, above);
      }
  });
  return mesh;
}

/** A mesh round the origin with its axes stretched by `factors`; normals go the other way. */
function stretch(mesh: ShapeMesh, factors: Vec3): ShapeMesh {
  const positions = mesh.positions.map((value, i) => value * factors[i % 3]);
  const normals: number[] = [];
  for (let i = 0; i < mesh.normals.length; i += 3) {
    const n = [0, 1, 2].map((k) => mesh.normals[i + k] / factors[k]);
    const l = hypot(n[0], n[1], n[2]);
    normals.push(n[0] / l, n[1] / l, n[2] / l);
  }
  return { ...mesh, positions, normals };
}

function boxMesh(edges: Vec3): ShapeMesh {
  const mesh: ShapeMesh = { positions: [], normals: [], uvs: [], indices: [] };
  for (let axis = 0; axis < 3; axis++)
    for (const side of [1, -1]) {
      // u × v = side · axis
      const u = (axis + (side > 0 ? 1 : 2)) % 3;
      const v = (axis + (side > 0 ? 2 : 1)) % 3;
      const base = mesh.positions.length / 3;
      for (const [alongU, alongV] of [
        [-1, -1],
        [1, -1],
        [1, 1],
        [-1, 1],
      ]) {
        const corner = [0, 0, 0];
        corner[axis] = (side * edges[axis]) / 2;
        corner[u] = (alongU * edges[u]) / 2;
        corner[v] = (alongV * edges[v]) / 2;
        const normal = [0, 0, 0];
        normal[axis] = side;
        mesh.positions.push(...corner);
        mesh.normals.push(...normal);
        mesh.uvs.push((alongU + 1) / 2, (1 - alongV) / 2);
      }
      mesh.indices.push(base, base + 1, base + 2, base, base + 2, base + 3);
    }
  return mesh;
}
