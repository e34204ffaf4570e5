import { type Accessor, type GLTF, Logger, WebIO } from "@gltf-transform/core";
import { greatestElements } from "./budget.js";
import { unpackViews } from "./meshopt.js";
import { type GltfJson, type Model, ModelError } from "./model.js";

/**
 * Content of the accessors with the given indices, decoded by glTF-Transform (strides, sparse values, normalised
 * integers). Only what describes them is handed over: its reader recurses over nodes and needs to know extensions.
 */
export async function decodeAccessors(
  model: Model,
  indices: Iterable<number>,
): Promise<Map<number, Accessor>> {
  const { accessors = [], bufferViews = [] } = model.json;
  const wanted = [...new Set(indices)];
  const total = wanted.reduce((sum, index) => sum + accessors[index].count, 0);
  const greatest = greatestElements(model);
  if (total > greatest)
    throw new ModelError(
      model.name,
      `states ${total} vertices, indices and keys`,
      `of a file of this size at most ${greatest} are read`,
    );
  const read = new Set(wanted.flatMap((index) => viewsOf(accessors[index])));
  const unpacked = await unpackViews(model, [...read]);
  const contents = [...model.buffers, ...unpacked.values()];
  const ownBuffer = new Map([...unpacked.keys()].map((view, i) => [view, model.buffers.length + i]));
  const sparse = wanted.filter((index) => accessors[index].sparse);
  const uri = (i: number): string => `${i}.bin`;
  const json: GltfJson = {
    asset: { version: "2.0" },
    accessors: [
      ...wanted.map((index) => withOwnOffsets(accessors[index])),
      ...sparse.map((index) => sparseNumbers(accessors[index])),
    ],
    bufferViews: bufferViews.map((view, i) => {
      if (ownBuffer.has(i)) return { ...view, buffer: ownBuffer.get(i)!, byteOffset: 0 };
      // what is compressed and not asked for may lie in a buffer that has no content
      return read.has(i) ? view : { ...view, byteOffset: 0, byteLength: 0 };
    }),
    buffers: contents.map(({ byteLength }, i) => ({ byteLength, uri: uri(i) })),
  };
  // glTF-Transform types its bytes more narrowly than the platform's readers do.
  const resources = Object.fromEntries(
    contents.map((bytes, i) => [uri(i), bytes as Uint8Array<ArrayBuffer>]),
  );
  const io = new WebIO().setLogger(new Logger(Logger.Verbosity.SILENT));
  const decoded = (await io.readJSON({ json, resources })).getRoot().listAccessors();
  sparse.forEach((index, i) => {
    const { count } = accessors[index];
    const [greatest] = decoded[wanted.length + i].getMax([]);
    if (greatest >= count)
      throw new ModelError(
        model.name,
        `accessors[${index}].sparse changes element ${greatest}`,
        `it has ${count}`,
      );
  });
  return new Map(wanted.map((index, i) => [index, decoded[i]]));
}

/** The buffer views that an accessor reads. */
const viewsOf = ({ bufferView, sparse }: GLTF.IAccessor): number[] => [
  ...(bufferView === undefined ? [] : [bufferView]),
  ...(sparse ? [sparse.indices.bufferView, sparse.values.bufferView] : []),
];

/** glTF-Transform gives a sparse part without an offset that of its accessor; the specification's default is 0. */
function withOwnOffsets(accessor: GLTF.IAccessor): GLTF.IAccessor {
  const { sparse } = accessor;
  if (!sparse) return accessor;
  return {
    ...accessor,
    sparse: {
      ...sparse,
      indices: { ...sparse.indices, byteOffset: sparse.indices.byteOffset ?? 0 },
      values: { ...sparse.values, byteOffset: sparse.values.byteOffset ?? 0 },
    },
  };
}

/** The numbers of the elements that a sparse accessor changes, as an accessor of their own. */
const sparseNumbers = ({ sparse }: GLTF.IAccessor): GLTF.IAccessor => ({
  ...sparse!.indices,
  count: sparse!.count,
  type: "SCALAR",
});
