/** The clips of a chain: solved, cut and named. */

import type { Track } from "../clip/track.js";
import { RequestError } from "../math/request-error.js";
import { rounded } from "../math/rounded.js";
import { throwFileError } from "../throwfile/errors.js";
import type { ChainEntry, ThrowEntry, ThrowFile } from "../throwfile/types.js";
import type { Bake, BakedThrow } from "./bake.js";
import { type ChainTake, chainMovement, cutChain, solveChain, UnheldChain } from "./chain.js";
import { clipName, type FiledClip, fileName } from "./files.js";
import { UnheldLimits } from "./limits.js";
import { cuesOf } from "./motion.js";
import { type Nearest, nearestFinder } from "./nearest.js";
import type { LoadedProp } from "./props.js";
import { solveTake, type Take } from "./take.js";

/** A chain's take and the clip that was made of it. */
export interface BakedChainTake extends ChainTake {
  name: string;
  file: string;
  track: Track;
  nearest: Nearest | null;
}

export interface BakedChain {
  entry: ChainEntry;
  /** Of all its throws. */
  prop: string;
  takes: BakedChainTake[];
}

/** A chain with what it has of its first throw. */
export type ChosenChain = ChainEntry & Pick<ThrowEntry, "prop" | "takes">;

export function selectChains(file: ThrowFile, only?: readonly string[]): ChosenChain[] {
  return [...file.chains.values()]
    .filter(({ name }) => !only || only.includes(name))
    .map((entry) => {
      const { prop, takes } = file.throws.get(entry.throws[0]) as ThrowEntry;
      return { ...entry, prop, takes };
    });
}

/** A chain's takes; its throws' own are those of the throws baked, or else solved for it alone. */
export function bakeChain(
  file: ThrowFile,
  entry: ChosenChain,
  numbers: readonly number[],
  { prop }: LoadedProp,
  throws: readonly BakedThrow[],
  unheld: Bake["unheld"],
  onTake: () => void,
): BakedChain | undefined {
  const nearest = nearestFinder(prop.reach);
  const takeOf = (member: string, number: number): Take => {
    const baked = throws.find(({ entry: { name } }) => name === member);
    const take = baked?.takes.find((other) => other.take.number === number)?.take;
    const own = file.throws.get(member) as ThrowEntry;
    const left = unheld.find(({ name }) => name === clipName(own, number));
    if (left) throw new UnheldChain(`${left.name}, a part of it, is left out`);
    return take ?? located(file, ["throws", member], () => solveTake(file, own, prop, number));
  };
  const takes = numbers.flatMap((number): BakedChainTake[] => {
    const name = clipName(entry, number);
    try {
      const take = located(file, [], () =>
        solveChain(
          file,
          entry,
          prop,
          entry.throws.map((member) => takeOf(member, number)),
        ),
      );
      return [
        {
          ...take,
          name,
          file: fileName(file, entry.name, name),
          track: located(file, [], () => cutChain(file, entry, prop, take)),
          nearest: nearest(number, chainMovement(take)),
        },
      ];
    } catch (reason) {
      if (!(reason instanceof UnheldChain || reason instanceof UnheldLimits)) throw reason;
      unheld.push({ name, reason });
      return [];
    } finally {
      onTake();
    }
  });
  return takes.length === 0 ? undefined : { entry, prop: entry.prop, takes };
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

/** What of a chain goes into files. */
export const chainClips = ({ entry, prop, takes }: BakedChain, props: Bake["props"]): FiledClip[] =>
  takes.map((baked) => ({
    name: baked.name,
    track: baked.track,
    extras: rounded(chainExtras(entry, baked)),
    throwName: entry.name,
    prop: props.get(prop) as LoadedProp,
  }));

/** What an engine needs to take over from the clip, part by part; times are within the clip. */
const chainExtras = (entry: ChainEntry, { number, parts }: BakedChainTake) => ({
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
