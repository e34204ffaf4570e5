/** The prop as one plain mesh of few triangles, for the many copies of it that are drawn at once. */

import {
  BoxGeometry,
  BufferAttribute,
  BufferGeometry,
  type InstancedMesh,
  Matrix4,
  type Mesh,
  type Object3D,
  Vector3,
} from "three";
import type { Vec3 } from "../../../math/vec3.js";
import type { StageProp } from "./input.js";
import { simplified, type TriangleMesh } from "./simplified.js";

export interface Body {
  /** About the centre of mass, model's axes, m. */
  geometry: BufferGeometry;
  triangles: number;
  /** Of the prop's own; none: it has no mesh, and this is a box. */
  ownTriangles: number;
  /** Outermost points, m about the centre of mass. */
  outer: Vec3[];
}

/**
 * @param content what moves with the prop
 * @param normals of each triangle, or shared by those that meet
 * @param matrix from the model as modelled, in m, to where it stands now
 */
export function bodyOf(
  content: Object3D,
  matrix: Matrix4,
  prop: StageProp,
  mostTriangles: number,
  normals: "flat" | "smooth",
): Body {
  const { centerOfMass: c } = prop;
  const toModel = new Matrix4().makeTranslation(-c[0], -c[1], -c[2]).multiply(matrix.clone().invert());
  const positions = trianglesBelow(content, toModel);
  const ownTriangles = positions.length / 9;
  const mesh = ownTriangles > 0 ? simplified(positions, mostTriangles) : boxOf(prop);
  let geometry = new BufferGeometry();
  geometry.setAttribute("position", new BufferAttribute(new Float32Array(mesh.positions), 3));
  geometry.setIndex(Array.from(mesh.triangles));
  if (normals === "flat") geometry = geometry.toNonIndexed();
  geometry.computeVertexNormals();
  geometry.computeBoundingSphere();
  return {
    geometry,
    triangles: mesh.triangles.length / 3,
    ownTriangles,
    outer: outermost(ownTriangles > 0 ? positions : mesh.positions),
  };
}

/** Three corners a triangle. */
function trianglesBelow(content: Object3D, toModel: Matrix4): Float64Array {
  const corners: number[] = [];
  const corner = new Vector3();
  content.traverse((object) => {
    const mesh = object as Mesh;
    const position = mesh.isMesh ? mesh.geometry.getAttribute("position") : undefined;
    if (!position) return;
    const { index } = mesh.geometry;
    const count = index?.count ?? position.count;
    for (const matrix of placesOf(mesh, toModel))
      for (let i = 0; i + 2 < count; i += 3)
        for (let k = i; k < i + 3; k++) {
          mesh.getVertexPosition(index ? index.getX(k) : k, corner).applyMatrix4(matrix);
          corners.push(corner.x, corner.y, corner.z);
        }
  });
  return new Float64Array(corners);
}

function placesOf(mesh: Mesh, toModel: Matrix4): Matrix4[] {
  const place = toModel.clone().multiply(mesh.matrixWorld);
  if (!("isInstancedMesh" in mesh)) return [place];
  const instanced = mesh as unknown as InstancedMesh;
  return Array.from({ length: instanced.count }, (_, i) => {
    const own = new Matrix4();
    instanced.getMatrixAt(i, own);
    return place.clone().multiply(own);
  });
}

/** A box of the prop's size, or of its reach. */
function boxOf({ size, middle, centerOfMass: c, reach }: StageProp): TriangleMesh {
  const edge = reach * 1.15;
  const box = new BoxGeometry(...((size ?? [edge, edge, edge]) as [number, number, number]));
  const mesh = {
    positions: Float64Array.from(
      box.getAttribute("position").array,
      (value, i) => value + (middle ?? c)[i % 3] - c[i % 3],
    ),
    triangles: new Uint32Array(box.index!.array),
  };
  box.dispose();
  return mesh;
}

/** The furthest in each direction of a 3 × 3 × 3 block's outer cells. */
function outermost(positions: Float64Array): Vec3[] {
  const signs = [-1, 0, 1];
  const directions = signs.flatMap((x) => signs.flatMap((y) => signs.map((z): Vec3 => [x, y, z])));
  return directions.flatMap(([x, y, z]) => {
    if (x === 0 && y === 0 && z === 0) return [];
    let best = 0;
    let furthest = Number.NEGATIVE_INFINITY;
    for (let i = 0; i < positions.length; i += 3) {
      const along = x * positions[i] + y * positions[i + 1] + z * positions[i + 2];
      if (along > furthest) [furthest, best] = [along, i];
    }
    return [[positions[best], positions[best + 1], positions[best + 2]] as Vec3];
  });
}
