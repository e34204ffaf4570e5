/** The clip of a chain's take: solved, cut and named. */

import type { Track } from "../clip/track.js";
import { RequestError } from "../math/request-error.js";
import type { Prop } from "../prop/prop.js";
import { throwFileError } from "../throwfile/errors.js";
import type { ChainEntry, ThrowEntry, ThrowFile } from "../throwfile/types.js";
import { type ChainTake, cutChain, solveChain, UnheldChain } from "./chain.js";
import { clipName, type FiledClip, filedClip, fileName } from "./files.js";
import { UnheldLimits } from "./limits.js";
import { cuesOf } from "./motion.js";
import { type Compared, compared, type Nearest } from "./nearest.js";
import type { TakeNote } from "./notes.js";
import type { ChosenChain } from "./plan.js";
import type { LoadedProp } from "./props.js";
import { solveTake, type Take } from "./take.js";

/** A chain's take and the clip that was made of it. */
export interface BakedChainTake extends ChainTake {
  name: string;
  file: string;
  track: Track;
  nearest: Nearest | null;
}

/** A chain and its takes, ascending by number. */
export interface BakedChain {
  entry: ChainEntry;
  /** Of all its throws. */
  prop: string;
  takes: BakedChainTake[];
}

/**
 * A chain's take; its throws' own takes are solved for it, as no take needs another.
 *
 * @throws ThrowFileError for a throw that has no flight there; UnheldChain or UnheldLimits for a take that is left out
 */
export function bakeChainTake(
  file: ThrowFile,
  entry: ChosenChain,
  prop: Prop,
  number: number,
): Omit<BakedChainTake, "nearest"> {
  const own = (member: string): Take => {
    const thrown = file.throws.get(member) as ThrowEntry;
    try {
      return located(file, ["throws", member], () => solveTake(file, thrown, prop, number));
    } catch (error) {
      if (!(error instanceof UnheldLimits)) throw error;
      throw new UnheldChain(`${clipName(thrown, number)}, a part of it, is left out`);
    }
  };
  const take = located(file, [], () => solveChain(file, entry, prop, entry.throws.map(own)));
  const name = clipName(entry, number);
  return {
    ...take,
    name,
    file: fileName(file, entry.name, name),
    track: located(file, [], () => cutChain(file, entry, prop, take)),
  };
}

/** Says where in the throw file a request stands that cannot be met. */
function located<T>(file: ThrowFile, path: readonly string[], answer: () => T): T {
  try {
    return answer();
  } catch (error) {
    if (!(error instanceof RequestError)) throw error;
    throw throwFileError(file, error.under(...path));
  }
}

/** What it is compared by with other takes: the whole clip. */
export const chainCompared = ({ duration, parts }: ChainTake): Compared =>
  compared(
    duration,
    parts.map(({ start, take: { flight } }) => ({ start, flight })),
  );

export const chainNote = ({ name, number, parts }: Omit<BakedChainTake, "nearest">): TakeNote => ({
  name,
  take: number,
  greatestRate: Math.max(...parts.map(({ take }) => take.flight.greatestRate)),
  warnings: [],
});

/** What of a chain's take goes into a file. */
export const chainClip = (
  entry: ChainEntry,
  baked: Omit<BakedChainTake, "nearest">,
  prop: LoadedProp,
): FiledClip => filedClip(entry, baked, chainExtras(entry, baked), prop);

/** What an engine needs to take over from the clip, part by part; times are within the clip. */
const chainExtras = (entry: ChainEntry, { number, parts }: ChainTake) => ({
  chain: entry.name,
  take: number,
  parts: parts.map(({ throw: name, take, start, end, release, arrival }) => ({
    throw: name,
    draws: take.drawn.draws,
    release,
    arrival,
    flight: { start, time: end - start },
    cues: cuesOf(take, start),
  })),
});
