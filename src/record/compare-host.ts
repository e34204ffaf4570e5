/** Whether two records of a take are in the axes and unit of different hosts: a record does not name its host. */

import { cross, distance, dot, length, scale, subtract, type Vec3, ZERO } from "../math/vec3.js";
import type { ClipRecord } from "./clip-record.js";

/** What two records of one motion may differ by, relative: they have twelve digits. */
const ROUNDING = 1e-9;

/** Says so, or answers undefined: gravity points along another axis, or every length is the same number of times another. */
export function hostChange(before: ClipRecord, now: ClipRecord): string | undefined {
  const old = gravity(before);
  const fresh = gravity(now);
  const product = length(old) * length(fresh);
  if (product === 0) return undefined;
  if (length(cross(old, fresh)) > ROUNDING * product || dot(old, fresh) < 0)
    return "is recorded in other axes (another host)";
  const factor = length(fresh) / length(old);
  const ratios = [
    length(now.release.velocity ?? ZERO) / length(before.release.velocity ?? ZERO),
    distance(now.release.centerOfMass, now.arrival.centerOfMass) /
      distance(before.release.centerOfMass, before.arrival.centerOfMass),
  ];
  const isScaled =
    Math.abs(factor - 1) > ROUNDING && ratios.every((r) => Math.abs(r / factor - 1) < ROUNDING);
  return isScaled ? "is recorded in another unit (another host)" : undefined;
}

/** In the host's axes and unit. */
export function gravity({ release, arrival, flight, parts }: ClipRecord): Vec3 {
  const { release: from, arrival: to, time } = parts?.[0] ?? { release, arrival, time: flight?.time ?? 1 };
  return scale(subtract(to.velocity ?? ZERO, from.velocity ?? ZERO), 1 / time);
}

/** A take that does not fall along -Y, so that the numbers are those of a host; none: as far as can be told, they are glTF's. */
export const fallsOtherwise = (clips: readonly ClipRecord[]): ClipRecord | undefined =>
  clips.find((clip) => {
    const [x, y, z] = gravity(clip);
    return length([x, Math.max(y, 0), z]) > 1e-6 * length([x, y, z]);
  });

/** s of flight, without holds. */
export const airtime = ({ flight, parts = [] }: ClipRecord): number =>
  flight?.time ?? parts.reduce((sum, { time }) => sum + time, 0);
