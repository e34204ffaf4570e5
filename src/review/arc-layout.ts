/** Which exposures of a flight a picture has room for, and its scale. */

import type { Motion } from "../bake/take-motion.js";
import type { Vec3 } from "../math/vec3.js";
import { pathOf, type Stretch } from "./course.js";
import { type Exposure, thinning } from "./exposures.js";
import { type Bounds, grown, type Point } from "./plane.js";
import { boundsOf, poseOf } from "./poses.js";
import type { SheetProp } from "./sheet-input.js";
import { marksOf, type PlaceMark, type Surroundings, surroundingsOf } from "./surroundings.js";
import { inView, type View } from "./view.js";

/** A flight in a picture. */
export interface ShownFlight {
  motion: Motion;
  stretch: Stretch;
  exposures: readonly Exposure[];
  /** Classes; default a plain outline, its ends picked out, and a full line. */
  looks?: { outline: string; ends: string; path: string };
  /** Without marks and numbers, as one that only shows what was before. */
  isMute?: boolean;
}

export interface ArcPanelInput {
  prop: SheetProp;
  /** At least one. */
  flights: readonly ShownFlight[];
  view: View;
  /** What is written into the picture beside the exposures' numbers: marks and tops, or the throws' names alone. */
  labels?: "marks" | "names";
  /** Of the panel, px. */
  width: number;
  /** Greatest of what is drawn in it, px. */
  height: number;
  /** px a metre: no larger than this. */
  mostScale?: number;
}

/** As much of a flight as is drawn; m in the view's axes. */
export interface LaidFlight extends ShownFlight {
  /** Every how many exposures are drawn, and these. */
  every: number;
  drawn: readonly Exposure[];
  path: readonly Vec3[];
  marks: readonly PlaceMark[];
}

export interface ArcLayout {
  flights: LaidFlight[];
  /** Even the fewest exposures lie over each other. */
  crowded: boolean;
  surroundings: Surroundings;
  bounds: Bounds;
  /** px a metre. */
  scale: number;
  toPage(place: Point | Vec3): Point;
}

/** Room round the drawing for texts, px. */
export const MARGIN = { left: 62, right: 46, top: 26 };
/** Of the root of an outline's area, and of its greatest width: exposures are no nearer to each other than the greater. */
const ROOM = 0.8;
const ROOM_OF_WIDTH = 0.16;
/** How far surroundings may enlarge the picture, as a share of what flies. */
const SURROUNDINGS = 0.5;
/** Of the reach: how coarse an outline may be that is only measured. */
const COARSE = 0.01;

export function arcLayout(input: ArcPanelInput): ArcLayout {
  const { prop, view, width, height, mostScale = Number.POSITIVE_INFINITY } = input;
  const laid = input.flights.map((flight) => lay(prop, view, flight));
  const surroundings = surroundingsOf(
    laid.map(({ stretch }) => stretch),
    view,
  );
  const flown = boundsOf(
    laid.flatMap(({ poses }) => poses),
    laid.flatMap(({ path, marks }) => [...path, ...marks.map(({ place }) => inView(view, place))]),
  );
  const most = SURROUNDINGS * Math.max(flown.right - flown.left, flown.high - flown.low);
  const bounds = surroundings.bounds.reduce((sum, one) => grown(sum, one, most), flown);
  const inner = width - MARGIN.left - MARGIN.right;
  const [wide, tall] = [bounds.right - bounds.left, bounds.high - bounds.low];
  const scale = Math.min(inner / wide, height / tall, mostScale);
  const left = MARGIN.left + (inner - scale * wide) / 2;
  return {
    flights: laid,
    crowded: laid.some(({ crowded }) => crowded),
    surroundings,
    bounds,
    scale,
    toPage: ([x, y]) => [left + scale * (x - bounds.left), MARGIN.top + scale * (bounds.high - y)],
  };
}

function lay(prop: SheetProp, view: View, flight: ShownFlight) {
  const { motion, stretch, exposures } = flight;
  const poses = exposures.map((exposure) => poseOf(prop, view, exposure, COARSE * prop.reach));
  const area = poses.reduce((sum, pose) => sum + pose.area, 0) / poses.length;
  const room = Math.max(ROOM * Math.sqrt(area), ROOM_OF_WIDTH * 2 * prop.reach);
  const places = exposures.map(({ centerOfMass }) => inView(view, centerOfMass));
  const { every, crowded } = thinning(places, room);
  return {
    ...flight,
    poses,
    every,
    crowded,
    drawn: exposures.filter((_, i) => i % every === 0),
    path: pathOf(motion, stretch, 48).map((place) => inView(view, place)),
    marks: flight.isMute ? [] : marksOf(motion, stretch),
  };
}
