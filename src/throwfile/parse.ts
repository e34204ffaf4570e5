/** Text → a throw file of which everything that can be known without weighing and drawing has been checked. */

import type * as z from "zod";
import { checkChain } from "./chain-rules.js";
import { Faults } from "./collect.js";
import { shown, ThrowFileError } from "./errors.js";
import { checkFlight } from "./flight-rules.js";
import { isObject } from "./form.js";
import { inherit } from "./inherit.js";
import { checkNames } from "./names.js";
import { nearestHint, unknownKey } from "./nearest.js";
import { propSchema } from "./prop-schema.js";
import { readYaml } from "./read-yaml.js";
import { checkReferences } from "./references.js";
import { rulesOf } from "./rules.js";
import { chainSchema, USUAL, usualThrow } from "./schema.js";
import { checkSpin } from "./spin-rules.js";
import { throwSchema } from "./throw-schema.js";
import { find, locate, type MapNode, type Node, plain } from "./tree.js";
import type { BakeSettings, ChainEntry, KeyPath, PropEntry, ThrowEntry, ThrowFile } from "./types.js";

/**
 * Reads a throw file, YAML 1.2 or JSON; `name` is what messages call it.
 *
 * @throws ThrowFileError with every fault, at most ten
 */
export function parseThrowFile(name: string, text: string): ThrowFile {
  const { root: written, faults: syntax } = readYaml(text.replace(/^\uFEFF/, ""));
  if (written === undefined) throw new ThrowFileError(name, syntax);
  if (written.kind !== "map")
    throw new ThrowFileError(name, [
      { ...written.at, path: [], fault: "not a map of keys", remedy: "keys such as props, throws, bake" },
    ]);
  const faults = new Faults();
  const { root, broken } = withInherited(written, faults);

  const shape = USUAL.shape;
  for (const key of root.entries.keys())
    if (!Object.hasOwn(shape, key))
      faults.tell([key], "unknown key", () =>
        unknownKey(key, Object.keys(shape), Object.hasOwn(shape.bake.unwrap().shape, key) ? ["bake"] : []),
      );
  const top = <T>(key: string, schema: z.ZodType<T>): T | undefined => {
    const node = find(root, [key]);
    const value = node && plain(node);
    const read = schema.safeParse(value);
    if (read.success) return read.data;
    faults.tellIssues([key], value, schema, read.error.issues);
    return undefined;
  };
  const frameRate = top("frameRate", shape.frameRate) ?? 30;
  top("$schema", shape.$schema);
  const seed = top("seed", shape.seed) ?? "0";
  const gravity = top("gravity", shape.gravity) ?? 0;
  const host = top("host", shape.host);
  const bake = top("bake", shape.bake) as BakeSettings | undefined;
  if (bake?.pack === "int16" && bake.keys === "cubic")
    faults.tell(
      ["bake", "pack"],
      "cubic keys cannot be packed (found int16 and cubic)",
      "float, or other keys",
    );

  checkNames(root, faults.tell);
  const props = readProps(root, faults);
  const throws = readThrows(root, written, broken, frameRate, bake?.layout === "turn-only", faults);
  const chains = readChains(root, throws, faults);
  faults.finish(name, written, root);
  return {
    name,
    seed,
    gravity,
    frameRate,
    ...(host ? { host } : {}),
    bake: bake!,
    props,
    throws,
    chains,
    locate: (path) => locate(root, path),
  };
}

/** The file with every `like` carried out, and the names of throws where that failed. */
function withInherited(written: MapNode, faults: Faults): { root: MapNode; broken: ReadonlySet<string> } {
  const entry = written.entries.get("throws");
  if (entry?.node.kind !== "map") return { root: written, broken: new Set() };
  const { throws, broken } = inherit(entry.node, (name, fault, remedy) =>
    faults.tell(["throws", name, "like"], fault, remedy),
  );
  const root = {
    ...written,
    entries: new Map(written.entries).set("throws", { at: entry.at, node: throws }),
  };
  return { root, broken };
}

/** The entries of a map of names that are maps themselves; what is not is told. */
function entriesOf(root: Node, key: string, example: string, faults: Faults): [string, unknown][] {
  const node = find(root, [key]);
  if (node === undefined) return [];
  if (node.kind !== "map") {
    faults.tell([key], `not a map of names (found ${shown(plain(node))})`, example);
    return [];
  }
  const entries: [string, unknown][] = [];
  for (const [name, { node: entry }] of node.entries) {
    const value = plain(entry);
    if (isObject(value)) entries.push([name, value]);
    else faults.tell([key, name], `not a map (found ${shown(value)})`, example);
  }
  return entries;
}

function readProps(root: Node, faults: Faults): Map<string, PropEntry> {
  const props = new Map<string, PropEntry>();
  const node = find(root, ["props"]);
  if (node === undefined || (node.kind === "map" && node.entries.size === 0))
    faults.tell(node ? ["props"] : [], "no prop is described", "props: {NAME: {model: FILE.glb}}");
  for (const [name, value] of entriesOf(root, "props", "NAME: {model: FILE.glb}", faults)) {
    const path = ["props", name];
    const read = propSchema.safeParse(value);
    if (read.success) {
      checkProp(read.data as unknown as PropEntry, path, faults);
      props.set(name, { name, ...read.data } as PropEntry);
    } else faults.tellIssues(path, value, propSchema, read.error.issues);
  }
  return props;
}

function checkProp(prop: PropEntry, path: KeyPath, faults: Faults): void {
  const { model, shape, node, points } = prop;
  if (model !== undefined && shape !== undefined)
    faults.tell([...path, "shape"], "they exclude each other (found model and shape)", "drop model or shape");
  else if (model === undefined && shape === undefined)
    faults.tell(path, "nothing to throw", "add model: FILE.glb, or shape such as {sphere: 0.1}");
  if (model !== undefined && !/\.(glb|gltf)$/i.test(model))
    faults.tell(
      [...path, "model"],
      `not a glTF file (found ${shown(model)})`,
      "a file ending in .glb or .gltf",
    );
  if (shape === undefined || model !== undefined) return;
  if (node !== undefined)
    faults.tell([...path, "node"], `a shape has no nodes (found ${shown(node)})`, "drop node");
  for (const [name, point] of Object.entries(points))
    if ("node" in point)
      faults.tell(
        [...path, "points", name],
        `a shape has no nodes (found ${shown(point.node)})`,
        "[x, y, z]",
      );
}

function readThrows(
  root: Node,
  written: Node,
  broken: ReadonlySet<string>,
  frameRate: number,
  turnOnly: boolean,
  faults: Faults,
): Map<string, ThrowEntry> {
  const throws = new Map<string, ThrowEntry>();
  const schema = frameRate === 30 ? usualThrow : throwSchema(frameRate);
  const props = keysOf(root, ["props"]);
  for (const [name, value] of entriesOf(root, "throws", "NAME: {prop: …, release: …, arrive: …}", faults)) {
    const path = ["throws", name];
    const under = (key: string) => [...path, ...(key === "" ? [] : key.split("."))];
    if (broken.has(name)) {
      // what it would have inherited is no fault of its own
      const read = schema.safeParse({ prop: "inherited", ...(value as object) });
      if (!read.success) faults.tellIssues(path, value, schema, read.error.issues);
      continue;
    }
    const read = schema.safeParse(value);
    const keysAreRight = read.success || faults.tellIssues(path, value, schema, read.error.issues);
    if (keysAreRight) {
      const rules = rulesOf(
        value,
        (key, fault, remedy) => faults.tell(under(key), fault, remedy),
        (keys) => latest(root, written, keys, under),
      );
      checkFlight(rules, turnOnly);
      checkSpin(rules);
    }
    if (!read.success) continue;
    const { like: _, ...keys } = read.data;
    const entry = { name, ...keys } as ThrowEntry;
    throws.set(name, entry);
    if (!props.includes(entry.prop))
      faults.tell([...path, "prop"], `no prop has this name (found ${shown(entry.prop)})`, () =>
        nearestHint(entry.prop, props, "prop"),
      );
    else
      checkReferences(entry, keysOf(root, ["props", entry.prop, "points"]), (fault, remedy, ...inner) =>
        faults.tell([...path, ...inner], fault, remedy),
      );
  }
  return throws;
}

/** The key that was written last, of those the throw wrote itself if there are any. */
function latest(root: Node, written: Node, keys: readonly string[], under: (key: string) => KeyPath): string {
  const own = keys.filter((key) => find(written, under(key)) !== undefined);
  const at = (key: string) => locate(root, under(key));
  return (own.length > 0 ? own : [...keys]).sort(
    (a, b) => at(b).line - at(a).line || at(b).column - at(a).column,
  )[0];
}

function readChains(
  root: Node,
  throws: ReadonlyMap<string, ThrowEntry>,
  faults: Faults,
): Map<string, ChainEntry> {
  const chains = new Map<string, ChainEntry>();
  const names = keysOf(root, ["throws"]);
  for (const [name, value] of entriesOf(root, "chains", "NAME: {throws: [a, b, c]}", faults)) {
    const path = ["chains", name];
    const read = chainSchema.safeParse(value);
    if (read.success) {
      chains.set(name, { name, ...read.data });
      checkChain(read.data.throws, throws, names, (fault, remedy, ...inner) =>
        faults.tell([...path, ...inner], fault, remedy),
      );
    } else faults.tellIssues(path, value, chainSchema, read.error.issues);
  }
  return chains;
}

function keysOf(root: Node, path: KeyPath): string[] {
  const node = find(root, path);
  return node?.kind === "map" ? [...node.entries.keys()] : [];
}
