import type { GLTF } from "@gltf-transform/core";
import { decompose } from "./decompose.js";
import { joinGlb } from "./glb.js";
import { type ClipChannel, checkClipNames, GENERATOR, type Graft, type Rest } from "./graft.js";
import { imageType } from "./image-type.js";
import { joinFiles } from "./join-files.js";
import { JsonEdit } from "./json-edit.js";
import { type Model, ModelError } from "./model.js";
import { SamplerPack } from "./sampler-pack.js";
import { matrixFrame, sceneRoots } from "./scene.js";
import { bytesDataUri, isDataUri } from "./uri.js";

export type { ClipChannel, Graft, NewClip, NewNode, Rest } from "./graft.js";

/** A file by its name within a folder. */
export interface NamedFile {
  name: string;
  content: Uint8Array;
}

/**
 * The model with new nodes and clips, as a GLB that needs no other file. They are added at the ends of the model's lists,
 * their keys in one buffer view behind its bytes; of what was there, only this changes: the default scene's roots, the
 * generator, the size of buffer 0, where buffers and images outside the GLB are to be found, the rest pose of nodes that the
 * graft states, and the `matrix` of a node that is animated (which may have none). All else stays to the letter and to the byte.
 * Throws ModelError where a clip's name is taken, or an animated node cannot be told apart into translation, rotation
 * and scale, or an external image is of an unknown kind.
 */
export const spliceGlb = (model: Model, graft: Graft): Uint8Array => spliceAllGlb([[model, graft]]);

/**
 * The same as a .gltf and a .bin beside it, `stem` their common name; what the model had in other files is in the .bin too. Chunks
 * of a GLB that only its extensions know have no place in them and are left out.
 */
export const spliceGltf = (model: Model, graft: Graft, stem: string): NamedFile[] =>
  spliceAllGltf([[model, graft]], stem);

/** Several models in one GLB, side by side in its default scene; of the first the same stays as if it were alone. Chunks that only extensions know are its. */
export function spliceAllGlb(grafts: readonly (readonly [Model, Graft])[]): Uint8Array {
  const { text, binary } = spliceAll(grafts);
  const { otherChunks } = grafts[0][0];
  return joinGlb({
    json: new TextEncoder().encode(text),
    ...(binary.length > 0 && { binary }),
    ...(otherChunks && { others: otherChunks }),
  });
}

/** The same as a .gltf and a .bin. */
export function spliceAllGltf(grafts: readonly (readonly [Model, Graft])[], stem: string): NamedFile[] {
  const { text, binary } = spliceAll(grafts, `${encodeURIComponent(stem)}.bin`);
  const json = { name: `${stem}.gltf`, content: new TextEncoder().encode(text) };
  return binary.length > 0 ? [{ name: `${stem}.bin`, content: binary }, json] : [json];
}

function spliceAll(
  grafts: readonly (readonly [Model, Graft])[],
  uri?: string,
): { text: string; binary: Uint8Array } {
  const [[model, graft]] = grafts;
  if (grafts.length === 1) return splice(model, graft, uri);
  const own = grafts.flatMap(([{ json }]) => json.animations ?? []).map(({ name }) => name);
  for (const [{ name }, { clips }] of grafts) checkClipNames(name, own, clips);
  const files = grafts.map(([model, graft]) => ({ name: model.name, ...splice(model, graft) }));
  const joined = joinFiles(files);
  if (uri === undefined || joined.binary.length === 0) return joined;
  const edit = new JsonEdit(joined.text);
  edit.set(["buffers", 0], "uri", uri);
  return { text: edit.result(), binary: joined.binary };
}

/** The JSON's text and the bytes of buffer 0; `uri` is where these are to be found, if not in the same file. */
function splice(model: Model, graft: Graft, uri?: string): { text: string; binary: Uint8Array } {
  const { json } = model;
  checkClipNames(
    model.name,
    (json.animations ?? []).map(({ name }) => name),
    graft.clips,
  );
  const edit = new JsonEdit(model.text);
  edit.set(["asset"], "generator", GENERATOR);
  addNodes(model, graft, edit);
  setRests(model, graft, edit);

  const firstNode = json.nodes?.length ?? 0;
  const firstView = json.bufferViews?.length ?? 0;
  const nodeOf = (target: ClipChannel["target"]): number =>
    "added" in target ? firstNode + target.added : target.node;
  const pack = new SamplerPack(firstView, json.accessors?.length ?? 0);
  const animations = graft.clips.map((clip) => pack.animation(clip, nodeOf));
  edit.append("animations", animations);
  edit.append("accessors", pack.accessors);

  if (json.buffers?.[0]?.uri === undefined && model.buffers[0]?.length === 0)
    throw new ModelError(
      model.name,
      "buffers[0] only keeps the place of compressed data",
      "a GLB's first buffer has content: put another one first",
    );
  const binary = new Binary(model.buffers[0] ?? new Uint8Array());
  const views: GLTF.IBufferView[] = [];
  if (pack.byteLength > 0) {
    const byteOffset = binary.append(pack.byteLength, (bytes, at) => pack.write(bytes, at));
    views.push({ buffer: 0, byteOffset, byteLength: pack.byteLength });
  }
  for (const [i, image] of model.images) {
    const mimeType = json.images![i].mimeType ?? imageType(image);
    if (!mimeType)
      throw new ModelError(
        model.name,
        `images[${i}] is of an unknown kind`,
        "PNG, JPEG, WebP, AVIF and KTX2 are known",
      );
    const byteOffset = binary.append(image.length, (bytes, at) => bytes.set(image, at));
    const bufferView = firstView + views.length;
    views.push({ buffer: 0, byteOffset, byteLength: image.length });
    edit.replace(["images", i], "uri", { bufferView, ...(!json.images![i].mimeType && { mimeType }) });
  }
  edit.append("bufferViews", views);
  embedBuffers(model, binary.byteLength, uri, edit);
  return { text: edit.result(), binary: binary.bytes() };
}

function addNodes({ json }: Model, { nodes }: Graft, edit: JsonEdit): void {
  if (nodes.length === 0) return;
  const first = json.nodes?.length ?? 0;
  const roots = sceneRoots(json);
  edit.append(
    "nodes",
    nodes.map(({ name, translation, rotation, scale, children = [], holdsScene }) => {
      const all = [...children.map((child) => first + child), ...(holdsScene ? roots : [])];
      return { name, translation, rotation, scale, children: all.length > 0 ? all : undefined };
    }),
  );
  const scene = json.scene ?? 0;
  if (json.scene === undefined) edit.set([], "scene", scene);
  if (!json.scenes?.length) {
    edit.append("scenes", [{ nodes: [first] }]);
    return;
  }
  edit.set(["scenes", scene], "nodes", [first]);
  if (!nodes.some(({ holdsScene }) => holdsScene)) return;
  // Another scene may share roots with the default one; they are no roots any more.
  const moved = new Set(roots);
  json.scenes.forEach(({ nodes: others = [] }, s) => {
    if (s !== scene && others.some((node) => moved.has(node)))
      edit.set(["scenes", s], "nodes", [...new Set(others.map((node) => (moved.has(node) ? first : node)))]);
  });
}

/** Gives nodes the rest pose that the graft states; an animated node must not have a matrix (glTF 2.0, 3.5.2). */
function setRests({ json, name }: Model, { clips, rests = [] }: Graft, edit: JsonEdit): void {
  const changes = new Map(
    clips.flatMap(({ channels }) =>
      channels.flatMap(({ target }): [number, Omit<Rest, "node">][] =>
        "node" in target ? [[target.node, {}]] : [],
      ),
    ),
  );
  for (const { node, ...parts } of rests) changes.set(node, parts);
  for (const [node, parts] of changes) {
    const { matrix } = json.nodes![node];
    if (!matrix) {
      for (const [key, value] of Object.entries(parts)) edit.set(["nodes", node], key, value);
      continue;
    }
    const former = decompose(matrixFrame(matrix));
    if (!former)
      throw new ModelError(
        name,
        `the matrix of node ${node} is sheared or flat`,
        "a node that is animated cannot be",
      );
    edit.replace(["nodes", node], "matrix", { ...former, ...parts });
  }
}

/** Buffer 0 is the GLB's binary chunk or the file at `place`, with our bytes behind its own; other external ones are written out in the JSON. */
function embedBuffers(
  { json, buffers }: Model,
  byteLength: number,
  place: string | undefined,
  edit: JsonEdit,
): void {
  if (buffers.length === 0) {
    if (byteLength > 0) edit.append("buffers", [{ ...(place && { uri: place }), byteLength }]);
    return;
  }
  json.buffers!.forEach(({ uri }, i) => {
    if (i === 0) {
      edit.set(["buffers", 0], "byteLength", byteLength);
      if (place !== undefined) edit.set(["buffers", 0], "uri", place);
      else if (uri !== undefined) edit.remove(["buffers", 0], "uri");
    } else if (uri !== undefined && !isDataUri(uri))
      edit.set(["buffers", i], "uri", bytesDataUri(buffers[i]));
  });
}

/** Bytes that grow by pieces, each starting at a multiple of four. */
class Binary {
  readonly #pieces: { at: number; write: (bytes: Uint8Array, at: number) => void }[] = [];
  byteLength = 0;

  constructor(start: Uint8Array) {
    this.append(start.length, (bytes, at) => bytes.set(start, at));
  }

  append(length: number, write: (bytes: Uint8Array, at: number) => void): number {
    const at = this.byteLength + (-this.byteLength & 3);
    this.#pieces.push({ at, write });
    this.byteLength = at + length;
    return at;
  }

  bytes(): Uint8Array {
    const bytes = new Uint8Array(this.byteLength);
    for (const { at, write } of this.#pieces) write(bytes, at);
    return bytes;
  }
}
