/** What some players of glTF do to a file, told before it is opened there: facts about importers, from their sources and issue threads. */

import type { ThrowFile } from "../throwfile/types.js";
import { addedNames } from "./graft.js";
import { RESAMPLED_AT, type ThrowNotes } from "./notes.js";
import type { LoadedProp } from "./props.js";

/** One line each, for people. */
export function playerWarnings(
  { bake }: Pick<ThrowFile, "bake">,
  notes: readonly ThrowNotes[],
  props: ReadonlyMap<string, LoadedProp>,
): string[] {
  const made = notes.filter(({ takes }) => takes > 0);
  const used = new Set(made.map(({ prop }) => prop));
  return [
    ...made.flatMap(spinWarning),
    ...made.flatMap(({ name }) => flagWarning(name)),
    ...Array.from(props).flatMap(([name, loaded]) =>
      used.has(name) ? nodeWarnings(bake.layout, loaded) : [],
    ),
  ];
}

function spinWarning({ name, fast: { count, most, name: first } }: ThrowNotes): string[] {
  if (count === 0) return [];
  const rate = (most / (2 * Math.PI)).toPrecision(3);
  const which = count === 1 ? first : `${count} takes of ${name}`;
  const [turn, show] = count === 1 ? ["turns", "shows it"] : ["turn", "shows them"];
  return [
    `${which} ${turn} up to ${rate} times a second, over 180° in 1/${RESAMPLED_AT} s: an importer that samples clips again at ${RESAMPLED_AT} Hz ${show} turning otherwise`,
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
