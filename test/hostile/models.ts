/** Models to be changed, and the ways to change them: bytes, header, JSON as text and as a tree, numbers of the binary part. */

import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { splitGlb } from "../../src/gltf/glb.js";
import { readModel } from "../../src/gltf/read.js";
import { spliceGlb } from "../../src/gltf/splice.js";
import { dracoGlb, lossyMeshoptGlb, open } from "../gltf/compressed.js";
import { glbOf, graft, tetrahedron } from "../gltf/models.js";
import type { Chance } from "./chance.js";
import { mutateTree } from "./trees.js";
import { otherNumber } from "./values.js";

/** Each change costs a weighing: what is larger says no more. */
const GREATEST_BYTES = 70_000;

const data = (name: string) => fileURLToPath(new URL(`../data/${name}`, import.meta.url));

const filesIn = (folder: string): Uint8Array[] =>
  readdirSync(folder)
    .filter((name) => /\.gl(b|tf)$/.test(name))
    .sort()
    .map((name) => new Uint8Array(readFileSync(join(folder, name))))
    .filter((bytes) => bytes.length <= GREATEST_BYTES);

export async function readModels(): Promise<Uint8Array[]> {
  const props = [...filesIn(data("props")), ...filesIn(data("props/bad")), ...filesIn(data("real"))];
  const club = new Uint8Array(readFileSync(data("props/club.glb")));
  return [
    ...props,
    // the same with their bytes in the JSON, or in a file beside it
    ...props.slice(0, 12).map((bytes, i) => asGltf(bytes, i % 2 === 0)),
    // with two clips
    spliceGlb(await readModel("a model", tetrahedron()), graft()),
    await dracoGlb(await open(club), "EDGEBREAKER", 14),
    await dracoGlb(await open(club), "SEQUENTIAL", 10),
    await lossyMeshoptGlb(await open(club)),
  ];
}

/** The file beside a .gltf, whatever it is called. */
export const BESIDE = new Uint8Array(4096);

function asGltf(bytes: Uint8Array, inside: boolean): Uint8Array {
  const { json, binary = new Uint8Array() } = splitGlb("a model", bytes);
  const tree = JSON.parse(new TextDecoder().decode(json));
  tree.buffers[0].uri = inside
    ? `data:application/octet-stream;base64,${Buffer.from(binary).toString("base64")}`
    : "beside.bin";
  return new TextEncoder().encode(JSON.stringify(tree));
}

export function mutateModel(bytes: Uint8Array, chance: Chance): Uint8Array {
  const way = chance.below(10);
  if (way === 0) return withOtherBytes(bytes, chance);
  if (way === 1) return withOtherLength(bytes, chance);
  const parts = partsOf(bytes);
  if (!parts) return withOtherBytes(bytes, chance);
  const { json, binary } = parts;
  if (way < 4 && binary) return glbOf(json, withOtherNumbers(binary, chance));
  const text = way === 4 ? withOtherText(json, chance) : withOtherTree(json, chance, way < 8 ? 0.2 : 0.7);
  return binary ? glbOf(text, binary) : new TextEncoder().encode(text);
}

function partsOf(bytes: Uint8Array): { json: string; binary?: Uint8Array } | undefined {
  try {
    if (bytes[0] === 0x7b) return { json: new TextDecoder().decode(bytes) };
    const { json, binary } = splitGlb("a model", bytes);
    return { json: new TextDecoder().decode(json), binary };
  } catch {
    return undefined;
  }
}

function withOtherBytes(bytes: Uint8Array, chance: Chance): Uint8Array {
  const changed = bytes.slice();
  // the header and the JSON say most
  const most = chance.pick([40, 1500, changed.length]);
  for (let count = chance.few(30); count > 0; count--)
    changed[chance.below(Math.min(most, changed.length))] = chance.below(256);
  return changed;
}

function withOtherLength(bytes: Uint8Array, chance: Chance): Uint8Array {
  const at = chance.below(bytes.length);
  const way = chance.below(3);
  if (way === 0) return bytes.slice(0, at);
  if (way === 1) return new Uint8Array([...bytes, ...bytes.subarray(at)]);
  return new Uint8Array([...bytes.subarray(0, at), ...bytes.subarray(at + chance.few(200))]);
}

function withOtherNumbers(binary: Uint8Array, chance: Chance): Uint8Array {
  const changed = binary.slice();
  const view = new DataView(changed.buffer);
  for (let count = chance.few(60); count > 0; count--) {
    const at = chance.below(changed.length - 4) & ~3;
    if (at + 4 > changed.length) break;
    const way = chance.below(4);
    if (way === 0) view.setUint32(at, chance.pick([0, 1, 0xffff, 0xffffffff, 0x7fc00000, 0x7f800000]), true);
    else if (way === 1) changed.copyWithin(at, chance.below(changed.length), chance.below(changed.length));
    else view.setFloat32(at, otherNumber(chance, view.getFloat32(at, true)), true);
  }
  return changed;
}

function withOtherText(json: string, chance: Chance): string {
  let text = json;
  for (let count = chance.few(3); count > 0; count--) {
    const at = chance.below(text.length);
    const put = chance.pick([
      '"',
      "{",
      "}",
      "[",
      "]",
      ",",
      ":",
      "0",
      "-",
      "e",
      "\\u0000",
      " ",
      "null",
      "\ud800",
    ]);
    text = text.slice(0, at) + put + text.slice(at + chance.below(3));
  }
  return text;
}

function withOtherTree(json: string, chance: Chance, harsh: number): string {
  try {
    const tree = JSON.parse(json);
    mutateTree(tree, chance, harsh);
    return JSON.stringify(tree) ?? "";
  } catch {
    return withOtherText(json, chance);
  }
}
