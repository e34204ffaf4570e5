/** A baked take as plain data: all that is told, compared and written of it. It crosses threads and fits into a file. */

import { bakeChainTake, chainClip, chainCompared, chainNote } from "../bake/bake-chain.js";
import { bakeTake, takeClip, takeCompared, takeNote } from "../bake/bake-take.js";
import type { NamedTrack } from "../bake/graft.js";
import type { Compared } from "../bake/nearest.js";
import type { TakeNote } from "../bake/notes.js";
import { type ChosenChain, isChain } from "../bake/plan.js";
import type { LoadedProp } from "../bake/props.js";
import { chainMotion, type TakeMotion, takeMotion } from "../bake/take-motion.js";
import type { ThrowEntry, ThrowFile } from "../throwfile/types.js";
import { chainRecord } from "./chain-record.js";
import type { ClipRecord } from "./clip-record.js";
import { clipText } from "./format.js";
import { clipRecord } from "./record-of.js";

/** Numbers of a clip's record that the report of a bake spans. */
export type ClipFigures = Pick<
  ClipRecord,
  "name" | "take" | "file" | "duration" | "turns" | "keys" | "bytes" | "error" | "miss"
>;

export interface PlainTake {
  figures: ClipFigures;
  note: TakeNote;
  compared: Compared;
  motion: TakeMotion;
  /** Its record as it is written, but for its nearest (`withNearest`). */
  text: string;
  /** What goes into a file of clips; not where it is in one of its own already. */
  clip?: NamedTrack;
}

/** @throws as `bakeTake` and `bakeChainTake` do */
export function plainTake(
  file: ThrowFile,
  entry: ThrowEntry | ChosenChain,
  loaded: LoadedProp,
  number: number,
): PlainTake {
  const { prop } = loaded;
  if (isChain(entry)) {
    const baked = bakeChainTake(file, entry, prop, number);
    return {
      ...recorded(chainRecord(file, prop, entry, baked)),
      note: chainNote(baked),
      compared: chainCompared(baked),
      motion: chainMotion(file, { entry, prop: entry.prop }, baked),
      clip: bare(chainClip(entry, baked, loaded)),
    };
  }
  const baked = bakeTake(file, entry, prop, number);
  return {
    ...recorded(clipRecord(file, prop, entry, baked)),
    note: takeNote(baked),
    compared: takeCompared(baked),
    motion: takeMotion(file, { entry }, baked),
    clip: bare(takeClip(entry, baked, loaded)),
  };
}

const bare = ({ name, track, extras }: NamedTrack): NamedTrack => ({ name, track, extras });

function recorded(clip: Omit<ClipRecord, "nearest">): Pick<PlainTake, "figures" | "text"> {
  const { name, take, file, duration, turns, keys, bytes, error, miss } = clip;
  return {
    figures: { name, take, file, duration, turns, keys, bytes, error, miss },
    text: clipText(clip),
  };
}
