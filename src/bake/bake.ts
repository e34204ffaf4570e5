/** The one place that runs the line: draw, aim, fly, cut, splice. */

import type { Track } from "../clip/track.js";
import { type Graft, spliceGlb } from "../gltf/splice.js";
import { RequestError } from "../math/request-error.js";
import { rounded } from "../math/rounded.js";
import type { Prop } from "../prop/prop.js";
import { throwFileError } from "../throwfile/errors.js";
import { type ThrowEntry, type ThrowFile, takeNumbers } from "../throwfile/types.js";
import { type NamedTrack, oneNodeGraft, twoNodeGraft } from "./graft.js";
import { hostFrame } from "./host.js";
import { UnheldLimits } from "./limits.js";
import { type MotionState, motionState, turnTimes } from "./motion.js";
import { type Nearest, nearestFinder } from "./nearest.js";
import { nodeGraft } from "./node-graft.js";
import { type LoadedProp, loadProps, type ModelSource } from "./props.js";
import { cutTake, solveTake, type Take } from "./take.js";

/** A take and the clip that was made of it. */
export interface BakedTake {
  /** Of the clip. */
  name: string;
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
  /** The file of the throw: its name within the output folder, and its bytes. */
  file: { name: string; content: Uint8Array };
}

export interface Bake {
  /** The props that were used, in the throw file's order. */
  props: Map<string, LoadedProp>;
  /** Those of which there is a take. */
  throws: BakedThrow[];
  /** Takes left out, as none of their candidates holds the throw's limits: the name of the clip that would have been, and why. */
  unheld: { name: string; reason: UnheldLimits }[];
}

export interface BakeOptions {
  /** Names of the throws to bake; default all. */
  only?: readonly string[];
  /** First and last number of the takes to bake; default all. */
  takes?: readonly [number, number];
  /** Told after each take. */
  onTake?: (done: number, total: number) => void;
}

/**
 * Bakes a throw file in memory.
 *
 * @throws ThrowFileError for a throw that cannot be, ModelError for a model that cannot be used, RequestError for `only` naming no throw
 *   and for `takes` that no throw has
 */
export async function bake(file: ThrowFile, source: ModelSource, options: BakeOptions = {}): Promise<Bake> {
  const chosen = selectTakes(selectThrows(file, options.only), options.takes);
  const props = await loadProps(file, new Set(chosen.map(({ entry }) => entry.prop)), source);
  const total = chosen.reduce((sum, { numbers }) => sum + numbers.length, 0);
  let done = 0;
  const unheld: Bake["unheld"] = [];
  const throws = chosen.flatMap(({ entry, numbers }) => {
    const onTake = () => options.onTake?.(++done, total);
    return bakeThrow(file, entry, numbers, props.get(entry.prop) as LoadedProp, unheld, onTake) ?? [];
  });
  return { props, throws, unheld };
}

function selectThrows(file: ThrowFile, only?: readonly string[]): ThrowEntry[] {
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
function selectTakes(
  entries: readonly ThrowEntry[],
  takes?: BakeOptions["takes"],
): { entry: ThrowEntry; numbers: readonly number[] }[] {
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
  { prop, model }: LoadedProp,
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
    if (takes.length === 0) return undefined;
    const clips = takes.map((baked) => ({
      name: baked.name,
      track: baked.track,
      extras: rounded(clipExtras(entry, baked)),
    }));
    const content = spliceGlb(model, graftOf(file, prop, clips));
    return { entry, takes, file: { name: `${entry.name}.glb`, content } };
  } catch (error) {
    if (!(error instanceof RequestError)) throw error;
    const path = error.path[0] === "bake" ? error.path : ["throws", entry.name, ...error.path];
    throw throwFileError(file, new RequestError(path, error.fault, error.remedy));
  }
}

function graftOf(file: ThrowFile, prop: Prop, clips: NamedTrack[]): Graft {
  if (prop.node) return nodeGraft(prop.node, prop.scale, clips);
  return file.bake.layout === "two-node" ? twoNodeGraft(prop, clips) : oneNodeGraft(prop, clips);
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
  const { flight } = take;
  const host = hostFrame(file.host).fromWorld;
  return {
    name: clipName(entry, number),
    take,
    track: cutTake(file, prop, take),
    release: motionState(flight, prop, 0, host),
    arrival: motionState(flight, prop, flight.duration, host),
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

/** Two digits, or as many as the number has. */
const clipName = (entry: ThrowEntry, number: number): string =>
  `${entry.name}_${String(number).padStart(2, "0")}`;

/** What an engine needs to take over from the clip, or to hang sounds on it. */
const clipExtras = (entry: ThrowEntry, { take, release, arrival }: BakedTake) => ({
  throw: entry.name,
  take: take.number,
  draws: take.drawn.draws,
  release,
  arrival,
  cues: { apex: take.aimed.arc.apex.time, turns: turnTimes(take.flight) },
});
