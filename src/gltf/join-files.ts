/** Several glTF files in one: their lists one behind the other, their scenes in one. */

import type { GLTF } from "@gltf-transform/core";
import { JsonEdit } from "./json-edit.js";
import type { GltfJson } from "./model.js";
import { LISTS, type Offsets, renumbered } from "./renumber.js";

/** A file's JSON and the bytes of its first buffer, the only one outside the JSON. */
export interface FileContent {
  /** As messages call it. */
  name: string;
  text: string;
  binary: Uint8Array;
}

/** Lists of extensions at the root that parts of a file count in. */
const ROOT_LISTS = [
  ["KHR_lights_punctual", "lights"],
  ["KHR_materials_variants", "variants"],
] as const;

/**
 * The first file stays to the letter, with the others' lists behind its own and their default scenes' roots in its default scene. Throws
 * ModelError where one of the others uses an extension that may count in lists which are not known.
 */
export function joinFiles(files: readonly FileContent[]): Omit<FileContent, "name"> {
  const [{ text, binary }, ...others] = files;
  const first: GltfJson = JSON.parse(text);
  const offsets = countsOf(first, binary);
  const added = LISTS.map((): unknown[] => []);
  const parts = [first];
  const pieces = [{ at: 0, bytes: binary }];
  for (const other of others) {
    const json: GltfJson = JSON.parse(other.text);
    // aligned for any accessor
    offsets.bytes += -offsets.bytes & 7;
    pieces.push({ at: offsets.bytes, bytes: other.binary });
    const moved = renumbered(other.name, json, offsets);
    LISTS.forEach((list, i) => {
      added[i].push(...kept(moved, list));
    });
    parts.push(moved);
    const counts = countsOf(moved, other.binary);
    for (const list of Object.keys(counts) as (keyof Offsets)[]) offsets[list] += counts[list];
    // of each but the first the default scene and buffer 0 go into the first's
    offsets.buffers--;
    offsets.scenes--;
  }
  const edit = new JsonEdit(text);
  if (!first.buffers?.length && offsets.bytes > 0) edit.append("buffers", [{ byteLength: offsets.bytes }]);
  else if (offsets.bytes > 0) edit.set(["buffers", 0], "byteLength", offsets.bytes);
  LISTS.forEach((list, i) => {
    edit.append(list, added[i]);
  });
  edit.set(
    ["scenes", first.scene ?? 0],
    "nodes",
    parts.flatMap((json) => defaultScene(json)?.nodes ?? []),
  );
  setExtensions(edit, parts);
  const joined = new Uint8Array(offsets.bytes);
  for (const { at, bytes } of pieces) joined.set(bytes, at);
  return { text: edit.result(), binary: joined };
}

const defaultScene = ({ scene = 0, scenes = [] }: GltfJson): GLTF.IScene | undefined => scenes[scene];

/** What of another file's list is put behind the first's. */
function kept(json: GltfJson, list: (typeof LISTS)[number]): unknown[] {
  const items: unknown[] = json[list] ?? [];
  if (list === "buffers") return items.slice(1);
  return list === "scenes" ? items.filter((scene) => scene !== defaultScene(json)) : items;
}

function countsOf(json: GltfJson, binary: Uint8Array): Offsets {
  const counts = Object.fromEntries(LISTS.map((list) => [list, json[list]?.length ?? 0]));
  const roots = Object.fromEntries(
    ROOT_LISTS.map(([extension, list]) => [list, rootList(json, extension, list).length]),
  );
  const merged = { ...counts, ...roots, bytes: binary.length } as Offsets;
  // the joined file has both whatever the first had
  return { ...merged, buffers: Math.max(1, merged.buffers), scenes: Math.max(1, merged.scenes) };
}

const rootList = (json: GltfJson, extension: string, list: string): unknown[] =>
  ((json.extensions?.[extension] as Record<string, unknown[]> | undefined)?.[list] ?? []) as unknown[];

function setExtensions(edit: JsonEdit, parts: readonly GltfJson[]): void {
  const [first] = parts;
  for (const key of ["extensionsUsed", "extensionsRequired"] as const) {
    const names = [...new Set(parts.flatMap((json) => json[key] ?? []))];
    if (names.length > (first[key]?.length ?? 0)) edit.set([], key, names);
  }
  const lists = ROOT_LISTS.flatMap(([extension, list]) => {
    const items = parts.flatMap((json) => rootList(json, extension, list));
    return items.length > rootList(first, extension, list).length ? [[extension, { [list]: items }]] : [];
  });
  if (lists.length > 0) edit.set([], "extensions", { ...first.extensions, ...Object.fromEntries(lists) });
}
