/** What some players of glTF do to a file, told before it is opened there: facts about importers, from their sources and issue threads. */

import type { ThrowFile } from "../throwfile/types.js";
import type { BakedThrow } from "./bake.js";
import type { BakedChain } from "./bake-chain.js";
import { addedNames } from "./graft.js";
import type { LoadedProp } from "./props.js";

/** Hz at which some importers sample every clip again; between two samples they take the short way round. */
const RESAMPLED_AT = 30;

/** One line each, for people. */
export function playerWarnings(
  { bake }: ThrowFile,
  throws: readonly BakedThrow[],
  chains: readonly BakedChain[],
  props: ReadonlyMap<string, LoadedProp>,
): string[] {
  const used = new Set([...throws.map(({ entry }) => entry.prop), ...chains.map(({ prop }) => prop)]);
  return [
    ...throws.flatMap(spinWarning),
    ...[...throws, ...chains].flatMap(({ entry: { name } }) => flagWarning(name)),
    ...Array.from(props).flatMap(([name, loaded]) =>
      used.has(name) ? nodeWarnings(bake.layout, loaded) : [],
    ),
  ];
}

function spinWarning({ entry, takes }: BakedThrow): string[] {
  const limit = Math.PI * RESAMPLED_AT;
  const fast = takes.filter(({ take }) => take.flight.greatestRate > limit);
  if (fast.length === 0) return [];
  const most = Math.max(...fast.map(({ take }) => take.flight.greatestRate)) / (2 * Math.PI);
  const which = fast.length === 1 ? fast[0].name : `${fast.length} takes of ${entry.name}`;
  const [turn, show] = fast.length === 1 ? ["turns", "shows it"] : ["turn", "shows them"];
  return [
    `${which} ${turn} up to ${most.toPrecision(3)} times a second, over 180° in 1/${RESAMPLED_AT} s: an importer that samples clips again at ${RESAMPLED_AT} Hz ${show} turning otherwise`,
  ];
}

function flagWarning(throwName: string): string[] {
  const word = /loop|cycle/i.exec(throwName)?.[0];
  if (word === undefined) return [];
  return [
    `the clips of ${throwName} have "${word}" in their names: one importer takes that for a flag and strips it`,
  ];
}

function nodeWarnings(layout: ThrowFile["bake"]["layout"], { prop, model }: LoadedProp): string[] {
  const own = (model.json.nodes ?? []).map(({ name }) => name);
  if (prop.node) {
    const { name } = prop.node;
    const odd = /[[\].:/\s]/.exec(name)?.[0];
    return odd === undefined
      ? []
      : [
          `the node "${name}" of ${model.name} has "${odd}" in its name: one loader rewrites it, so that code finds it by another`,
        ];
  }
  return addedNames(prop, layout)
    .filter((name) => own.includes(name))
    .map(
      (name) =>
        `${model.name} has a node "${name}" already: one loader renames the second, so that code may find the wrong one`,
    );
}
