/** The room that the takes of a throw fill. */

import { Vector3 } from "three";
import type { Framing } from "./camera-rig.js";
import type { Course } from "./course.js";
import type { GridPlace } from "./grid.js";
import type { Room } from "./surroundings.js";

const SAMPLES = 24;

export interface Setting {
  framing: Framing;
  grid: GridPlace;
  room: Room;
}

/** @param course the one that is looked at: the picture lies along it, but all of the others have room */
export function settingOf(course: Course, all: readonly (Course | undefined)[]): Setting {
  const { prop } = course;
  const points = all.flatMap((each) => (each ? placesOf(each) : []));
  for (const { release, arrival, floor } of course.take.motion.parts) {
    for (const { asked } of [release, arrival])
      if (asked && !course.turnsAlone) points.push(new Vector3(...asked));
    if (floor !== undefined) points.push(new Vector3(points[0].x, floor, points[0].z));
  }
  const low = points[0].clone();
  const high = points[0].clone();
  for (const point of points) {
    low.min(point);
    high.max(point);
  }
  const ahead = headingOf(placesOf(course));
  const size = low.distanceTo(high);
  const origin = course.place(0, prop.centerOfMass);
  origin.y = groundBelow(course, low.y - prop.reach);
  const room = new Vector3(1, 0, 1).multiplyScalar(prop.reach + 0.15 * size);
  const isNear = low.y - origin.y < 0.6 * size;
  const ground = isNear ? [low, high].map(({ x, z }) => new Vector3(x, origin.y, z)) : [];
  return {
    framing: { points, ground, reach: prop.reach, heading: Math.atan2(ahead.x, ahead.z) },
    grid: { origin, ahead, points },
    room: { low: low.sub(room), high: high.add(room) },
  };
}

function placesOf(course: Course): Vector3[] {
  const way = course.way(course.prop.centerOfMass, SAMPLES);
  return Array.from({ length: SAMPLES }, (_, i) => new Vector3().fromArray(way, 3 * i));
}

/** The floor that was asked for, the world's ground, or the next half metre below everything. */
function groundBelow({ take, prop }: Course, lowest: number): number {
  const floor = take.motion.parts.find((part) => part.floor !== undefined)?.floor;
  if (floor !== undefined) return floor;
  return lowest >= -2 * prop.reach ? 0 : Math.floor(2 * lowest) / 2;
}

/** Level direction from the first place to the last; where these are one, the way's longest direction, forwards. */
function headingOf(places: readonly Vector3[]): Vector3 {
  const level = (from: Vector3, to: Vector3) => new Vector3(to.x - from.x, 0, to.z - from.z);
  const whole = level(places[0], places[places.length - 1]);
  let longest = whole;
  for (const place of places) {
    const way = level(places[0], place);
    if (way.length() > longest.length()) longest = way;
  }
  const ahead = whole.length() > 0.3 * longest.length() ? whole : longest;
  return ahead.length() > 1e-3 ? ahead.normalize() : new Vector3(0, 0, 1);
}
