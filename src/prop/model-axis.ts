import { atan2 } from "../math/elementary.js";
import { length, type Vec3 } from "../math/vec3.js";

/** A direction as seen from the model's own axes. */
export interface ModelAxis {
  /** The nearest one. */
  readonly axis: "x" | "y" | "z" | "-x" | "-y" | "-z";
  /** How far off it is. */
  readonly degrees: number;
}

/** The model's axis that lies nearest to a direction; of equals the first. */
export function nearestModelAxis(direction: Vec3): ModelAxis {
  const greatest = Math.max(...direction.map(Math.abs));
  const i = direction.findIndex((component) => Math.abs(component) >= greatest);
  const rest: Vec3 = [i === 0 ? 0 : direction[0], i === 1 ? 0 : direction[1], i === 2 ? 0 : direction[2]];
  return {
    axis: (direction[i] < 0 ? (["-x", "-y", "-z"] as const) : (["x", "y", "z"] as const))[i],
    degrees: (atan2(length(rest), greatest) * 180) / Math.PI,
  };
}
