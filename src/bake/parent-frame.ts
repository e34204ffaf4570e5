/** Flights as the parents of the animated node see them: its keys are in their frame. */

import type { Body } from "../clip/body.js";
import type { Track } from "../clip/track.js";
import { type Flight, fly } from "../flight/flight.js";
import type { MovedNode } from "../gltf/surfaces.js";
import { conjugate, multiply, rotateBack } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { scale, subtract, type Vec3 } from "../math/vec3.js";

/**
 * The keys of a node within the model: `cut` is given the same motions in the parents' frame, with the body as it lies about
 * the node's own origin and axes. The parents only turn, move and evenly scale, so all that is proved there holds in the world,
 * times their scale.
 *
 * @param factor on the whole model
 */
export function cutInParentFrame(
  flights: readonly Flight[],
  body: Body,
  toleranceMetres: number,
  { parent, position, rotation, name }: MovedNode,
  factor: number,
  cut: (flights: readonly Flight[], body: Body, tolerance: number) => Track,
): Track {
  const shrunk = 1 / parent.scale;
  const direction = (v: Vec3): Vec3 => scale(rotateBack(parent.rotation, v), shrunk);
  const seen = flights.map(({ launch }) =>
    fly({
      ...launch,
      centerOfMass: direction(subtract(launch.centerOfMass, parent.translation)),
      velocity: direction(launch.velocity),
      gravity: direction(launch.gravity),
      orientation: multiply(conjugate(parent.rotation), launch.orientation),
    }),
  );
  // World rotation of the model = orientation ∘ conjugate(axes); the node's in its parents = parent⁻¹ ∘ that ∘ its rest in the scene.
  const inNode: Body = {
    centerOfMass: scale(rotateBack(rotation, subtract(body.centerOfMass, scale(position, factor))), shrunk),
    axes: multiply(conjugate(rotation), body.axes),
    reach: body.reach * shrunk,
  };
  try {
    const track = cut(seen, inNode, toleranceMetres * shrunk);
    return { ...track, error: track.error * parent.scale };
  } catch (error) {
    if (!(error instanceof RequestError) || parent.scale === 1) throw error;
    const remedy = `${error.remedy} (in the frame of the parents of "${name}", where 1 m is ${parent.scale} m of the world)`;
    throw new RequestError(error.path, error.fault, remedy);
  }
}
