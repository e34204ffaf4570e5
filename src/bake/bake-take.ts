/** The clip of a throw's take: solved, cut and named. */

import type { Track } from "../clip/track.js";
import { RequestError } from "../math/request-error.js";
import type { Prop } from "../prop/prop.js";
import { throwFileError } from "../throwfile/errors.js";
import type { ThrowEntry, ThrowFile } from "../throwfile/types.js";
import { clipName, type FiledClip, filedClip, fileName } from "./files.js";
import { hostFrame } from "./host.js";
import { cuesOf, type MotionState, motionState } from "./motion.js";
import { type Compared, compared, type Nearest } from "./nearest.js";
import type { TakeNote } from "./notes.js";
import type { LoadedProp } from "./props.js";
import { cutTake, solveTake, type Take } from "./take.js";
import { takeDoubts } from "./take-doubts.js";

/** A take and the clip that was made of it. */
export interface BakedTake {
  /** Of the clip. */
  name: string;
  /** Name of the file that holds it. */
  file: string;
  take: Take;
  track: Track;
  /** In the host's coordinates. */
  release: MotionState;
  arrival: MotionState;
  nearest: Nearest | null;
}

/**
 * A throw's take; nothing of any other take is needed.
 *
 * @throws ThrowFileError for a take that has no flight or no keys; UnheldLimits for one that is left out
 */
export function bakeTake(
  file: ThrowFile,
  entry: ThrowEntry,
  prop: Prop,
  number: number,
): Omit<BakedTake, "nearest"> {
  try {
    const take = solveTake(file, entry, prop, number);
    const name = clipName(entry, number);
    const { flight } = take;
    const host = hostFrame(file.host).fromWorld;
    return {
      name,
      file: fileName(file, entry.name, name),
      take,
      track: cutTake(file, prop, take),
      release: motionState(take, prop, 0, host),
      arrival: motionState(take, prop, flight.duration, host),
    };
  } catch (error) {
    if (!(error instanceof RequestError)) throw error;
    throw throwFileError(file, error.path[0] === "bake" ? error : error.under("throws", entry.name));
  }
}

/** What it is compared by with other takes: the flight alone, without holds. */
export const takeCompared = ({ take: { flight } }: Pick<BakedTake, "take">): Compared =>
  compared(flight.duration, [{ start: 0, flight }]);

export const takeNote = ({ name, take }: Pick<BakedTake, "name" | "take">): TakeNote => ({
  name,
  take: take.number,
  greatestRate: take.flight.greatestRate,
  warnings: [...takeDoubts(take.flight.launch), ...("warnings" in take.aimed ? take.aimed.warnings : [])],
});

/** What of a take goes into a file. */
export const takeClip = (entry: ThrowEntry, baked: Omit<BakedTake, "nearest">, prop: LoadedProp): FiledClip =>
  filedClip(entry, baked, clipExtras(entry, baked), prop);

/** What an engine needs to take over from the clip, or to hang sounds on it. */
const clipExtras = (entry: ThrowEntry, { take, release, arrival }: Omit<BakedTake, "nearest">) => ({
  throw: entry.name,
  take: take.number,
  draws: take.drawn.draws,
  release,
  arrival,
  flight: { start: take.drawn.hold.before, time: take.flight.duration },
  cues: cuesOf(take, take.drawn.hold.before),
});
