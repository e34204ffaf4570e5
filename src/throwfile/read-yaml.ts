/** YAML 1.2 (core schema, merge keys; JSON is a part of it) → tree of nodes with places. */

import {
  type Document,
  isAlias,
  isMap,
  isPair,
  isScalar,
  LineCounter,
  parseDocument,
  Scalar,
  visit,
  type YAMLMap,
  type Node as YamlNode,
} from "yaml";
import type { Fault } from "./errors.js";
import { tooDeep } from "./nesting.js";
import { syntaxFault } from "./syntax-fault.js";
import type { Entry, MapNode, Node } from "./tree.js";
import type { KeyPath, Position } from "./types.js";

const MOST_CHARACTERS = 4_000_000;
const MOST_NESTING = 40;
/** With what aliases stand for: a few lines of them can stand for billions. */
const MOST_NODES = 500_000;

/**
 * Reads `text` without a byte order mark. The tree is there when there is no fault: syntax errors, a key written twice,
 * tags, an alias to nothing or to itself, more than a machine should swallow.
 */
export function readYaml(text: string): { root: Node | undefined; faults: Fault[] } {
  const refuse = (at: Position, fault: string, remedy: string, path: KeyPath = []) => ({
    root: undefined,
    faults: [{ ...at, path, fault, remedy }],
  });
  const start = { line: 1, column: 1 };
  if (text.length > MOST_CHARACTERS)
    return refuse(
      start,
      `the file is too long (found ${text.length} characters)`,
      `at most ${MOST_CHARACTERS}; split it into several files`,
    );
  const deep = tooDeep(text, MOST_NESTING);
  if (deep !== undefined)
    return refuse(
      placeOf(text, deep),
      "nested too deeply",
      `lists and maps in one another, at most ${MOST_NESTING} deep`,
    );

  const lines = new LineCounter();
  const document = parseDocument(text, {
    version: "1.2",
    schema: "core",
    uniqueKeys: false,
    prettyErrors: false,
    resolveKnownTags: false,
    lineCounter: lines,
  });
  const place = (offset: number): Position => {
    const { line, col } = lines.linePos(offset);
    return { line: Math.max(line, 1), column: Math.max(col, 1) };
  };
  const version = document.directives?.yaml;
  if (version?.explicit && version.version !== "1.2")
    return refuse(start, `a YAML ${version.version} file`, "YAML 1.2; leave the %YAML line out");
  const wrong = [...document.errors, ...document.warnings];
  if (wrong.length > 0) {
    const seen = new Set<number>();
    const faults = wrong
      .slice(0, 100)
      .sort((a, b) => a.pos[0] - b.pos[0])
      .filter((e) => !seen.has(e.pos[0]) && seen.add(e.pos[0]))
      .map((e) => ({
        ...place(Math.min(e.pos[0], text.length)),
        path: e.code === "MULTIPLE_DOCS" ? [] : pathAt(document, e.pos[0]),
        ...syntaxFault(e),
      }));
    return { root: undefined, faults };
  }
  if (document.contents === null) return refuse(start, "the file is empty", "needs `props` at least");
  return convert(document.contents as YamlNode, place);
}

function convert(contents: YamlNode, place: (offset: number) => Position) {
  const anchors = new Map<string, Node>();
  const faults: Fault[] = [];
  let nodes = 0;
  const offset = (node: YamlNode | null | undefined) => node?.range?.[0] ?? 0;

  const read = (node: YamlNode | null, path: KeyPath, at: Position): Node => {
    if (isAlias(node)) {
      const target = anchors.get(node.source);
      if (target === undefined)
        faults.push({
          ...at,
          path,
          fault: `*${node.source} stands for nothing written before it`,
          remedy: `put &${node.source} before an earlier value`,
        });
      nodes += target?.size ?? 1;
      return target ?? { kind: "value", at, value: null, size: 1 };
    }
    nodes++;
    const result = readOwn(node, path, at);
    const anchor = node?.anchor;
    if (anchor) anchors.set(anchor, result);
    return result;
  };

  const readOwn = (node: YamlNode | null, path: KeyPath, at: Position): Node => {
    if (node === null) return { kind: "value", at, value: null, size: 1 };
    if (node.tag && !/^(!|tag:yaml\.org,2002:(str|int|float|bool|null|map|seq))$/.test(node.tag))
      faults.push({ ...at, path, fault: `a tag (found ${node.tag})`, remedy: "leave it out" });
    if (isScalar(node)) return { kind: "value", at, value: scalarValue(node.value), size: 1 };
    if (isMap(node)) return readMap(node, path, at);
    const items: Node[] = [];
    let size = 1;
    for (const item of (node as { items?: unknown[] }).items ?? []) {
      if (nodes > MOST_NODES) break;
      const child = isPair(item) ? null : (item as YamlNode);
      const node = read(child, [...path, items.length], place(offset(child)));
      items.push(node);
      size += node.size;
    }
    return { kind: "list", at, items, size };
  };

  const readMap = (map: YAMLMap, path: KeyPath, at: Position): MapNode => {
    const entries = new Map<string, Entry>();
    const merged: Node[] = [];
    for (const pair of map.items) {
      if (nodes > MOST_NODES) break;
      const key = pair.key as YamlNode | null;
      const keyAt = place(offset(key));
      const name = keyText(key);
      if (name === undefined) {
        faults.push({ ...keyAt, path, fault: "a key that is no text", remedy: "name it with a word" });
        continue;
      }
      const here = [...path, name];
      const first = entries.get(name);
      if (first !== undefined)
        faults.push({
          ...keyAt,
          path: here,
          fault: `written twice (first at line ${first.at.line})`,
          remedy: "keep one of the two",
        });
      const node = read(pair.value as YamlNode | null, here, keyAt);
      if (name === "<<" && isScalar(key) && key.type === Scalar.PLAIN)
        merged.push(...mergeSources(node, here, keyAt));
      else if (first === undefined) entries.set(name, { at: keyAt, node });
    }
    // own keys win, then those of the source named first
    for (const source of merged)
      if (source.kind === "map")
        for (const [key, entry] of source.entries) if (!entries.has(key)) entries.set(key, entry);
    let size = 1;
    for (const entry of entries.values()) size += entry.node.size;
    return { kind: "map", at, entries, size };
  };

  const mergeSources = (node: Node, path: KeyPath, at: Position): readonly Node[] => {
    const sources = node.kind === "list" ? node.items : [node];
    if (sources.some((s) => s.kind !== "map"))
      faults.push({
        ...at,
        path,
        fault: "merges what is no map",
        remedy: "give *NAME of a map, or a list of such",
      });
    return sources;
  };

  const root = read(contents, [], place(offset(contents)));
  if (nodes > MOST_NODES)
    faults.push({
      ...root.at,
      path: [],
      fault: "the file is too large",
      remedy: `at most ${MOST_NODES} values, those that aliases stand for counted each time`,
    });
  return { root: faults.length === 0 ? root : undefined, faults };
}

/** `true`, `7` or `007` as a key is the name it looks like. */
function keyText(key: YamlNode | null): string | undefined {
  if (!isScalar(key)) return undefined;
  if (typeof key.value === "string") return key.value;
  return key.source || undefined;
}

function scalarValue(value: unknown): string | number | boolean | null {
  if (typeof value === "string" || typeof value === "number" || typeof value === "boolean") return value;
  return typeof value === "bigint" ? Number(value) : null;
}

/** Keys on the way to the innermost pair that holds the offset. */
function pathAt(document: Document.Parsed, offset: number): KeyPath {
  let path: KeyPath = [];
  visit(document, {
    Pair(_, pair, ancestors) {
      const start = (pair.key as YamlNode | null)?.range?.[0];
      const end = (pair.value as YamlNode | null)?.range?.[2] ?? (pair.key as YamlNode | null)?.range?.[2];
      if (start === undefined || end === undefined || offset < start || offset > end) return visit.SKIP;
      const keys: string[] = [];
      for (const node of [...ancestors, pair]) {
        const key = isPair(node) ? keyText(node.key as YamlNode | null) : undefined;
        if (key !== undefined) keys.push(key);
      }
      path = keys;
      return undefined;
    },
  });
  return path;
}

function placeOf(text: string, offset: number): Position {
  const before = text.slice(0, offset).split("\n");
  return { line: before.length, column: before[before.length - 1].length + 1 };
}
