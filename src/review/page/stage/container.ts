/** A baked file taken apart, with everything it names inside. */

import type { GLTF } from "@gltf-transform/core";
import { isGlb, joinGlb, splitGlb } from "../../../gltf/glb.js";
import { isDataUri } from "../../../gltf/uri.js";
import type { FileSource } from "./input.js";

export interface Container {
  json: GLTF.IGLTF;
  /** Content of each buffer. */
  buffers: Uint8Array[];
}

/** Reads a .glb, or a .gltf with the files that it names. */
export async function openContainer(name: string, file: FileSource): Promise<Container> {
  const bytes = new Uint8Array(await file(name));
  const chunks = isGlb(bytes) ? splitGlb(name, bytes) : { json: bytes };
  const json: GLTF.IGLTF = JSON.parse(new TextDecoder().decode(chunks.json));
  const buffers = await Promise.all(
    (json.buffers ?? []).map(async ({ uri }, i) => {
      if (uri !== undefined) return fetched(uri, file);
      return (i === 0 && "binary" in chunks && chunks.binary) || new Uint8Array();
    }),
  );
  await Promise.all(
    (json.images ?? []).map(async (image) => {
      if (image.uri === undefined || isDataUri(image.uri)) return;
      buffers.push(await fetched(image.uri, file));
      const view = { buffer: buffers.length - 1, byteLength: buffers[buffers.length - 1].length };
      json.bufferViews = [...(json.bufferViews ?? []), view];
      image.mimeType ??= /\.png$/i.test(image.uri) ? "image/png" : "image/jpeg";
      image.bufferView = json.bufferViews.length - 1;
      delete image.uri;
    }),
  );
  return { json, buffers };
}

async function fetched(uri: string, file: FileSource): Promise<Uint8Array> {
  if (!isDataUri(uri)) return new Uint8Array(await file(decodeURIComponent(uri)));
  const comma = uri.indexOf(",");
  const content = uri.slice(comma + 1);
  const text = /;base64$/i.test(uri.slice(0, comma)) ? atob(content) : decodeURIComponent(content);
  return Uint8Array.from(text, (character) => character.charCodeAt(0));
}

/** The same as one .glb with one buffer. */
export function asGlb({ json, buffers }: Container): ArrayBuffer {
  const starts: number[] = [];
  let total = 0;
  for (const { length } of buffers) {
    starts.push(total);
    total += length + (-length & 3);
  }
  const binary = new Uint8Array(total);
  buffers.forEach((content, i) => {
    binary.set(content, starts[i]);
  });
  const moved = {
    ...json,
    buffers: total > 0 ? [{ byteLength: total }] : [],
    bufferViews: json.bufferViews?.map((view) => shifted(view, starts)),
  };
  const text = new TextEncoder().encode(JSON.stringify(moved));
  return joinGlb({ json: text, ...(total > 0 && { binary }) }).slice().buffer as ArrayBuffer;
}

/** Compressed views name a buffer in their extension too. */
function shifted(view: GLTF.IBufferView, starts: readonly number[]): GLTF.IBufferView {
  const { extensions } = view;
  const at = <T extends { buffer: number; byteOffset?: number }>(each: T): T => ({
    ...each,
    buffer: 0,
    byteOffset: (each.byteOffset ?? 0) + starts[each.buffer],
  });
  if (!extensions) return at(view);
  const inside = Object.entries(extensions).map(([name, content]) => [
    name,
    "buffer" in (content as object) ? at(content as { buffer: number }) : content,
  ]);
  return { ...at(view), extensions: Object.fromEntries(inside) };
}
