/**
 * `like`: a throw takes the keys of another, merged key by key at any depth. Done on the tree as written, so that every
 * inherited key keeps the place where it really stands.
 */

import { pathText, shown } from "./errors.js";
import { nearestHint } from "./nearest.js";
import type { Entry, MapNode, Node } from "./tree.js";

/** `remedy` may be a function where it costs time: it is only asked for faults that are told. */
export type TellThrow = (name: string, fault: string, remedy: string | (() => string)) => void;

/**
 * The throws with everything inherited. `tell` hears of a `like` that cannot be; `broken` are the throws that lack
 * something because of it.
 */
export function inherit(throws: MapNode, tell: TellThrow): { throws: MapNode; broken: ReadonlySet<string> } {
  const broken = new Set<string>();
  const tellBroken: TellThrow = (name, fault, remedy) => {
    broken.add(name);
    tell(name, fault, remedy);
  };
  const done = new Map<string, Entry>();
  for (const name of throws.entries.keys()) {
    // up to an ancestor already merged, or one like nothing; then down again
    const chain = new Set<string>();
    let current: string | undefined = name;
    while (current !== undefined && !done.has(current) && !chain.has(current)) {
      chain.add(current);
      current = parentOf(throws, current, tellBroken);
    }
    if (current !== undefined && chain.has(current)) tellCircle([...chain], current, tellBroken);
    let parent = current !== undefined ? done.get(current) : undefined;
    for (const child of [...chain].reverse()) {
      if (current !== undefined && broken.has(current)) broken.add(child);
      current = child;
      const own: Entry = throws.entries.get(child)!;
      const merged: Entry = parent ? { at: own.at, node: merge(parent.node, own.node) } : own;
      done.set(child, merged);
      parent = merged;
    }
  }
  const entries = new Map<string, Entry>();
  for (const name of throws.entries.keys()) entries.set(name, done.get(name)!);
  return { throws: { ...throws, entries }, broken };
}

function tellCircle(chain: string[], start: string, tell: TellThrow): void {
  const circle = [...chain.slice(chain.indexOf(start)), start];
  const names = circle.slice(0, 8).map((name) => pathText([name]));
  tell(start, `a circle (found ${names.join(" like ")})`, "one of them must stand on its own");
}

function parentOf(throws: MapNode, name: string, tell: TellThrow): string | undefined {
  const node = throws.entries.get(name)!.node;
  const like = node.kind === "map" ? node.entries.get("like")?.node : undefined;
  if (like === undefined || (like.kind === "value" && like.value === null)) return undefined;
  const parent = like.kind === "value" && typeof like.value === "string" ? like.value : undefined;
  if (parent !== undefined && throws.entries.has(parent)) return parent;
  if (parent === undefined)
    tell(
      name,
      `not a name (found ${like.kind === "value" ? shown(like.value) : `a ${like.kind}`})`,
      "the name of another throw",
    );
  else
    tell(name, `no throw has this name (found ${shown(parent)})`, () =>
      nearestHint(
        parent,
        [...throws.entries.keys()].filter((other) => other !== name),
        "throw",
      ),
    );
  return undefined;
}

function merge(inherited: Node, own: Node): Node {
  if (own.kind !== "map") return own;
  const base =
    inherited.kind === "map" && !isChoice(inherited) && !isChoice(own) ? inherited.entries : undefined;
  const entries = new Map<string, Entry>(base);
  for (const [key, entry] of own.entries) {
    const before = base?.get(key)?.node;
    let node = entry.node;
    if (node.kind === "value" && node.value === null) node = { ...node, value: undefined };
    else if (node.kind === "map") node = merge(before ?? EMPTY, node);
    entries.set(key, { at: entry.at, node });
  }
  entries.delete("like");
  const like = own.entries.get("like");
  if (like) entries.set("like", like);
  return { ...own, entries };
}

const EMPTY: Node = { kind: "map", at: { line: 1, column: 1 }, entries: new Map(), size: 1 };

/** `{pick: …}` and `{each: …}` are values: one replaces the other. */
const isChoice = (node: MapNode) => node.entries.has("pick") || node.entries.has("each");
