/** What scale is read by: behind the views from the sides and above, squares in the plane of the picture; in the others, squares on the ground. */

import { Group, type Sprite, Vector3 } from "three";
import type { CameraRig } from "./camera-rig.js";
import type { Labels } from "./labels.js";
import { niceNumber, niceStep } from "./nice-step.js";
import type { Palette } from "./palette.js";
import { discard, strokes } from "./strokes.js";

export interface GridPlace {
  /** Where lengths are counted from, and the height of the ground. */
  origin: Vector3;
  /** Of the flight, level. */
  ahead: Vector3;
  /** What the ground has to reach round. */
  points: readonly Vector3[];
}

/** px between two lines at least. */
const LEAST = 70;
const MOST_LINES = 60;

interface Axis {
  direction: Vector3;
  low: number;
  high: number;
  /** Counted along `direction` from here. */
  zero: number;
}

export class Grid {
  readonly group = new Group();
  readonly #labels: Labels;
  #sprites: Sprite[] = [];
  #key = "";

  constructor(labels: Labels) {
    this.#labels = labels;
  }

  /** Before each picture; does nothing while it looks at the same. */
  fit(rig: CameraRig, place: GridPlace, colors: Palette): void {
    const plane = rig.isFlat ? pictureAxes(rig, place) : groundAxes(place);
    const step = rig.isFlat
      ? niceStep((LEAST * rig.span) / rig.height)
      : niceStep(Math.max(...plane.axes.map(({ low, high }) => high - low)) / 10);
    const key = JSON.stringify([rig.view, step, plane.axes, plane.base, colors.grid]);
    if (key === this.#key) return;
    this.clear();
    this.#key = key;
    this.#draw(plane, step, colors, rig.isFlat);
  }

  clear(): void {
    this.#key = "";
    this.#labels.remove(this.#sprites);
    this.#sprites = [];
    for (const child of [...this.group.children]) discard(child);
  }

  #draw({ axes, base }: Plane, step: number, colors: Palette, isFlat: boolean): void {
    const [thin, strong]: [number[], number[]] = [[], []];
    axes.forEach((axis, i) => {
      const other = axes[1 - i];
      const from = Math.ceil((axis.low - axis.zero) / step);
      const to = Math.min(from + MOST_LINES, Math.floor((axis.high - axis.zero) / step));
      for (let n = from; n <= to; n++) {
        const along = axis.zero + n * step;
        const at = (across: number) =>
          base.clone().addScaledVector(axis.direction, along).addScaledVector(other.direction, across);
        const [start, end] = [at(other.low), at(other.high)];
        (n === 0 && i === 1 && isFlat ? strong : thin).push(...start.toArray(), ...end.toArray());
        this.#label(axis, n, step, isFlat, i, at, other, colors);
      }
    });
    if (thin.length > 0) this.group.add(strokes(thin, { color: colors.grid, width: 1 }));
    if (strong.length > 0) this.group.add(strokes(strong, { color: colors.scale, width: 2 }));
  }

  #label(
    axis: Axis,
    n: number,
    step: number,
    isFlat: boolean,
    i: number,
    at: (across: number) => Vector3,
    other: Axis,
    colors: Palette,
  ): void {
    const value = n * step;
    // what is written along the bottom would cross what is written up the side, and the caption is at the top
    const margin = 0.06 * (axis.high - axis.low);
    const high = isFlat && i === 1 ? axis.high - margin : axis.high;
    const last = axis.zero + value + step > high;
    const text = `${niceNumber(value, step)}${last || !isFlat ? " m" : ""}`;
    const anchor: [number, number] = isFlat ? (i === 0 ? [0.5, 0] : [0, 0.5]) : [0.5, 0.5];
    if (isFlat && (axis.zero + value < axis.low + margin || axis.zero + value > high)) return;
    if (!isFlat && i === 1) return;
    this.#sprites.push(
      this.#labels.add(this.group, text, colors.scale, at(other.low), { anchor, isFixed: true }),
    );
  }
}

interface Plane {
  axes: [Axis, Axis];
  /** A place of the plane, from which both axes are counted. */
  base: Vector3;
}

/** All that the picture shows, in the plane of the picture and behind everything. */
function pictureAxes(rig: CameraRig, { origin }: GridPlace): Plane {
  const { right, up, back, target, span, width, height } = rig;
  const half = [(span * width) / height / 2, span / 2];
  const axis = (direction: Vector3, i: number): Axis => {
    const middle = target.dot(direction);
    // heights are counted from the world's zero
    const zero = Math.abs(direction.y) > 0.5 ? 0 : origin.dot(direction);
    return { direction, low: middle - half[i], high: middle + half[i], zero };
  };
  return {
    axes: [axis(right, 0), axis(up, 1)],
    base: back.clone().multiplyScalar(target.dot(back) - rig.depth),
  };
}

function groundAxes({ origin, ahead, points }: GridPlace): Plane {
  const left = new Vector3(ahead.z, 0, -ahead.x);
  const axis = (direction: Vector3): Axis => {
    const along = points.map((point) => point.dot(direction));
    const [low, high] = [Math.min(...along), Math.max(...along)];
    const room = 0.25 * (high - low) + 0.2;
    return { direction, low: low - room, high: high + room, zero: origin.dot(direction) };
  };
  const axes: [Axis, Axis] = [axis(ahead), axis(left)];
  const least = 0.4 * Math.max(...axes.map(({ low, high }) => high - low));
  for (const each of axes) {
    const missing = Math.max(0, least - (each.high - each.low)) / 2;
    each.low -= missing;
    each.high += missing;
  }
  return { axes, base: new Vector3(0, origin.y, 0) };
}
