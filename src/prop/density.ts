import type { Surface } from "../gltf/surfaces.js";
import { nearestName } from "../math/nearest-name.js";
import { RequestError } from "../math/request-error.js";

/** kg/m³: one number, or a map from material name, else node name; `default` for the rest. */
export type Density = number | Readonly<Record<string, number>>;

/** Water's, kg/m³. */
const USUAL = 1000;

/**
 * Density of each surface, kg/m³; 0 leaves it out of the weighing.
 *
 * @throws RequestError at ["density", NAME] for a name that no surface goes by
 */
export function densities(
  surfaces: readonly Pick<Surface, "nodeName" | "materialName">[],
  density: Density = USUAL,
): number[] {
  if (typeof density === "number") return surfaces.map(() => density);
  const names = new Set(surfaces.flatMap(({ materialName, nodeName }) => [materialName, nodeName]));
  names.delete("");
  const stated = (name: string) => (Object.hasOwn(density, name) ? density[name] : undefined);
  for (const name of Object.keys(density))
    if (name !== "default" && !names.has(name))
      throw new RequestError(
        ["density", name],
        `no material or node is called "${name}"`,
        names.size > 0
          ? `nearest is "${nearestName(name, [...names])}"`
          : "the model has no names: state one number",
      );
  return surfaces.map(
    ({ materialName, nodeName }) => stated(materialName) ?? stated(nodeName) ?? stated("default") ?? USUAL,
  );
}
