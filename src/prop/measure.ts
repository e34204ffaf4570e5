/** Adapters: a glTF model or a shape → what is weighed and how far it reaches, in the source's own lengths. */

import type { Model } from "../gltf/model.js";
import { readSurfaces, type Surface } from "../gltf/surfaces.js";
import { RequestError } from "../math/request-error.js";
import { distance, type Vec3 } from "../math/vec3.js";
import { findParts, type Part } from "./closed-parts.js";
import { type Density, densities } from "./density.js";
import { extremePoints } from "./extremes.js";
import type { MassProperties } from "./mass.js";
import { massOfParts, type Substance } from "./mass-of-parts.js";
import { shapeModel } from "./shape.js";
import { shapeReach, shapeSize } from "./shape-extent.js";
import { checkShape, type Shape } from "./shape-kind.js";
import { shapeMass } from "./shape-mass.js";
import { vertex } from "./vertex.js";

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

/**
 * The default scene, or its node of the index `top` with all below it, closed parts as solids.
 *
 * @param mayBeOpen do without a body where the mesh is none
 * @throws RequestError at ["model"] where there is nothing to weigh, or it is not closed; at ["density", …]
 */
export async function measureModel(
  model: Model,
  density: Density | undefined,
  mayBeOpen: boolean,
  top?: number,
): Promise<Measured> {
  const { surfaces, warnings } = await readSurfaces(model, top);
  const extremes = extremePoints(surfaces);
  if (extremes.length === 0)
    throw top === undefined
      ? new RequestError(["model"], "has no triangles to weigh", "needs a mesh in its default scene")
      : new RequestError(["node"], "has no triangles to weigh", "needs a mesh in the node or below");
  const weighed = attempt(() => weighSurfaces(surfaces, density), mayBeOpen);
  return {
    body: weighed?.body,
    size: sizeOf(extremes),
    extremes,
    warnings: [...warnings, ...(weighed?.warnings ?? [])],
    reachFrom(place) {
      let reach = 0;
      for (let i = 0; i < extremes.length / 3; i++)
        reach = Math.max(reach, distance(vertex(extremes, i), place));
      return reach;
    },
  };
}

export async function measureShape(
  name: string,
  shape: Shape,
  density: Density | undefined,
): Promise<Measured> {
  checkShape(shape);
  const [kilograms] = densities([{ nodeName: name, materialName: name }], density);
  if (!(kilograms > 0)) throw new RequestError(["density"], `is ${kilograms}`, "needs kg/m³ above 0");
  const { surfaces, warnings } = await readSurfaces(shapeModel(name, shape));
  return {
    body: shapeMass(shape, kilograms),
    size: shapeSize(shape),
    extremes: extremePoints(surfaces),
    warnings,
    reachFrom: (place) => shapeReach(shape, place),
  };
}

function weighSurfaces(all: readonly Surface[], density: Density | undefined) {
  const perSurface = densities(all, density);
  const heavy = (_: unknown, i: number) => perSurface[i] !== 0;
  const surfaces = all.filter(heavy);
  const substances: Substance[] = all
    .map((surface, i) => ({ density: perSurface[i], label: labelOf(surface) }))
    .filter(heavy);
  if (surfaces.length === 0)
    throw new RequestError(["density"], "is 0 throughout", "needs something that weighs: kg/m³ above 0");
  const { closed, open } = findParts(surfaces);
  if (open.length > 0) throw notClosed(open, substances);
  return massOfParts(closed, substances);
}

const labelOf = ({ nodeName, materialName }: Surface) =>
  `${nodeName ? `node "${nodeName}"` : "a node without a name"}${materialName ? `, material "${materialName}"` : ""}`;

function notClosed(open: readonly Part[], substances: readonly Substance[]): RequestError {
  const counts = new Map<string, { open: number; contrary: number }>();
  for (const part of open) {
    const { label } = substances[part.owners[0]];
    const count = counts.get(label) ?? { open: 0, contrary: 0 };
    counts.set(label, {
      open: count.open + part.openEdges,
      contrary: count.contrary + part.contraryEdges,
    });
  }
  const listed = [...counts].slice(0, 5).map(([label, count]) => {
    const faults = [
      ...(count.open ? [`${count.open} open edges`] : []),
      ...(count.contrary ? [`${count.contrary} edges between faces that face opposite ways`] : []),
    ];
    return `${faults.join(" and ")} in ${label}`;
  });
  const more = counts.size > 5 ? `; and ${counts.size - 5} more` : "";
  return new RequestError(
    ["model"],
    `is not closed: ${listed.join("; ")}${more}`,
    "close it (merge vertices, fill holes, make all faces point outwards), or use a shape, or state mass, centerOfMass and inertia; density 0 leaves a node or material out",
  );
}

function sizeOf(points: Float64Array): Vec3 {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  points.forEach((value, i) => {
    low[i % 3] = Math.min(low[i % 3], value);
    high[i % 3] = Math.max(high[i % 3], value);
  });
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
