/**
 * Keys that the grammar has and the program cannot do yet. They are checked like all others, then refused by name. Work
 * that makes one possible takes its line out.
 */

import { shown } from "./errors.js";
import { type Node, plain } from "./tree.js";
import type { KeyPath } from "./types.js";

interface NotYet {
  /** Keys with dots between, `*` for any name. */
  readonly key: string;
  /** What is missing. */
  readonly missing: string;
  /** The one value that does not work yet. */
  readonly alone?: unknown;
  /** The key next to it that it does not go with yet. */
  readonly beside?: string;
}

export const NOT_YET: readonly NotYet[] = [];

export function checkNotYet(
  root: Node,
  tell: (path: KeyPath, fault: string, remedy: string) => void,
  table: readonly NotYet[] = NOT_YET,
): void {
  for (const { key, missing, alone, beside } of table)
    for (const [path, node] of matches(root, key.split("."))) {
      const written = node.kind === "value" ? node.value : node;
      if (written === undefined || (alone !== undefined && written !== alone)) continue;
      const isBeside = (other: string) => matches(root, [...path.slice(0, -1).map(String), other]).length > 0;
      if (beside !== undefined && !isBeside(beside)) continue;
      const found = node.kind === "value" ? ` (found ${shown(plain(node))})` : "";
      const right = beside === undefined ? "leave this key out" : `leave this key or ${beside} out`;
      tell(path, `not there yet: ${missing}${found}`, right);
    }
}

function matches(root: Node, keys: readonly string[]): [KeyPath, Node][] {
  let found: [KeyPath, Node][] = [[[], root]];
  for (const key of keys)
    found = found.flatMap(([path, node]): [KeyPath, Node][] => {
      if (node.kind !== "map") return [];
      const names = key === "*" ? [...node.entries.keys()] : node.entries.has(key) ? [key] : [];
      return names.map((name) => [[...path, name], node.entries.get(name)!.node]);
    });
  return found;
}
