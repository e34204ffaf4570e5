/**
 * Principal moments and axes, made so that they do not hang on rounding: moments that differ by no more than rounding
 * are made equal, and axes that the body leaves open are taken nearest the model's own.
 */

import { eigenSymmetric } from "../math/eigen.js";
import { type Mat3, transpose } from "../math/mat3.js";
import { fromMatrix, type Quat } from "../math/quat.js";
import { addScaled, cross, dot, length, negate, normalize, type Vec3 } from "../math/vec3.js";

export interface Principal {
  /** Ascending, kg m². */
  readonly moments: Vec3;
  /** Turns x, y, z onto long, middle, short (model's frame). */
  readonly axes: Quat;
}

/** Unit directions in the model's frame, right-handed: short = long × middle. */
export interface AxisNames {
  readonly long: Vec3;
  readonly middle: Vec3;
  readonly short: Vec3;
}

/** Relative difference of moments that rounding makes: below it they are one moment. */
const ROUNDING = 1e-9;
/** Relative difference below which two moments count as equal for the names of the axes. */
export const NAMES_TIE = 0.01;
/** Sine of the angle below which an axis lies on one of the model's. */
const SNAP = 1e-12;
/** Components this near to each other are a tie, settled by the order x, y, z. */
const COMPONENT_TIE = 1e-9;

/** The exact axes, for the motion. `inertia` is the tensor about the centre of mass, kg m². */
export function principalAxes(inertia: Mat3): Principal {
  const { values, vectors } = eigenSymmetric(inertia);
  const groups = tieGroups(values, ROUNDING);
  const { long, middle, short } = settle(vectors, groups);
  const moments = [...values];
  for (const group of groups) {
    let sum = 0;
    for (const i of group) sum += values[i];
    // (a + a + a) / 3 can differ from a in the last digit; no matter, the three are the same number.
    for (const i of group) moments[i] = group.length === 1 ? values[i] : sum / group.length;
  }
  return {
    moments: [moments[0], moments[1], moments[2]],
    axes: fromMatrix(transpose([long, middle, short])),
  };
}

/** What `long`, `middle` and `short` mean as directions: moments within 1 % count as equal. */
export function axisNames(inertia: Mat3): AxisNames {
  const { values, vectors } = eigenSymmetric(inertia);
  return settle(vectors, tieGroups(values, NAMES_TIE));
}

/**
 * Which of three ascending moments count as equal: [[0], [1], [2]], [[0, 1], [2]], [[0], [1, 2]] or [[0, 1, 2]]. Where
 * the middle one is near both, but they are not near each other, it goes with the nearer.
 */
export function tieGroups(moments: Vec3, tolerance: number): number[][] {
  const gap = (i: number, j: number) => (moments[j] - moments[i]) / moments[j];
  if (gap(0, 2) <= tolerance) return [[0, 1, 2]];
  const lower = gap(0, 1);
  const upper = gap(1, 2);
  if (lower <= tolerance && lower <= upper) return [[0, 1], [2]];
  if (upper <= tolerance) return [[0], [1, 2]];
  return [[0], [1], [2]];
}

/** Unit eigenvectors of ascending moments → long, middle, short with ties and signs settled. */
function settle(vectors: Mat3, groups: number[][]): AxisNames {
  if (groups.length === 1) return { long: [1, 0, 0], middle: [0, 1, 0], short: [0, 0, 1] };
  const axes: Vec3[] = [...vectors];
  const pair = groups.find((group) => group.length === 2);
  if (pair) {
    const single = pair[0] === 0 ? 2 : 0;
    axes[single] = snap(vectors[single]);
    [axes[pair[0]], axes[pair[1]]] = nearestPair(axes[single]);
  }
  for (let i = 0; i < 3; i++) {
    const snapped = snap(axes[i]);
    if (snapped === axes[i]) continue;
    axes[i] = snapped;
    for (let j = 0; j < 3; j++) if (j !== i) axes[j] = squareTo(axes[j], snapped);
  }
  const long = upright(axes[0]);
  const middle = upright(squareTo(axes[1], long));
  return { long, middle, short: snap(cross(long, middle)) };
}

/**
 * Two axes square to `normal` and to each other: one along the model axis that lies nearest to the plane (made to lie in
 * it), the other square to it; first the one nearer x, then y, then z.
 */
function nearestPair(normal: Vec3): [Vec3, Vec3] {
  // A model axis' part in the plane is the longest where its part along the normal is the shortest.
  let nearest = 0;
  for (let i = 1; i < 3; i++)
    if (Math.abs(normal[i]) < Math.abs(normal[nearest]) - COMPONENT_TIE) nearest = i;
  const modelAxis: Vec3 = [nearest === 0 ? 1 : 0, nearest === 1 ? 1 : 0, nearest === 2 ? 1 : 0];
  const along = squareTo(modelAxis, normal);
  const across = normalize(cross(normal, along));
  return greatestComponent(across) < nearest ? [across, along] : [along, across];
}

/** The unit vector of `v` less its part along the unit vector `axis`. */
const squareTo = (v: Vec3, axis: Vec3): Vec3 => normalize(addScaled(v, axis, -dot(v, axis)));

/** The model axis that `v` lies on to rounding, or else `v` itself. */
function snap(v: Vec3): Vec3 {
  const i = greatestComponent(v);
  const rest: Vec3 = [i === 0 ? 0 : v[0], i === 1 ? 0 : v[1], i === 2 ? 0 : v[2]];
  if (length(rest) > SNAP) return v;
  const unit = v[i] < 0 ? -1 : 1;
  return [i === 0 ? unit : 0, i === 1 ? unit : 0, i === 2 ? unit : 0];
}

/** Signed so that the greatest component is positive. */
const upright = (v: Vec3): Vec3 => (v[greatestComponent(v)] < 0 ? negate(v) : v);

/** Index of the component of greatest size; of equals the first. */
function greatestComponent(v: Vec3): number {
  const greatest = Math.max(Math.abs(v[0]), Math.abs(v[1]), Math.abs(v[2]));
  return v.findIndex((component) => Math.abs(component) >= greatest - COMPONENT_TIE);
}
