/** The file as written: maps, lists and values, each with its place. */

import type { KeyPath, Position } from "./types.js";

export type Node = MapNode | ListNode | ValueNode;

export interface MapNode {
  readonly kind: "map";
  readonly at: Position;
  readonly entries: ReadonlyMap<string, Entry>;
  /** Nodes in it, itself and what aliases stand for included. */
  readonly size: number;
}

export interface Entry {
  /** Place of the key. */
  readonly at: Position;
  readonly node: Node;
}

export interface ListNode {
  readonly kind: "list";
  readonly at: Position;
  readonly items: readonly Node[];
  readonly size: number;
}

export interface ValueNode {
  readonly kind: "value";
  readonly at: Position;
  /** `undefined`: an inherited key taken away. */
  readonly value: string | number | boolean | null | undefined;
  readonly size: 1;
}

/** Where the key or list item at `path` is written, else the nearest one around it. */
export function locate(root: Node, path: KeyPath): Position {
  let node: Node | undefined = root;
  let at = root.at;
  for (const key of path) {
    const next: Entry | Node | undefined = step(node, key);
    if (next === undefined) break;
    at = next.at;
    node = "node" in next ? next.node : next;
  }
  return at;
}

/** The node at `path`, if it is there. */
export function find(root: Node, path: KeyPath): Node | undefined {
  let node: Node | undefined = root;
  for (const key of path) {
    const next: Entry | Node | undefined = node && step(node, key);
    node = next && "node" in next ? next.node : next;
  }
  return node;
}

function step(node: Node, key: string | number): Entry | Node | undefined {
  if (node.kind === "map") return node.entries.get(String(key));
  if (node.kind === "list") return node.items[Number(key)];
  return undefined;
}

/** As JSON would have it; objects without a prototype, so that any key is safe. */
export function plain(node: Node): unknown {
  if (node.kind === "value") return node.value;
  if (node.kind === "list") return node.items.map(plain);
  const object: Record<string, unknown> = Object.create(null);
  for (const [key, entry] of node.entries) object[key] = plain(entry.node);
  return object;
}
