/** What a picture of a drift is made of: the same moments of two motions. */

import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import { pathOf, type Stretch, stretchesOf } from "./course.js";
import type { SheetProp, SheetTake } from "./sheet-input.js";
import { courseOf } from "./view.js";

/** A motion, and the prop that makes it. */
export interface DriftSide {
  prop: SheetProp;
  take: SheetTake;
}

export interface DriftPose {
  centerOfMass: Vec3;
  /** Turns the model from as modelled. */
  rotation: Quat;
}

/** One flight of one side. */
export interface DriftLayer {
  prop: SheetProp;
  /** At equal shares of the flight's own time, release and arrival among them. */
  poses: DriftPose[];
  /** Of the centre of mass. */
  path: Vec3[];
  travels: boolean;
}

/** A flight as it was and as it is; a chain may have got one more, or one fewer. */
export interface DriftPair {
  /** Of the throw. */
  name?: string;
  before?: DriftLayer;
  now?: DriftLayer;
  /** Level unit vector along the flight, and where it is let go; as it is now, if it is. */
  ahead: Vec3;
  release: Vec3;
}

/** From release to arrival: enough to follow a turn and a half, and more of them. */
const STEPS = [8, 12] as const;
const FEW_TURNS = 1.5;
const PATH_STEPS = 48;

export function driftPairs(before: DriftSide, now: DriftSide): DriftPair[] {
  const [olds, news] = [stretchesOf(before.take), stretchesOf(now.take)];
  return Array.from({ length: Math.max(olds.length, news.length) }, (_, i): DriftPair => {
    const [old, fresh] = [olds[i], news[i]];
    const turns = Math.max(old?.turns ?? 0, fresh?.turns ?? 0);
    const steps = STEPS[turns > FEW_TURNS ? 1 : 0];
    const pair = { before: old && layerOf(before, old, steps), now: fresh && layerOf(now, fresh, steps) };
    const { path } = pair.now ?? pair.before;
    return { ...pair, name: (fresh ?? old).name, ahead: courseOf(path), release: path[0] };
  });
}

function layerOf({ prop, take: { motion } }: DriftSide, stretch: Stretch, steps: number): DriftLayer {
  const { from, to, travels } = stretch;
  return {
    prop,
    travels,
    path: pathOf(motion, stretch, PATH_STEPS),
    poses: Array.from({ length: steps + 1 }, (_, i) => {
      const t = from + ((to - from) * i) / steps;
      return { centerOfMass: motion.centerOfMass(t), rotation: motion.rotation(t) };
    }),
  };
}
