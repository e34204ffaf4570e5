/** Which takes a bake is to make, in the order in which the record has them. */

import { RequestError } from "../math/request-error.js";
import { throwFileError } from "../throwfile/errors.js";
import { type ChainEntry, type ThrowEntry, type ThrowFile, takeNumbers } from "../throwfile/types.js";

/** A chain with what it has of its first throw. */
export type ChosenChain = ChainEntry & Pick<ThrowEntry, "prop" | "takes">;

/** A throw or chain and the numbers of its takes, ascending, perhaps none. */
export interface Planned<Entry = ThrowEntry | ChosenChain> {
  entry: Entry;
  numbers: readonly number[];
}

/** One machine's part of a batch: the `index`th, from 1, of `of` equal ones. */
export interface Shard {
  index: number;
  of: number;
}

export interface PlanOptions {
  /** Names of the throws and chains to bake; default all. */
  only?: readonly string[];
  /** First and last number of the takes to bake; default all. */
  takes?: readonly [number, number];
  /** Of each throw's and chain's takes this share, by their order; default all. */
  shard?: Shard;
}

/** Clips that go into one file: more take viewers minutes to open and engines to import. */
const MOST_CLIPS = 2000;

export const isChain = (entry: ThrowEntry | ChosenChain): entry is ChosenChain => "throws" in entry;

/**
 * The throws in the file's order, then the chains.
 *
 * @throws RequestError for `only` naming no throw or chain, for `takes` that no throw has and for a shard of files that hold more than one take;
 *   ThrowFileError for more than 2,000 clips in a file
 */
export function planOf(file: ThrowFile, options: PlanOptions = {}): Planned[] {
  const { only, takes, shard } = options;
  checkNames(file, only);
  checkWhole(file, options);
  const chosen = <Entry extends { name: string }>(entries: Iterable<Entry>) =>
    [...entries].filter(({ name }) => !only || only.includes(name));
  const all = selectTakes(
    [
      ...chosen(file.throws.values()),
      ...chosen(file.chains.values()).map(({ name }) => chosenNamed(file, name)),
    ],
    takes,
  );
  checkCounts(file, all);
  return shard ? all.map(({ entry, numbers }, i) => ({ entry, numbers: shareOf(numbers, shard, i) })) : all;
}

/** A throw or chain that the file has. */
export function chosenNamed(file: ThrowFile, name: string): ThrowEntry | ChosenChain {
  const chain = file.chains.get(name);
  const entry = file.throws.get(chain ? chain.throws[0] : name) as ThrowEntry;
  return chain ? { ...chain, prop: entry.prop, takes: entry.takes } : entry;
}

/** @throws RequestError where there is none */
export function throwNamed(file: ThrowFile, name: string): ThrowEntry {
  const entry = file.throws.get(name);
  if (entry) return entry;
  throw new RequestError(
    ["only"],
    `there is no throw "${name}"`,
    `one of ${[...file.throws.keys()].join(", ")}`,
  );
}

/** The throws that have any of the takes, with the numbers of those they have. */
export function selectTakes<Entry extends Pick<ThrowEntry, "takes">>(
  entries: readonly Entry[],
  takes?: PlanOptions["takes"],
): Planned<Entry>[] {
  const all = entries.map((entry) => ({ entry, numbers: takeNumbers(entry.takes) }));
  if (!takes) return all;
  const [first, last] = takes;
  const chosen = all
    .map(({ entry, numbers }) => ({ entry, numbers: numbers.filter((n) => n >= first && n <= last) }))
    .filter(({ numbers }) => numbers.length > 0);
  if (chosen.length > 0) return chosen;
  throw new RequestError(
    ["takes"],
    `no throw has a take from ${first} to ${last}`,
    `the last take is ${all.reduce((most, { numbers }) => numbers.reduce((m, n) => Math.max(m, n), most), 0)}`,
  );
}

/** Neighbours, as even draws look back; what does not divide evenly falls to another share in each throw. */
function shareOf(numbers: readonly number[], { index, of }: Shard, nth: number): readonly number[] {
  const end = (i: number) => Math.floor((numbers.length * i + (nth % of)) / of);
  return numbers.slice(end(index - 1), end(index));
}

function checkNames(file: ThrowFile, only: readonly string[] = []): void {
  const names = [...file.throws.keys(), ...file.chains.keys()];
  for (const name of only)
    if (!names.includes(name))
      throw new RequestError(
        ["only"],
        `there is no throw${file.chains.size > 0 ? " or chain" : ""} "${name}"`,
        `one of ${names.join(", ")}`,
      );
}

/** A file of several takes is made of all of them. */
function checkWhole(file: ThrowFile, { only, takes, shard }: PlanOptions): void {
  const { files } = file.bake;
  if (files === "together" && only && only.length < file.throws.size + file.chains.size)
    throw new RequestError(
      ["only"],
      "one file holds the clips of all throws (bake.files is together), so that some cannot be baked alone",
      "ask for all of them, or write per-throw",
    );
  if (!shard) return;
  if (files !== "per-take")
    throw new RequestError(
      ["shard"],
      `one file holds many takes (bake.files is ${files}), so that a share of them cannot be written`,
      "write bake: { files: per-take }",
    );
  if (only || takes)
    throw new RequestError(
      [only ? "only" : "takes"],
      "does not go with a shard, which is a share of all",
      "leave one of them out",
    );
}

function checkCounts(file: ThrowFile, planned: readonly Planned[]): void {
  const { files } = file.bake;
  if (files === "per-take") return;
  const counts = planned.map(({ entry, numbers }) => ({ what: entry.name, count: numbers.length }));
  const together = { what: "all throws", count: counts.reduce((sum, { count }) => sum + count, 0) };
  const over = (files === "together" ? [together] : counts).find(({ count }) => count > MOST_CLIPS);
  if (over)
    throw throwFileError(
      file,
      new RequestError(
        ["bake", "files"],
        `the ${over.count} takes of ${over.what} do not go into one file (found ${files})`,
        `per-take, or at most ${MOST_CLIPS} takes in a file`,
      ),
    );
}
