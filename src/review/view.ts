/** From which side a picture is drawn, without perspective: the same metre everywhere. */

import { fromMatrix, type Quat, rotate } from "../math/quat.js";
import { cross, dot, length, normalize, subtract, type Vec3 } from "../math/vec3.js";

export interface View {
  name: "side" | "above";
  /** Turns the world's axes onto the picture's: x to the right, y up, z to the viewer. */
  rotation: Quat;
}

const UP: Vec3 = [0, 1, 0];
/** Where a motion has no course of its own it is taken to face along +Z. */
const AHEAD: Vec3 = [0, 0, 1];

/** Across the course, which then runs from left to right; up is up. */
export const sideView = (ahead: Vec3): View => ({
  name: "side",
  rotation: fromMatrix([ahead, UP, cross(ahead, UP)]),
});

/** Down from above, the course from left to right, so that the thrower's left is up. */
export const viewFromAbove = (ahead: Vec3): View => ({
  name: "above",
  rotation: fromMatrix([ahead, cross(UP, ahead), UP]),
});

/** Picture's axes, m. */
export const inView = ({ rotation }: View, place: Vec3): Vec3 => rotate(rotation, place);

/** Level unit vector from the first place to the last, or where they lie over each other to the one furthest off; +Z where all do. */
export function courseOf(places: readonly Vec3[]): Vec3 {
  const first = places[0];
  const level = (place: Vec3): Vec3 => {
    const [x, , z] = subtract(place, first);
    return [x, 0, z];
  };
  const size = places.reduce((most, place) => Math.max(most, length(subtract(place, first))), 0);
  const whole = level(places[places.length - 1]);
  if (length(whole) > NO_COURSE * size) return normalize(whole);
  const furthest = places.map(level).reduce((a, b) => (length(b) > length(a) ? b : a));
  return length(furthest) > NO_COURSE * size ? normalize(furthest) : AHEAD;
}

/** Of its size: a motion that goes less far to one side goes up and down. */
const NO_COURSE = 0.02;

/** Whether places leave the upright plane along the course, through the first of them, by more than a share of their greatest extent along x, y or z. */
export function leavesPlane(places: readonly Vec3[], ahead: Vec3, share: number): boolean {
  const normal = cross(ahead, UP);
  const off = (place: Vec3) => Math.abs(dot(subtract(place, places[0]), normal));
  const extent = (axis: number) => {
    const values = places.map((place) => place[axis]);
    return values.reduce((a, b) => Math.max(a, b)) - values.reduce((a, b) => Math.min(a, b));
  };
  const most = places.reduce((greatest, place) => Math.max(greatest, off(place)), 0);
  return most > share * Math.max(extent(0), extent(1), extent(2));
}
