/** The one place that runs the line: draw, aim, fly, cut, splice. */

import type { Track } from "../clip/track.js";
import type { NamedFile } from "../gltf/splice.js";
import { RequestError } from "../math/request-error.js";
import { rounded } from "../math/rounded.js";
import type { Prop } from "../prop/prop.js";
import { throwFileError } from "../throwfile/errors.js";
import { type ThrowEntry, type ThrowFile, takeNumbers } from "../throwfile/types.js";
import { type BakedChain, bakeChain, chainClips, selectChains } from "./bake-chain.js";
import type { UnheldChain } from "./chain.js";
import { clipFiles, clipName, type FiledClip, fileName } from "./files.js";
import { hostFrame } from "./host.js";
import { UnheldLimits } from "./limits.js";
import { cuesOf, type MotionState, motionState } from "./motion.js";
import { type Nearest, nearestFinder } from "./nearest.js";
import { playerWarnings } from "./player-warnings.js";
import { type LoadedProp, loadProps, type ModelSource } from "./props.js";
import { cutTake, solveTake, type Take } from "./take.js";

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

export interface BakedThrow {
  entry: ThrowEntry;
  takes: BakedTake[];
}

export interface Bake {
  /** The props that were used, in the throw file's order. */
  props: Map<string, LoadedProp>;
  /** Those of which there is a take. */
  throws: BakedThrow[];
  chains: BakedChain[];
  /** What is to be written, by names within the output folder. */
  files: NamedFile[];
  /** What some players will do to these files. */
  warnings: string[];
  /** Takes left out, as none of their candidates holds the throw's limits or one fails in a chain: the name of the clip that would have been, and why. */
  unheld: { name: string; reason: UnheldLimits | UnheldChain }[];
}

export interface BakeOptions {
  /** Names of the throws and chains to bake; default all. */
  only?: readonly string[];
  /** First and last number of the takes to bake; default all. */
  takes?: readonly [number, number];
  /** Told after each take. */
  onTake?: (done: number, total: number) => void;
}

/**
 * Bakes a throw file in memory.
 *
 * @throws ThrowFileError for a throw that cannot be, ModelError for a model that cannot be used, RequestError for `only` naming no throw or chain
 *   and for `takes` that no throw has
 */
export async function bake(file: ThrowFile, source: ModelSource, options: BakeOptions = {}): Promise<Bake> {
  checkWhole(file, options);
  const { only } = options;
  checkNames(file, only);
  const selected = selectTakes(
    [
      ...selectThrows(
        file,
        only?.filter((name) => file.throws.has(name)),
      ),
      ...selectChains(file, only),
    ],
    options.takes,
  );
  const chosen = selected.flatMap(({ entry, numbers }) => ("throws" in entry ? [] : [{ entry, numbers }]));
  const chained = selected.flatMap(({ entry, numbers }) => ("throws" in entry ? [{ entry, numbers }] : []));
  const props = await loadProps(file, new Set(selected.map(({ entry }) => entry.prop)), source);
  const total = selected.reduce((sum, { numbers }) => sum + numbers.length, 0);
  let done = 0;
  const unheld: Bake["unheld"] = [];
  const throws = chosen.flatMap(({ entry, numbers }) => {
    const onTake = () => options.onTake?.(++done, total);
    return bakeThrow(file, entry, numbers, props.get(entry.prop) as LoadedProp, unheld, onTake) ?? [];
  });
  const chains = chained.flatMap(({ entry, numbers }) => {
    const onTake = () => options.onTake?.(++done, total);
    return bakeChain(file, entry, numbers, props.get(entry.prop) as LoadedProp, throws, unheld, onTake) ?? [];
  });
  return {
    props,
    throws,
    chains,
    files: filesOf(file, throws, chains, props),
    warnings: playerWarnings(file, throws, chains, props),
    unheld,
  };
}

function checkNames(file: ThrowFile, only: readonly string[] = []): void {
  const names = [...file.throws.keys(), ...file.chains.keys()];
  for (const name of only)
    if (!names.includes(name))
      throw new RequestError(
        ["--only"],
        `there is no throw${file.chains.size > 0 ? " or chain" : ""} "${name}"`,
        `one of ${names.join(", ")}`,
      );
}

/** A file of all throws is made of all. */
function checkWhole(file: ThrowFile, { only }: BakeOptions): void {
  if (file.bake.files === "together" && only && only.length < file.throws.size + file.chains.size)
    throw new RequestError(
      ["--only"],
      "one file holds the clips of all throws (bake.files is together), so that some cannot be baked alone",
      "leave --only out, or write per-throw",
    );
}

export function selectThrows(file: ThrowFile, only?: readonly string[]): ThrowEntry[] {
  for (const name of only ?? [])
    if (!file.throws.has(name))
      throw new RequestError(
        ["--only"],
        `there is no throw "${name}"`,
        `one of ${[...file.throws.keys()].join(", ")}`,
      );
  return [...file.throws.values()].filter((entry) => !only || only.includes(entry.name));
}

/** The throws that have any of the takes, with the numbers of those they have. */
export function selectTakes<Entry extends Pick<ThrowEntry, "takes">>(
  entries: readonly Entry[],
  takes?: BakeOptions["takes"],
): { entry: Entry; numbers: readonly number[] }[] {
  const all = entries.map((entry) => ({ entry, numbers: takeNumbers(entry.takes) }));
  if (!takes) return all;
  const [first, last] = takes;
  const chosen = all
    .map(({ entry, numbers }) => ({ entry, numbers: numbers.filter((n) => n >= first && n <= last) }))
    .filter(({ numbers }) => numbers.length > 0);
  if (chosen.length > 0) return chosen;
  throw new RequestError(
    ["--takes"],
    `no throw has a take from ${first} to ${last}`,
    `the last take is ${all.reduce((most, { numbers }) => numbers.reduce((m, n) => Math.max(m, n), most), 0)}`,
  );
}

function bakeThrow(
  file: ThrowFile,
  entry: ThrowEntry,
  numbers: readonly number[],
  { prop }: LoadedProp,
  unheld: Bake["unheld"],
  onTake: () => void,
): BakedThrow | undefined {
  const nearest = nearestFinder(prop.reach);
  try {
    const takes = numbers.flatMap((number) => {
      const baked = bakeTake(file, entry, prop, number, nearest);
      onTake();
      if (!(baked instanceof UnheldLimits)) return [baked];
      unheld.push({ name: clipName(entry, number), reason: baked });
      return [];
    });
    return takes.length === 0 ? undefined : { entry, takes };
  } catch (error) {
    if (!(error instanceof RequestError)) throw error;
    throw throwFileError(file, error.path[0] === "bake" ? error : error.under("throws", entry.name));
  }
}

function filesOf(
  file: ThrowFile,
  throws: readonly BakedThrow[],
  chains: readonly BakedChain[],
  props: Bake["props"],
): NamedFile[] {
  const clips = throws.flatMap(({ entry, takes }) =>
    takes.map(
      (baked): FiledClip => ({
        name: baked.name,
        track: baked.track,
        extras: rounded(clipExtras(entry, baked)),
        throwName: entry.name,
        prop: props.get(entry.prop) as LoadedProp,
      }),
    ),
  );
  try {
    return clipFiles(file, [...clips, ...chains.flatMap((chain) => chainClips(chain, props))]);
  } catch (error) {
    throw error instanceof RequestError ? throwFileError(file, error) : error;
  }
}

function bakeTake(
  file: ThrowFile,
  entry: ThrowEntry,
  prop: Prop,
  number: number,
  nearest: ReturnType<typeof nearestFinder>,
): BakedTake | UnheldLimits {
  const take = attempt(() => solveTake(file, entry, prop, number));
  if (take instanceof UnheldLimits) return take;
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
    nearest: nearest(number, flight),
  };
}

function attempt(solve: () => Take): Take | UnheldLimits {
  try {
    return solve();
  } catch (error) {
    if (error instanceof UnheldLimits) return error;
    throw error;
  }
}

/** What an engine needs to take over from the clip, or to hang sounds on it. */
const clipExtras = (entry: ThrowEntry, { take, release, arrival }: BakedTake) => ({
  throw: entry.name,
  take: take.number,
  draws: take.drawn.draws,
  release,
  arrival,
  flight: { start: take.drawn.hold.before, time: take.flight.duration },
  cues: cuesOf(take, take.drawn.hold.before),
});
