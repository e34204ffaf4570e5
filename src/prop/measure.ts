/** Adapters: a glTF model or a shape → what is weighed and how far it reaches, in the source's own lengths. */

import type { Model } from "../gltf/model.js";
import { readSurfaces, type Surface } from "../gltf/surfaces.js";
import { RequestError } from "../math/request-error.js";
import type { Vec3 } from "../math/vec3.js";
import { type Density, densities } from "./density.js";
import { extremePoints } from "./extremes.js";
import type { MassProperties } from "./mass.js";
import { massOfSurfaces, type Solidity } from "./mass-of-surfaces.js";
import { shapeModel } from "./shape.js";
import { shapeReach, shapeSize } from "./shape-extent.js";
import { checkShape, type Shape } from "./shape-kind.js";
import { shapeMass } from "./shape-mass.js";
import { shapeMesh } from "./shape-mesh.js";
import { boxOf } from "./vertex.js";
import { type Triangles, weld } from "./weld.js";

export interface Measured {
  /** None for a mesh that is not a solid. */
  readonly body?: MassProperties;
  /** Bounding box, m. */
  readonly size: Vec3;
  /** 3 numbers a point. */
  readonly extremes: Float64Array;
  readonly warnings: readonly string[];
  /** Distance of the furthest point from a place, m. */
  reachFrom(place: Vec3): number;
}

/** How matter fills what is weighed; lengths are the source's own. */
export interface Matter extends Solidity {
  readonly density?: Density;
}

/**
 * The default scene, or its node of the index `top` with all below it.
 *
 * @param isStated all that weighing works out is stated: do without a body where there is none, and without warnings
 * @throws RequestError at ["model"] where there is nothing to weigh; at ["density", …]
 */
export async function measureModel(
  model: Model,
  matter: Matter,
  isStated: boolean,
  top?: number,
): Promise<Measured> {
  const { surfaces, warnings } = await readSurfaces(model, top);
  const meshes = surfaces.map((surface, owner) => weld([meshOf(surface, owner)]));
  const extremes = extremePoints(meshes);
  if (extremes.length === 0)
    throw top === undefined
      ? new RequestError(["model"], "has no triangles to weigh", "needs a mesh in its default scene")
      : new RequestError(["node"], "has no triangles to weigh", "needs a mesh in the node or below");
  const weighed = attempt(() => weighMeshes(meshes, surfaces, matter), isStated);
  return {
    body: weighed?.body,
    size: sizeOf(extremes),
    extremes,
    warnings: [...warnings, ...(isStated ? [] : weighed!.warnings)],
    reachFrom: (place) => furthestFrom(place, extremes),
  };
}

export async function measureShape(name: string, shape: Shape, matter: Matter): Promise<Measured> {
  checkShape(shape);
  const [kilograms] = densities([{ nodeName: name, materialName: name }], matter.density);
  if (!(kilograms > 0)) throw new RequestError(["density"], `is ${kilograms}`, "needs kg/m³ above 0");
  const { surfaces } = await readSurfaces(shapeModel(name, shape));
  const isHullOther = matter.solid === "hull" && ("ring" in shape || "tube" in shape);
  // In closed form where it is solid as it is, else as a fine mesh.
  const weighed =
    matter.solid === "surface" || isHullOther
      ? massOfSurfaces([weld([meshOf(fineMesh(shape), 0)])], [{ density: kilograms, label: name }], matter)
      : { body: shapeMass(shape, kilograms), warnings: [] };
  return {
    body: weighed.body,
    size: shapeSize(shape),
    extremes: extremePoints([weld(surfaces.map(meshOf))]),
    warnings: weighed.warnings,
    reachFrom: (place) => shapeReach(shape, place),
  };
}

/** So many corners round a circle that lengths, areas and volumes are right to about 1e-4. */
const FINE = 256;

function fineMesh(shape: Shape) {
  const { positions, indices } = shapeMesh(shape, FINE);
  return { positions: Float64Array.from(positions), triangles: Uint32Array.from(indices) };
}

const meshOf = (
  { positions, triangles }: Pick<Surface, "positions" | "triangles">,
  owner: number,
): Triangles => ({
  positions,
  triangles,
  owners: new Uint32Array(triangles.length / 3).fill(owner),
});

function weighMeshes(meshes: readonly Triangles[], surfaces: readonly Surface[], matter: Matter) {
  const perSurface = densities(surfaces, matter.density);
  const heavy = meshes.filter((_, i) => perSurface[i] !== 0);
  if (heavy.length === 0)
    throw new RequestError(["density"], "is 0 throughout", "needs something that weighs: kg/m³ above 0");
  const substances = surfaces.map((surface, i) => ({ density: perSurface[i], label: labelOf(surface) }));
  return massOfSurfaces(heavy, substances, matter);
}

function furthestFrom([x, y, z]: Vec3, points: Float64Array): number {
  let greatest = 0;
  for (let i = 0; i < points.length; i += 3) {
    const dx = points[i] - x;
    const dy = points[i + 1] - y;
    const dz = points[i + 2] - z;
    const square = dx * dx + dy * dy + dz * dz;
    if (square > greatest) greatest = square;
  }
  return Math.sqrt(greatest);
}

const labelOf = ({ nodeName, materialName }: Surface) =>
  `${nodeName ? `node "${nodeName}"` : "a node without a name"}${materialName ? `, material "${materialName}"` : ""}`;

function sizeOf(points: Float64Array): Vec3 {
  const { low, high } = boxOf(points);
  return [high[0] - low[0], high[1] - low[1], high[2] - low[2]];
}

/** The result; where the model may be at fault, undefined instead of its fault. */
function attempt<T>(work: () => T, mayFail: boolean): T | undefined {
  try {
    return work();
  } catch (error) {
    if (mayFail && error instanceof RequestError && error.path[0] === "model") return undefined;
    throw error;
  }
}
