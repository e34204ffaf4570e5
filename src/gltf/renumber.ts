/** A glTF file's JSON as it reads behind another's: every number that counts in a list moved on by what that list has already. */

import { type GltfJson, ModelError } from "./model.js";

/** The lists of a file that others of its parts count in (glTF 2.0, 5.17). */
export const LISTS = [
  "accessors",
  "animations",
  "bufferViews",
  "buffers",
  "cameras",
  "images",
  "materials",
  "meshes",
  "nodes",
  "samplers",
  "scenes",
  "skins",
  "textures",
] as const;

/** How many items each list has before, and those of extensions; `bytes` are before the content of buffer 0, which joins the other's. */
export type Offsets = Record<(typeof LISTS)[number] | "lights" | "variants" | "bytes", number>;

type Json = Record<string, unknown>;

/** Extensions that count in no list, or whose numbers are known here; those of materials count in textures alone (Khronos registry). */
const KNOWN = new Set([
  "KHR_mesh_quantization",
  "KHR_texture_transform",
  "KHR_texture_basisu",
  "EXT_texture_webp",
  "EXT_texture_avif",
  "KHR_lights_punctual",
  "KHR_node_visibility",
  "KHR_draco_mesh_compression",
  "EXT_meshopt_compression",
  "KHR_meshopt_compression",
  "EXT_mesh_gpu_instancing",
  "MSFT_lod",
]);

/** Which list a member counts in, wherever it stands in an item of the list named first. */
const REFERENCES: Record<string, Record<string, keyof Offsets>> = {
  accessors: { bufferView: "bufferViews" },
  animations: { input: "accessors", output: "accessors", node: "nodes" },
  bufferViews: { buffer: "buffers" },
  images: { bufferView: "bufferViews" },
  materials: { index: "textures", ids: "materials" },
  meshes: {
    attributes: "accessors",
    targets: "accessors",
    indices: "accessors",
    material: "materials",
    bufferView: "bufferViews",
    variants: "variants",
  },
  nodes: {
    children: "nodes",
    mesh: "meshes",
    skin: "skins",
    camera: "cameras",
    light: "lights",
    attributes: "accessors",
    ids: "nodes",
  },
  scenes: { nodes: "nodes" },
  skins: { joints: "nodes", skeleton: "nodes", inverseBindMatrices: "accessors" },
  textures: { source: "images", sampler: "samplers" },
};

/**
 * The same file with its numbers moved on. Buffer 0 is where the other's is. Throws ModelError for an extension that may hold numbers of
 * its own.
 */
export function renumbered(name: string, json: GltfJson, offsets: Offsets): GltfJson {
  for (const extension of json.extensionsUsed ?? [])
    if (!KNOWN.has(extension) && !extension.startsWith("KHR_materials_"))
      throw new ModelError(
        name,
        `uses ${extension}, whose numbers are not known`,
        "its clips cannot go into one file with other props': write bake.files per-throw or per-take",
      );
  const moved: Json = { ...json };
  for (const [list, references] of Object.entries(REFERENCES)) {
    const items = json[list as keyof GltfJson] as Json[] | undefined;
    if (items) moved[list] = items.map((item) => shift(item, references, offsets));
  }
  const views = moved.bufferViews as Json[] | undefined;
  if (views) moved.bufferViews = views.map((view) => placed(view, offsets));
  return moved as unknown as GltfJson;
}

/** Everything but what is the author's own. */
function shift(value: unknown, references: Record<string, keyof Offsets>, offsets: Offsets): unknown {
  if (Array.isArray(value)) return value.map((item) => shift(item, references, offsets));
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(
    Object.entries(value).map(([key, member]) => {
      if (key === "extras") return [key, member];
      const list = Object.hasOwn(references, key) ? references[key] : undefined;
      // a channel's `target` holds its node, and a Draco extension's attributes are Draco's own numbers
      if (key === "KHR_draco_mesh_compression")
        return [
          key,
          { ...(member as Json), bufferView: add((member as Json).bufferView, offsets.bufferViews) },
        ];
      return [key, list === undefined ? shift(member, references, offsets) : add(member, offsets[list])];
    }),
  );
}

/** Moves a number, or all of a list or map of numbers. */
function add(value: unknown, by: number): unknown {
  if (typeof value === "number") return value + by;
  if (Array.isArray(value)) return value.map((item) => add(item, by));
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, member]) => [key, add(member, by)]));
}

/** A view of buffer 0 is behind the bytes there; other buffers come behind the other file's. */
function placed(view: Json, offsets: Offsets): Json {
  const extensions = view.extensions as Record<string, Json> | undefined;
  const at = (where: Json): Json =>
    typeof where.buffer !== "number"
      ? where
      : where.buffer === offsets.buffers
        ? { ...where, buffer: 0, byteOffset: ((where.byteOffset as number | undefined) ?? 0) + offsets.bytes }
        : { ...where, buffer: where.buffer - 1 };
  return {
    ...at(view),
    ...(extensions && {
      extensions: Object.fromEntries(Object.entries(extensions).map(([key, held]) => [key, at(held)])),
    }),
  };
}
