/** A take as a small strobe: its path from the side and the prop at even times along it. */

import { motionOf, type TakeMotion } from "../../bake/take-motion.js";
import { multiply, type Quat } from "../../math/quat.js";
import type { Vec3 } from "../../math/vec3.js";
import { outlineOf, type Solid } from "../outline.js";
import type { PageProp } from "../page-data.js";
import { courseOf, inView, sideView } from "../view.js";

/** In m, y down as in SVG. */
export interface StripPicture {
  viewBox: string;
  /** Of the centre of mass; "" where it rests. */
  path: string;
  /** Even-odd filled, first to last. */
  poses: string[];
  /** How many times larger than it is the prop is drawn; 1 or more. */
  larger: number;
}

/** The prop's surface, and how the solid's axes are turned from those of the model as modelled. */
export interface Shown {
  solid: Solid;
  turned: Quat;
}

const PATH_STEPS = 24;
const MOST_POSES = 7;
/** The prop is drawn so large that its reach is at least this share of the picture's size. */
const LEAST_SHARE = 0.09;
/** Of the reach as drawn: finer than a pixel of a strip. */
const DETAIL = 0.06;
/** Of a prop that turns in place, in reaches. */
const SPREAD = 1.6;

export function stripPicture(
  motion: TakeMotion,
  prop: Pick<PageProp, "axes" | "reach">,
  shown?: Shown,
): StripPicture {
  const { centerOfMass, rotation } = motionOf(motion, prop.axes);
  const from = motion.parts[0].start;
  const last = motion.parts[motion.parts.length - 1];
  const to = last.start + last.launch.duration;
  const time = (share: number) => from + (to - from) * share;
  const places = Array.from({ length: PATH_STEPS + 1 }, (_, i) => centerOfMass(time(i / PATH_STEPS)));
  const view = sideView(courseOf(places));
  const rests = motion.parts.every(({ turnsAlone }) => turnsAlone);
  const flat = places.map(
    (place, i): Vec3 =>
      rests ? [(SPREAD * prop.reach * MOST_POSES * i) / PATH_STEPS, 0, 0] : inView(view, place),
  );
  const size = Math.max(spanOf(flat, 0), spanOf(flat, 1), prop.reach);
  const larger = Math.max(1, (LEAST_SHARE * size) / prop.reach);
  const reach = prop.reach * larger;
  const poses = shown
    ? Array.from({ length: MOST_POSES }, (_, i) => {
        const share = i / (MOST_POSES - 1);
        const at = flat[Math.round(share * PATH_STEPS)];
        const turn = multiply(view.rotation, multiply(rotation(time(share)), shown.turned));
        return ringsPath(outlineOf(shown.solid, turn, DETAIL * prop.reach).rings, at, larger);
      })
    : [];
  return { viewBox: viewBoxOf(flat, reach), path: rests ? "" : linePath(flat), poses, larger };
}

const spanOf = (places: readonly Vec3[], axis: number): number =>
  Math.max(...places.map((place) => place[axis])) - Math.min(...places.map((place) => place[axis]));

const short = (value: number): string => String(Number(value.toPrecision(4)));

function viewBoxOf(places: readonly Vec3[], reach: number): string {
  const left = Math.min(...places.map(([x]) => x)) - reach;
  const top = Math.min(...places.map(([, y]) => -y)) - reach;
  return [left, top, spanOf(places, 0) + 2 * reach, spanOf(places, 1) + 2 * reach].map(short).join(" ");
}

const linePath = (places: readonly Vec3[]): string =>
  `M${places.map(([x, y]) => `${short(x)} ${short(-y)}`).join("L")}`;

const ringsPath = (rings: readonly ArrayLike<number>[], [x, y]: Vec3, larger: number): string =>
  rings
    .map((ring) => {
      const points: string[] = [];
      for (let i = 0; i < ring.length; i += 2)
        points.push(`${short(x + larger * ring[i])} ${short(-y - larger * ring[i + 1])}`);
      return `M${points.join("L")}Z`;
    })
    .join("");
