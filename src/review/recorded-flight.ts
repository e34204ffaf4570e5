/** What the extras of a clip that tossbake baked say of it: where its centre of mass goes, and when it flies. */

import type { RigidClip } from "../gltf/rigid-clip.js";
import { rotateBack } from "../math/quat.js";
import { distance, scale, subtract, type Vec3, ZERO } from "../math/vec3.js";
import type { NodePose } from "./clip-motion.js";
import type { SheetFlight } from "./sheet-input.js";

/** What is read of them. */
interface Flown {
  throw?: unknown;
  release: { centerOfMass: Vec3 };
  arrival: { centerOfMass: Vec3 };
  flight: { start: number; time: number };
}

/** Keys hold the true motion to a tolerance: of the way from the node to the centre of mass, and m. */
const SLACK = { share: 0.01, metres: 0.002 };

/**
 * The centre of mass in the node's frame, and whether another place is as near to what the extras say. Undefined where they say nothing, or what does
 * not go with the keys: another program's, or those of a host with other axes.
 */
export function recordedCenter(
  extras: unknown,
  { path }: RigidClip,
  pose: (t: number) => NodePose,
): { place: Vec3; fits(place: Vec3): boolean } | undefined {
  const flights = flightsOf(extras);
  if (flights.length === 0) return undefined;
  // turned about its centre of mass alone, wherever that is said to fly
  const turnsAlone = path.every(({ translation }) => translation === undefined);
  const seen = turnsAlone ? [ZERO] : flights.flatMap((flown) => centersOf(flown, pose));
  const sum = seen.reduce((sum, [x, y, z]): Vec3 => [sum[0] + x, sum[1] + y, sum[2] + z], ZERO);
  const place = scale(sum, 1 / seen.length);
  const fits = (other: Vec3) =>
    seen.every((center) => distance(center, other) <= SLACK.metres + SLACK.share * distance(center, ZERO));
  return fits(place) ? { place, fits } : undefined;
}

/** When it flies, and what the throws are called; undefined where the extras do not say so, or not of this clip. */
export function recordedFlights(extras: unknown, duration: number): SheetFlight[] | undefined {
  let end = 0;
  const flights = flightsOf(extras).map(({ throw: name, flight: { start, time } }): SheetFlight => {
    const isNext = start >= end - INSTANT && time > 0;
    end = isNext ? start + time : Number.NaN;
    return { ...(typeof name === "string" && { name }), from: start, to: Math.min(duration, start + time) };
  });
  return flights.length > 0 && end <= duration + INSTANT ? flights : undefined;
}

/** s: clips' ends are rounded to float32. */
const INSTANT = 1e-4;

function centersOf({ release, arrival, flight }: Flown, pose: (t: number) => NodePose): Vec3[] {
  const seenFrom = ({ place, rotation }: NodePose, center: Vec3) =>
    rotateBack(rotation, subtract(center, place));
  return [
    seenFrom(pose(flight.start), release.centerOfMass),
    seenFrom(pose(flight.start + flight.time), arrival.centerOfMass),
  ];
}

function flightsOf(extras: unknown): Flown[] {
  const parts = extras instanceof Object && "parts" in extras ? extras.parts : [extras];
  return Array.isArray(parts) && parts.length > 0 && parts.every(isFlown) ? parts : [];
}

function isFlown(value: unknown): value is Flown {
  const { release, arrival, flight } = (value ?? {}) as Partial<Flown>;
  return (
    [release, arrival].every((state) => {
      const place: unknown = state?.centerOfMass;
      return Array.isArray(place) && place.length === 3 && place.every(Number.isFinite);
    }) && [flight?.start, flight?.time].every(Number.isFinite)
  );
}
