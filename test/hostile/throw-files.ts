/** Throw files to be changed: each throw and chain of the demo with what it needs, the requests, and one with every key. */

import { readFileSync } from "node:fs";
import { parse, stringify } from "yaml";
import { assets } from "../cli/folder.js";
import { requests } from "../requests/requests.js";
import { EVERY_KEY } from "../throwfile/quay.js";
import type { Chance } from "./chance.js";

type Entry = Record<string, unknown> & { like?: string; prop?: string; throws?: string[] };
interface Tree extends Record<string, unknown> {
  bake?: Record<string, unknown>;
  props: Record<string, Entry>;
  throws: Record<string, Entry>;
  chains?: Record<string, Entry>;
}

const DEMO: Tree = parse(readFileSync(assets("quay.throws.yaml"), "utf8"));

const DEMO_PIECES = [...Object.keys(DEMO.throws), ...Object.keys(DEMO.chains ?? {})].map((name) =>
  piece(DEMO, name),
);

/** Models are named from the folder of the demo's throw file. */
export const THROW_FILES: readonly string[] = [
  ...DEMO_PIECES.map((tree) => stringify(tree)),
  ...Object.values(requests).map((text) => text.replaceAll("../../assets/", "")),
  EVERY_KEY,
];

/** Of a throw or chain, its props and all throws it takes after or is made of. */
function piece(file: Tree, name: string): Tree {
  const [throws, props] = [new Set<string>(), new Set<string>()];
  const need = (name: string) => {
    const { like, prop } = file.throws[name];
    throws.add(name);
    if (prop) props.add(prop);
    if (like) need(like);
  };
  const chain = file.chains?.[name];
  for (const member of chain?.throws ?? [name]) need(member);
  const kept = (entries: Record<string, Entry>, names: ReadonlySet<string>) =>
    Object.fromEntries(Object.entries(entries).filter(([name]) => names.has(name)));
  const { chains: _, ...rest } = file;
  return {
    ...rest,
    props: kept(file.props, props),
    throws: kept(file.throws, throws),
    ...(chain && { chains: { [name]: chain } }),
  };
}

const SETTINGS = {
  keys: ["linear", "linear", "cubic", "smallest", "frames"],
  layout: ["one-node", "one-node", "two-node", "turn-only"],
  files: ["per-throw", "per-take", "together"],
  container: ["glb", "gltf"],
  mesh: [true, false],
  pack: ["float", "int16"],
};

/** One of them, perhaps with other settings of what is written. */
export function anyThrowFile(chance: Chance): string {
  const text = chance.pick(THROW_FILES);
  if (chance.below(3) > 0 || text === EVERY_KEY) return text;
  const tree: Tree = parse(text);
  for (const [key, values] of Object.entries(SETTINGS))
    if (chance.below(2) === 0) tree.bake = { ...tree.bake, [key]: chance.pick<unknown>(values) };
  return stringify(tree);
}
