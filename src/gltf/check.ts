import { FLOAT, UNSIGNED } from "./accessor-layout.js";
import { checkAccessors } from "./check-accessors.js";
import { checkDraco, checkMeshopt } from "./check-geometry-extensions.js";
import { checkNodes } from "./check-nodes.js";
import { Checker, type JsonObject, shown } from "./checker.js";
import { DRACO } from "./draco.js";
import { INSTANCING } from "./instancing.js";
import { MESHOPT } from "./meshopt.js";
import type { GltfJson } from "./model.js";
import { LOD, VISIBILITY } from "./shown-nodes.js";

/** Extensions that are read, or change nothing about where a triangle lies. */
const KNOWN = new Set<string>([
  ...MESHOPT,
  DRACO,
  INSTANCING,
  LOD,
  VISIBILITY,
  "KHR_mesh_quantization",
  "KHR_texture_transform",
  "KHR_texture_basisu",
  "EXT_texture_webp",
  "EXT_texture_avif",
  "KHR_lights_punctual",
  "KHR_animation_pointer",
  "KHR_xmp_json_ld",
  "EXT_mesh_features",
  "EXT_structural_metadata",
]);

/**
 * Checks a model's parsed JSON before anything follows its indices: types, indices in range, trees without cycles,
 * sizes that fit each other (glTF 2.0). Throws ModelError. Whether buffers really hold what they state is for the reader.
 */
export function checkJson(model: string, json: JsonObject): asserts json is JsonObject & GltfJson {
  const check = new Checker(model);
  checkAsset(json, check);
  checkExtensions(json, check);
  checkAccessors(json, check);
  checkMeshopt(json, check);
  checkNodes(json, check);
  checkMeshes(json, check);
  checkAnimations(json, check);
  checkImages(json, check);
}

function checkImages(json: JsonObject, check: Checker): void {
  const views = check.objects(json, "bufferViews").length;
  check.objects(json, "images").forEach((image, i) => {
    if (image.uri !== undefined) check.string(image.uri, `images[${i}].uri`);
    else check.index(image.bufferView, `images[${i}].bufferView`, views, "bufferViews");
    if (image.mimeType !== undefined) check.string(image.mimeType, `images[${i}].mimeType`);
  });
}

function checkAsset(json: JsonObject, check: Checker): void {
  if (json.asset === undefined) check.refuse("it has no asset", "a glTF file states its version there");
  const asset = check.object(json.asset, "asset");
  for (const key of ["version", "minVersion"] as const) {
    const version = asset[key];
    const isRead =
      key === "minVersion"
        ? version === undefined || version === "2.0"
        : typeof version === "string" && /^2\./.test(version);
    if (!isRead) check.refuse(`asset.${key} is ${shown(version)}`, "glTF 2.0 is read");
  }
}

function checkExtensions(json: JsonObject, check: Checker): void {
  for (const key of ["extensionsUsed", "extensionsRequired"])
    if (json[key] !== undefined)
      check.array(json[key], key).forEach((name, i) => {
        check.string(name, `${key}[${i}]`);
      });
  for (const name of (json.extensionsRequired as string[] | undefined) ?? []) {
    if (KNOWN.has(name) || name.startsWith("KHR_materials_")) continue;
    check.refuse(`it requires the extension ${name}`, "that is not known here: save the model without it");
  }
}

function checkMeshes(json: JsonObject, check: Checker): void {
  const accessors = check.objects(json, "accessors");
  const views = check.objects(json, "bufferViews").length;
  const materials = check.objects(json, "materials");
  materials.forEach((material, i) => {
    if (material.name !== undefined) check.string(material.name, `materials[${i}].name`);
  });
  check.objects(json, "meshes").forEach((mesh, m) => {
    if (mesh.weights !== undefined) check.numbers(mesh.weights, `meshes[${m}].weights`);
    const primitives = check.objects(mesh, "primitives", `meshes[${m}].primitives`);
    if (primitives.length === 0) check.refuse(`meshes[${m}] has no primitives`, "it must have one at least");
    primitives.forEach((primitive, p) => {
      const where = `meshes[${m}].primitives[${p}]`;
      const attributes = check.object(primitive.attributes, `${where}.attributes`);
      const vertices = checkAttributes(attributes, `${where}.attributes`, accessors, check);
      check.objects(primitive, "targets", `${where}.targets`).forEach((target, t) => {
        const count = checkAttributes(target, `${where}.targets[${t}]`, accessors, check);
        if (count !== undefined && count !== vertices)
          check.refuse(`${where}.targets[${t}] moves ${count} vertices`, `the primitive has ${vertices}`);
      });
      checkDraco(primitive, where, views, check);
      check.index(primitive.material, `${where}.material`, materials.length, "materials", "optional");
      if (primitive.mode !== undefined) check.integer(primitive.mode, `${where}.mode`, 0, 6);
      check.index(primitive.indices, `${where}.indices`, accessors.length, "accessors", "optional");
      if (primitive.indices === undefined) return;
      const { type, componentType, normalized } = accessors[primitive.indices as number];
      if (type !== "SCALAR" || !UNSIGNED.includes(componentType as number) || normalized === true)
        check.refuse(
          `${where}.indices has the type ${type} of ${componentType}${normalized === true ? ", normalised" : ""}`,
          "it must be SCALAR of unsigned integers",
        );
    });
  });
  checkSkinMatrices(json, accessors, check);
}

/** Checks what attributes refer to; how many positions there are. */
function checkAttributes(
  attributes: JsonObject,
  where: string,
  accessors: JsonObject[],
  check: Checker,
): number | undefined {
  for (const [name, accessor] of Object.entries(attributes))
    check.index(accessor, `${where}.${name}`, accessors.length, "accessors");
  if (attributes.POSITION === undefined) return undefined;
  const { type, componentType, count } = accessors[attributes.POSITION as number];
  if (type !== "VEC3" || componentType === 5125)
    check.refuse(
      `${where}.POSITION has the type ${type} of ${componentType}`,
      "it must be VEC3 of floats or small integers",
    );
  for (const [name, accessor] of Object.entries(attributes)) {
    const found = accessors[accessor as number].count;
    if (found !== count)
      check.refuse(`${where}.${name} has ${found} entries`, `there are ${count} positions`);
  }
  return count as number;
}

function checkSkinMatrices(json: JsonObject, accessors: JsonObject[], check: Checker): void {
  check.objects(json, "skins").forEach((skin, i) => {
    const where = `skins[${i}].inverseBindMatrices`;
    check.index(skin.inverseBindMatrices, where, accessors.length, "accessors", "optional");
    if (skin.inverseBindMatrices === undefined) return;
    const { type, componentType, count } = accessors[skin.inverseBindMatrices as number];
    const joints = (skin.joints as unknown[]).length;
    if (type !== "MAT4" || componentType !== FLOAT || (count as number) < joints)
      check.refuse(`${where} has ${count} of ${type}`, `it must have ${joints} MAT4 of floats`);
  });
}

function checkAnimations(json: JsonObject, check: Checker): void {
  const nodes = check.objects(json, "nodes").length;
  const accessors = check.objects(json, "accessors").length;
  check.objects(json, "animations").forEach((animation, a) => {
    const where = `animations[${a}]`;
    if (animation.name !== undefined) check.string(animation.name, `${where}.name`);
    const samplers = check.objects(animation, "samplers", `${where}.samplers`);
    samplers.forEach((sampler, s) => {
      check.index(sampler.input, `${where}.samplers[${s}].input`, accessors, "accessors");
      check.index(sampler.output, `${where}.samplers[${s}].output`, accessors, "accessors");
    });
    check.objects(animation, "channels", `${where}.channels`).forEach((channel, c) => {
      check.index(channel.sampler, `${where}.channels[${c}].sampler`, samplers.length, "its samplers");
      const target = check.object(channel.target, `${where}.channels[${c}].target`);
      check.index(target.node, `${where}.channels[${c}].target.node`, nodes, "nodes", "optional");
    });
  });
}
