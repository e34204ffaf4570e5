/** The GLB container (glTF 2.0 specification, chapter 4): a header and chunks, each with its length and type in front. */

import { ModelError } from "./model.js";

export interface GlbChunks {
  json: Uint8Array;
  /** The BIN chunk, where there is one. */
  binary?: Uint8Array;
  /** What follows these two, headers included; readers must skip chunks they do not know. */
  others?: Uint8Array;
}

const MAGIC = 0x46546c67;
const JSON_TYPE = 0x4e4f534a;
const BINARY_TYPE = 0x004e4942;
const HEADER = 12;
const CHUNK_HEADER = 8;

export const isGlb = (bytes: Uint8Array): boolean =>
  bytes.length >= 4 && new DataView(bytes.buffer, bytes.byteOffset).getUint32(0, true) === MAGIC;

/** Takes a GLB apart without copying. Throws ModelError where a stated length is not what the file holds. */
export function splitGlb(name: string, bytes: Uint8Array): GlbChunks {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (bytes.length < HEADER + CHUNK_HEADER)
    throw new ModelError(
      name,
      `the file ends after ${bytes.length} bytes`,
      "a GLB has a header and a JSON chunk",
    );
  const version = view.getUint32(4, true);
  if (version !== 2) throw new ModelError(name, `the GLB version is ${version}`, "only version 2 is read");
  const stated = view.getUint32(8, true);
  if (stated !== bytes.length)
    throw new ModelError(
      name,
      `the header states ${stated} bytes and the file has ${bytes.length}`,
      "they must agree: the file is cut off or damaged",
    );
  const json = chunk(HEADER);
  if (json.type !== JSON_TYPE)
    throw new ModelError(name, `the first chunk is of type 0x${json.type.toString(16)}`, "it must be JSON");
  const second = json.end < bytes.length ? chunk(json.end) : undefined;
  const binary = second?.type === BINARY_TYPE ? second : undefined;
  let end = binary?.end ?? json.end;
  const others = end;
  while (end < bytes.length) end = chunk(end).end;
  return {
    json: json.content,
    ...(binary && { binary: binary.content }),
    ...(others < bytes.length && { others: bytes.subarray(others) }),
  };

  function chunk(start: number): { type: number; content: Uint8Array; end: number } {
    const left = bytes.length - start - CHUNK_HEADER;
    const length = left >= 0 ? view.getUint32(start, true) : 0;
    if (length > left)
      throw new ModelError(
        name,
        `the chunk at byte ${start} runs past the end of the file`,
        "the file is cut off or damaged",
      );
    const content = bytes.subarray(start + CHUNK_HEADER, start + CHUNK_HEADER + length);
    return { type: view.getUint32(start + 4, true), content, end: start + CHUNK_HEADER + length };
  }
}

/** Puts a GLB together: JSON padded with spaces and the binary with zeros, to multiples of four. */
export function joinGlb(chunks: GlbChunks): Uint8Array {
  const parts = [{ type: JSON_TYPE, content: chunks.json, pad: 0x20 }];
  if (chunks.binary) parts.push({ type: BINARY_TYPE, content: chunks.binary, pad: 0 });
  const padded = (length: number): number => length + (-length & 3);
  const total =
    parts.reduce((sum, part) => sum + CHUNK_HEADER + padded(part.content.length), HEADER) +
    (chunks.others?.length ?? 0);
  const bytes = new Uint8Array(total);
  const view = new DataView(bytes.buffer);
  [MAGIC, 2, total].forEach((word, i) => {
    view.setUint32(4 * i, word, true);
  });
  let at = HEADER;
  for (const { type, content, pad } of parts) {
    view.setUint32(at, padded(content.length), true);
    view.setUint32(at + 4, type, true);
    at += CHUNK_HEADER;
    bytes.set(content, at);
    bytes.fill(pad, at + content.length, at + padded(content.length));
    at += padded(content.length);
  }
  if (chunks.others) bytes.set(chunks.others, at);
  return bytes;
}
