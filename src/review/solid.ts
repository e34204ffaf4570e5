import type { Model } from "../gltf/model.js";
import { readSurfaces } from "../gltf/surfaces.js";
import { after, eachEdge } from "../prop/edges.js";
import type { Prop } from "../prop/prop.js";
import { weld } from "../prop/weld.js";
import { type EdgeGroups, edgeGroups } from "./edge-groups.js";

/** A prop's surface made ready to be drawn from any side. */
export interface Solid {
  /** 3 numbers a vertex, m, about the centre of mass, the model's axes. */
  readonly positions: Float64Array;
  /** 3 vertex numbers a triangle. */
  readonly triangles: Uint32Array;
  /** 3 numbers a triangle: at right angles to it, as long as twice its area, m². */
  readonly normals: Float64Array;
  /** 2 vertex numbers an edge. */
  readonly edges: Uint32Array;
  /** Where the triangles of each edge start in `sides`; one number more than there are edges. */
  readonly starts: Uint32Array;
  /** The triangles that meet at the edges: t where it runs along the edge as `edges` does, ~t where it runs against it. */
  readonly sides: Int32Array;
  /** Of a mesh of very many edges. */
  readonly groups?: EdgeGroups;
}

/** With so many edges it pays to put them into groups. */
const MANY_EDGES = 30_000;

/** The surface of the model, or of the node of it that is the prop, in its rest pose: m, about the centre of mass, the model's axes. */
export async function solidOf(
  model: Model,
  prop: Pick<Prop, "scale" | "centerOfMass" | "node">,
): Promise<Solid> {
  const { surfaces } = await readSurfaces(model, prop.node?.index);
  const welded = weld(
    surfaces.map(({ positions, triangles }, owner) => ({
      positions,
      triangles,
      owners: new Uint32Array(triangles.length / 3).fill(owner),
    })),
  );
  const positions = welded.positions.map((value, i) => value * prop.scale - prop.centerOfMass[i % 3]);
  const solid = {
    positions,
    triangles: welded.triangles,
    normals: normalsOf(positions, welded.triangles),
    ...edgesOf(welded.triangles, positions.length / 3),
  };
  return solid.edges.length > 2 * MANY_EDGES ? { ...solid, groups: edgeGroups(solid) } : solid;
}

function normalsOf(positions: Float64Array, triangles: Uint32Array): Float64Array {
  const normals = new Float64Array(triangles.length);
  for (let t = 0; t < triangles.length; t += 3) {
    const a = 3 * triangles[t];
    const b = 3 * triangles[t + 1];
    const c = 3 * triangles[t + 2];
    const ux = positions[b] - positions[a];
    const uy = positions[b + 1] - positions[a + 1];
    const uz = positions[b + 2] - positions[a + 2];
    const vx = positions[c] - positions[a];
    const vy = positions[c + 1] - positions[a + 1];
    const vz = positions[c + 2] - positions[a + 2];
    normals[t] = uy * vz - uz * vy;
    normals[t + 1] = uz * vx - ux * vz;
    normals[t + 2] = ux * vy - uy * vx;
  }
  return normals;
}

function edgesOf(triangles: Uint32Array, vertexCount: number): Pick<Solid, "edges" | "starts" | "sides"> {
  const edges = new Uint32Array(2 * triangles.length);
  const starts = new Uint32Array(triangles.length + 1);
  const sides = new Int32Array(triangles.length);
  let edge = 0;
  let side = 0;
  eachEdge(triangles, vertexCount, (first, link) => {
    const from = triangles[first];
    edges[2 * edge] = from;
    edges[2 * edge + 1] = triangles[after(first)];
    for (let h = first; h >= 0; h = link[h]) {
      const triangle = (h / 3) | 0;
      sides[side++] = triangles[h] === from ? triangle : ~triangle;
    }
    starts[++edge] = side;
  });
  return { edges: edges.slice(0, 2 * edge), starts: starts.slice(0, edge + 1), sides };
}
