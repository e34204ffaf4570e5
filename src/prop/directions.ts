import { nearestName } from "../math/nearest-name.js";
import { RequestError } from "../math/request-error.js";
import { length, negate, normalize, subtract, type Vec3 } from "../math/vec3.js";
import type { Prop } from "./prop.js";

/**
 * The unit vector, in the model's frame, of a direction of the prop: `long`, `middle`, `short`, `x`, `y`, `z`, a named point
 * (from the centre of mass towards it), any of these with a leading `-`, or a vector.
 *
 * @throws RequestError, path empty, for a name that is no direction, a point at the centre of mass and the zero vector
 */
export function propDirection(prop: Prop, direction: string | Vec3): Vec3 {
  if (typeof direction !== "string") {
    if (length(direction) > 0) return normalize(direction);
    throw new RequestError([], "[0, 0, 0] points nowhere", "needs a vector with a length");
  }
  return direction.startsWith("-") ? negate(named(prop, direction.slice(1))) : named(prop, direction);
}

const MODEL_AXES: Readonly<Record<string, Vec3>> = { x: [1, 0, 0], y: [0, 1, 0], z: [0, 0, 1] };

/** Distance from the centre of mass, as a share of the reach, below which a point is no direction. */
const NOWHERE = 1e-9;

function named(prop: Prop, name: string): Vec3 {
  if (name === "long" || name === "middle" || name === "short") return prop.names[name];
  if (Object.hasOwn(MODEL_AXES, name)) return MODEL_AXES[name];
  if (!Object.hasOwn(prop.points, name)) throw unknown(prop, name);
  const arm = subtract(prop.points[name].position, prop.centerOfMass);
  if (length(arm) > NOWHERE * prop.reach) return normalize(arm);
  throw new RequestError(
    [],
    `the point "${name}" of "${prop.name}" lies at the centre of mass`,
    "needs a point off it, or another direction",
  );
}

function unknown(prop: Prop, name: string): RequestError {
  const names = ["long", "middle", "short", "x", "y", "z", ...Object.keys(prop.points)];
  return new RequestError(
    [],
    `"${name}" is no direction of "${prop.name}"`,
    `nearest is "${nearestName(name, names)}"; there are ${names.join(", ")}, each also with a leading -, and [x, y, z]`,
  );
}
