import { Accessor, ComponentTypeToTypedArray, Document, type GLTF } from "@gltf-transform/core";
import { COMPONENT_BYTES } from "./accessor-layout.js";
import { greatestElements } from "./budget.js";
import type { DracoDecoder, DracoMesh, DracoModule } from "./decoders.js";
import { type Model, ModelError } from "./model.js";

export const DRACO = "KHR_draco_mesh_compression";

/** A primitive's compressed data, checked by `checkDraco`: where they are, and their ids of attributes by glTF's names. */
interface DracoPrimitive {
  bufferView: number;
  attributes: Record<string, number>;
}

export interface Unpacked {
  /** Three vertex numbers a triangle. */
  indices: Uint32Array;
  vertexCount: number;
  /** Those that the compressed data hold, by the index that the primitive gives them. */
  accessors: ReadonlyMap<number, Accessor>;
}

/** The attributes that say where a triangle lies. */
const PLACING = /^(POSITION|JOINTS_\d+|WEIGHTS_\d+)$/;

export const isDraco = (primitive: GLTF.IMeshPrimitive): boolean =>
  primitive.extensions?.[DRACO] !== undefined;

/**
 * Triangles, positions, joints and weights of those of the primitives that have KHR_draco_mesh_compression. The decoder is the
 * model's, asked for where there are any. Throws ModelError for data that do not decode, and where there is no decoder.
 */
export async function unpackPrimitives(
  model: Model,
  primitives: ReadonlyMap<GLTF.IMeshPrimitive, string>,
): Promise<Map<GLTF.IMeshPrimitive, Unpacked>> {
  const unpacked = new Map<GLTF.IMeshPrimitive, Unpacked>();
  const compressed = [...primitives].filter(([primitive]) => isDraco(primitive));
  if (compressed.length === 0) return unpacked;
  if (!model.decoders?.draco)
    throw new ModelError(
      model.name,
      `its meshes are compressed (${DRACO}) and no decoder was handed over`,
      "give readModel one, { draco: () => draco3dgltf.createDecoderModule() }, or save the model without it",
    );
  const draco = await model.decoders.draco();
  const decoder = new draco.Decoder();
  let left = greatestElements(model);
  for (const [primitive, where] of compressed) {
    const mesh = new draco.Mesh();
    try {
      const data = unpack(model, primitive, draco, decoder, mesh, left);
      left -= data.indices.length + data.vertexCount;
      unpacked.set(primitive, data);
    } catch (cause) {
      throw new ModelError(
        model.name,
        `the compressed mesh of ${where} cannot be decoded: ${(cause as Error).message}`,
        "the file is damaged, or too large",
        { cause },
      );
    }
    draco.destroy(mesh);
  }
  return unpacked;
}

function unpack(
  { json, buffers }: Model,
  primitive: GLTF.IMeshPrimitive,
  draco: DracoModule,
  decoder: DracoDecoder,
  mesh: DracoMesh,
  greatest: number,
): Unpacked {
  const { bufferView, attributes } = packed(primitive);
  const { buffer, byteOffset = 0, byteLength } = json.bufferViews![bufferView];
  const source = buffers[buffer].subarray(byteOffset, byteOffset + byteLength);
  const status = decoder.DecodeArrayToMesh(source, source.length, mesh);
  if (!status.ok()) throw new Error(status.error_msg());
  const corners = 3 * mesh.num_faces();
  const vertexCount = mesh.num_points();
  if (corners + vertexCount > greatest)
    throw new Error(
      `${corners + vertexCount} vertices and corners are more than the ${greatest} that are read`,
    );
  const indices = new Uint32Array(
    copyOut(draco, 4 * corners, (length, at) => decoder.GetTrianglesUInt32Array(mesh, length, at)),
  );
  const document = new Document();
  const accessors = Object.entries(attributes)
    .filter(([name]) => PLACING.test(name))
    .map(([name, id]): [number, Accessor] => {
      const index = primitive.attributes[name];
      const { type, componentType, normalized = false } = json.accessors![index];
      const components = Accessor.getElementSize(type);
      const attribute = decoder.GetAttributeByUniqueId(mesh, id);
      if (draco.getPointer(attribute) === 0 || attribute.num_components() !== components)
        throw new Error(`it has no ${type} numbered ${id} for ${name}`);
      const size = vertexCount * components * COMPONENT_BYTES.get(componentType)!;
      const content = copyOut(draco, size, (length, at) =>
        decoder.GetAttributeDataArrayForAllPoints(
          mesh,
          attribute,
          dataType(draco, componentType),
          length,
          at,
        ),
      );
      const array = new ComponentTypeToTypedArray[componentType](content);
      return [index, document.createAccessor().setType(type).setNormalized(normalized).setArray(array)];
    });
  return { indices, vertexCount, accessors: new Map(accessors) };
}

/** What `write` puts into that many bytes of the module's memory. */
function copyOut(
  draco: DracoModule,
  length: number,
  write: (length: number, at: number) => boolean,
): ArrayBuffer {
  const at = draco._malloc(length);
  if (!write(length, at)) throw new Error("its data are not what they are said to be");
  const content = draco.HEAPU8.slice(at, at + length).buffer as ArrayBuffer;
  draco._free(at);
  return content;
}

const dataType = (draco: DracoModule, componentType: number): number =>
  new Map([
    [5120, draco.DT_INT8],
    [5121, draco.DT_UINT8],
    [5122, draco.DT_INT16],
    [5123, draco.DT_UINT16],
    [5125, draco.DT_UINT32],
    [5126, draco.DT_FLOAT32],
  ]).get(componentType)!;

const packed = ({ extensions }: GLTF.IMeshPrimitive): DracoPrimitive => extensions![DRACO] as DracoPrimitive;
