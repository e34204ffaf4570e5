import { type Checker, type JsonObject, shown } from "./checker.js";
import { DRACO } from "./draco.js";
import { INSTANCING } from "./instancing.js";
import { MESHOPT } from "./meshopt.js";
import { LOD, VISIBILITY } from "./shown-nodes.js";

const MODES = ["ATTRIBUTES", "TRIANGLES", "INDICES"];
/** Filters and the element sizes they work on; COLOR came with the extension's successor (from memory). */
const FILTERS: Record<string, (size: number) => boolean> = {
  NONE: () => true,
  OCTAHEDRAL: (size) => size === 4 || size === 8,
  QUATERNION: (size) => size === 8,
  EXPONENTIAL: (size) => size % 4 === 0,
  COLOR: (size) => size === 4 || size === 8,
};

/** Whether a view, buffer, node or primitive has the extension, as an object. */
function extension(owner: JsonObject, name: string, where: string, check: Checker): JsonObject | undefined {
  if (owner.extensions === undefined) return undefined;
  const found = check.object(owner.extensions, `${where}.extensions`)[name];
  return found === undefined ? undefined : check.object(found, `${where}.extensions.${name}`);
}

/**
 * Checks compressed buffer views (EXT_meshopt_compression): the decoder takes what it is told, so that every size has to be
 * right before. Buffers without content may only be what such views fall back on.
 */
export function checkMeshopt(json: JsonObject, check: Checker): void {
  const buffers = check.objects(json, "buffers");
  const isFallback = buffers.map(
    (buffer, i) =>
      buffer.uri === undefined &&
      MESHOPT.some((name) => extension(buffer, name, `buffers[${i}]`, check)?.fallback === true),
  );
  check.objects(json, "bufferViews").forEach((view, i) => {
    const name = MESHOPT.find((name) => extension(view, name, `bufferViews[${i}]`, check));
    if (name) checkCompressed(view, `bufferViews[${i}]`, name);
    else if (isFallback[view.buffer as number])
      check.refuse(
        `bufferViews[${i}] is in buffers[${view.buffer}]`,
        "only compressed views may: it has no content",
      );
  });

  function checkCompressed(view: JsonObject, parent: string, name: string): void {
    const where = `${parent}.extensions.${name}`;
    const how = extension(view, name, parent, check)!;
    const { buffer, byteOffset = 0, byteLength, byteStride, count, mode, filter = "NONE" } = how;
    check.index(buffer, `${where}.buffer`, buffers.length, "buffers");
    if (isFallback[buffer as number])
      check.refuse(`${where}.buffer is ${buffer}`, "that buffer has no content");
    const end =
      check.integer(byteOffset, `${where}.byteOffset`, 0) +
      check.integer(byteLength, `${where}.byteLength`, 1);
    const available = buffers[buffer as number].byteLength as number;
    if (end > available)
      check.refuse(`${where} ends at byte ${end}`, `buffers[${buffer}] has ${available} bytes`);
    if (!MODES.includes(mode as string))
      check.refuse(`${where}.mode is ${shown(mode)}`, `it must be one of ${MODES.join(", ")}`);
    const elements = check.integer(count, `${where}.count`, 1);
    const size = check.integer(byteStride, `${where}.byteStride`, 2, 256);
    if (mode === "ATTRIBUTES" ? size % 4 !== 0 : size !== 2 && size !== 4)
      check.refuse(
        `${where}.byteStride is ${size}`,
        `${mode} needs ${mode === "ATTRIBUTES" ? "a multiple of 4" : "2 or 4"}`,
      );
    if (mode === "TRIANGLES" && elements % 3 !== 0)
      check.refuse(`${where}.count is ${elements}`, "triangles have three corners each");
    if (typeof filter !== "string" || !Object.hasOwn(FILTERS, filter))
      check.refuse(
        `${where}.filter is ${shown(filter)}`,
        `it must be one of ${Object.keys(FILTERS).join(", ")}`,
      );
    if (filter !== "NONE" && (mode !== "ATTRIBUTES" || !FILTERS[filter](size)))
      check.refuse(`${where}.filter is ${filter}`, `it does not go with ${mode} of ${size} bytes`);
    if (elements * size !== view.byteLength || (view.byteStride ?? size) !== size)
      check.refuse(
        `${where} has ${elements} elements of ${size} bytes`,
        `${parent} has ${view.byteLength} bytes`,
      );
  }
}

/** Checks what KHR_draco_mesh_compression refers to. */
export function checkDraco(primitive: JsonObject, where: string, viewCount: number, check: Checker): void {
  const draco = extension(primitive, DRACO, where, check);
  if (!draco) return;
  check.index(draco.bufferView, `${where}.extensions.${DRACO}.bufferView`, viewCount, "bufferViews");
  const ids = check.object(draco.attributes, `${where}.extensions.${DRACO}.attributes`);
  for (const [name, id] of Object.entries(ids)) {
    check.integer(id, `${where}.extensions.${DRACO}.attributes.${name}`, 0, 0xffffffff);
    if (!Object.hasOwn(primitive.attributes as JsonObject, name))
      check.refuse(
        `${where}.extensions.${DRACO}.attributes has ${name}`,
        "the primitive has no such attribute",
      );
  }
}

/** Checks a node's instances, levels of detail and visibility. */
export function checkNodeExtensions(
  node: JsonObject,
  where: string,
  nodeCount: number,
  accessors: JsonObject[],
  check: Checker,
): void {
  const lod = extension(node, LOD, where, check);
  if (lod) check.indices(lod.ids, `${where}.extensions.${LOD}.ids`, nodeCount, "nodes");
  const visible = extension(node, VISIBILITY, where, check)?.visible;
  if (visible !== undefined && typeof visible !== "boolean")
    check.refuse(
      `${where}.extensions.${VISIBILITY}.visible is ${shown(visible)}`,
      "it must be true or false",
    );
  const instancing = extension(node, INSTANCING, where, check);
  if (!instancing) return;
  const attributes = check.object(instancing.attributes, `${where}.extensions.${INSTANCING}.attributes`);
  let count: unknown;
  for (const [name, wanted] of Object.entries({ TRANSLATION: "VEC3", ROTATION: "VEC4", SCALE: "VEC3" })) {
    if (attributes[name] === undefined) continue;
    const at = `${where}.extensions.${INSTANCING}.attributes.${name}`;
    check.index(attributes[name], at, accessors.length, "accessors");
    const accessor = accessors[attributes[name] as number];
    if (accessor.type !== wanted) check.refuse(`${at} has the type ${accessor.type}`, `it must be ${wanted}`);
    count ??= accessor.count;
    if (accessor.count !== count) check.refuse(`${at} has ${accessor.count} entries`, `another has ${count}`);
  }
}
