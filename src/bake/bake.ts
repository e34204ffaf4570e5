/** The one place that runs the line in memory: draw, aim, fly, cut, splice. */

import type { NamedFile } from "../gltf/splice.js";
import { RequestError } from "../math/request-error.js";
import { throwFileError } from "../throwfile/errors.js";
import type { ThrowEntry, ThrowFile } from "../throwfile/types.js";
import {
  type BakedChain,
  type BakedChainTake,
  bakeChainTake,
  chainClip,
  chainCompared,
  chainNote,
} from "./bake-chain.js";
import { type BakedTake, bakeTake, takeClip, takeCompared, takeNote } from "./bake-take.js";
import { UnheldChain } from "./chain.js";
import { clipFiles, clipName, type FiledClip } from "./files.js";
import { UnheldLimits } from "./limits.js";
import { nearestFinder } from "./nearest.js";
import { addNote, emptyNotes, type ThrowNotes } from "./notes.js";
import { isChain, type Planned, type PlanOptions, planOf } from "./plan.js";
import { playerWarnings } from "./player-warnings.js";
import { type LoadedProp, loadProps, type ModelSource } from "./props.js";

export type { BakedTake } from "./bake-take.js";

/** A throw and its takes, ascending by number. */
export interface BakedThrow {
  entry: ThrowEntry;
  takes: BakedTake[];
}

/** A take left out, as none of its candidates holds the throw's limits or one fails in a chain: the name of the clip that would have been, and why. */
export interface Unheld {
  name: string;
  reason: UnheldLimits | UnheldChain;
}

/** What a throw file bakes to, in memory. */
export interface Bake {
  /** The props that were used, in the throw file's order. */
  props: Map<string, LoadedProp>;
  /** Those of which there is a take. */
  throws: BakedThrow[];
  chains: BakedChain[];
  /** What is to be written, by names within the output folder. */
  files: NamedFile[];
  /** Of each throw and chain that was asked for. */
  notes: ThrowNotes[];
  /** What some players will do to these files. */
  warnings: string[];
  unheld: Unheld[];
}

/** What of a throw file is baked, and who is told meanwhile. */
export interface BakeOptions extends Omit<PlanOptions, "shard"> {
  /** Told after each take. */
  onTake?: (done: number, total: number) => void;
}

/**
 * Bakes a throw file in memory.
 *
 * @throws ThrowFileError for a throw that cannot be, ModelError for a model that cannot be used, RequestError as `planOf` does
 */
export async function bake(file: ThrowFile, source: ModelSource, options: BakeOptions = {}): Promise<Bake> {
  const { only, takes } = options;
  const plan = planOf(file, { only, takes });
  const props = await loadProps(file, new Set(plan.map(({ entry }) => entry.prop)), source);
  const total = plan.reduce((sum, { numbers }) => sum + numbers.length, 0);
  const unheld: Unheld[] = [];
  const clips: FiledClip[] = [];
  let done = 0;
  const made = <Taken>({ entry, numbers }: Planned, make: (number: number) => Taken): Taken[] =>
    numbers.flatMap((number) => {
      try {
        return [make(number)];
      } catch (reason) {
        if (!isUnheld(reason)) throw reason;
        unheld.push({ name: clipName(entry, number), reason });
        return [];
      } finally {
        options.onTake?.(++done, total);
      }
    });

  const throws: BakedThrow[] = [];
  const chains: BakedChain[] = [];
  const notes: ThrowNotes[] = [];
  for (const planned of plan) {
    const { entry } = planned;
    const loaded = props.get(entry.prop) as LoadedProp;
    const nearestTo = nearestFinder(loaded.prop.reach);
    const noted = emptyNotes(entry);
    notes.push(noted);
    if (isChain(entry)) {
      const chainTakes = made<BakedChainTake>(planned, (number) => {
        const baked = bakeChainTake(file, entry, loaded.prop, number);
        const { course, samples } = chainCompared(baked);
        const nearest = nearestTo(number, course, samples);
        addNote(noted, chainNote(baked), nearest);
        clips.push(chainClip(entry, baked, loaded));
        return { ...baked, nearest };
      });
      if (chainTakes.length > 0) chains.push({ entry, prop: entry.prop, takes: chainTakes });
    } else {
      const throwTakes = made<BakedTake>(planned, (number) => {
        const baked = bakeTake(file, entry, loaded.prop, number);
        const { course, samples } = takeCompared(baked);
        const nearest = nearestTo(number, course, samples);
        addNote(noted, takeNote(baked), nearest);
        clips.push(takeClip(entry, baked, loaded));
        return { ...baked, nearest };
      });
      if (throwTakes.length > 0) throws.push({ entry, takes: throwTakes });
    }
  }
  return {
    props,
    throws,
    chains,
    files: filesOf(file, clips),
    notes,
    warnings: playerWarnings(file, notes, props),
    unheld,
  };
}

/** Whether a take that was thrown is only left out. */
export const isUnheld = (reason: unknown): reason is Unheld["reason"] =>
  reason instanceof UnheldLimits || reason instanceof UnheldChain;

/** @throws ThrowFileError as `clipFiles` throws RequestErrors */
export function filesOf(file: ThrowFile, clips: readonly FiledClip[]): NamedFile[] {
  try {
    return clipFiles(file, clips);
  } catch (error) {
    throw error instanceof RequestError ? throwFileError(file, error) : error;
  }
}
