import type { Accessor, GLTF } from "@gltf-transform/core";
import { decodeAccessors } from "./accessors.js";
import { greatestElements, tooMuch } from "./budget.js";
import { isDraco, unpackPrimitives } from "./draco.js";
import { instanceAccessors } from "./instancing.js";
import { type Model, ModelError } from "./model.js";
import type { Piece } from "./pieces.js";
import { skinAccessors } from "./skin.js";
import { triangleList } from "./triangles.js";

/** Triangles whose vertices are numbered in the order of their first use. */
export interface Triangles {
  /** Three a triangle: places in `vertices`. */
  triangles: Uint32Array;
  /** The vertices' numbers in the primitive. */
  vertices: Uint32Array;
}

/** What the primitives of a model hold, compressed or not. */
export interface Primitives {
  /** Everything that is not compressed with its primitive, by index. */
  plain: ReadonlyMap<number, Accessor>;
  /** An accessor that the primitive names. */
  accessor(primitive: GLTF.IMeshPrimitive, index: number): Accessor;
  /** The numbers of an accessor that the primitive names, element by element, normalised integers as what they mean. */
  numbers(primitive: GLTF.IMeshPrimitive, index: number): ArrayLike<number>;
  /** Throws ModelError for numbers beyond the vertices. */
  triangles(primitive: GLTF.IMeshPrimitive): Triangles;
}

/** Reads all that says where the triangles of the pieces lie. */
export async function readPrimitives(model: Model, pieces: readonly Piece[]): Promise<Primitives> {
  const { json } = model;
  const places = new Map(pieces.map(({ primitive, where }) => [primitive, where]));
  const unpacked = await unpackPrimitives(model, places);
  checkAmount();
  const plain = await decodeAccessors(
    model,
    pieces.flatMap(({ node, primitive }) => [
      ...placingAccessors(primitive, node).filter((index) => !unpacked.get(primitive)?.accessors.has(index)),
      ...instanceAccessors(json, node),
    ]),
  );
  const accessor = (primitive: GLTF.IMeshPrimitive, index: number): Accessor =>
    unpacked.get(primitive)?.accessors.get(index) ?? plain.get(index)!;
  const compacted = new Map<GLTF.IMeshPrimitive, Triangles>();
  return {
    plain,
    accessor,
    numbers: (primitive, index) => numbersOf(accessor(primitive, index)),
    triangles(primitive) {
      const known = compacted.get(primitive);
      if (known) return known;
      const { mode = 4, indices, attributes } = primitive;
      const packed = unpacked.get(primitive);
      const vertexCount = packed?.vertexCount ?? accessor(primitive, attributes.POSITION).getCount();
      const list = packed
        ? triangleList(4, packed.indices, vertexCount)
        : triangleList(
            mode,
            indices === undefined ? undefined : plain.get(indices)!.getArray()!,
            vertexCount,
          );
      const made = compact(list, vertexCount, (found) => {
        throw new ModelError(
          model.name,
          `${places.get(primitive)} uses vertex ${found}`,
          `it has ${vertexCount} vertices`,
        );
      });
      compacted.set(primitive, made);
      return made;
    },
  };

  /** Corners of triangles over all copies and morph targets. */
  function checkAmount(): void {
    const greatest = greatestElements(model);
    let corners = 0;
    for (const { primitive, copies } of pieces) {
      const { mode = 4, indices, attributes, targets = [] } = primitive;
      const { count } = json.accessors![indices ?? attributes.POSITION];
      const each = unpacked.get(primitive)?.indices.length ?? (mode === 4 ? count : 3 * count);
      corners += copies * each * (1 + targets.length);
      if (corners > greatest) throw tooMuch(model);
    }
  }

  function placingAccessors(primitive: GLTF.IMeshPrimitive, node: number): number[] {
    const { attributes, indices, targets = [] } = primitive;
    return [
      attributes.POSITION,
      ...(indices === undefined || isDraco(primitive) ? [] : [indices]),
      ...targets.flatMap(({ POSITION }) => POSITION ?? []),
      ...skinAccessors(json, node, primitive),
    ];
  }
}

function numbersOf(accessor: Accessor): ArrayLike<number> {
  if (!accessor.getNormalized()) return accessor.getArray()!;
  const size = accessor.getElementSize();
  const numbers = new Float64Array(accessor.getCount() * size);
  const element: number[] = [];
  for (let i = 0; i < accessor.getCount(); i++) numbers.set(accessor.getElement(i, element), size * i);
  return numbers;
}

/** Renumbers triangles so that only vertices they use are left, in the order of their first use. */
function compact(
  list: Uint32Array,
  vertexCount: number,
  refuse: (vertex: number) => never,
): { triangles: Uint32Array; vertices: Uint32Array } {
  // Many primitives may share one long list of vertices: a table of all of them is for those that use a good part.
  const table = vertexCount <= 8 * list.length ? new Int32Array(vertexCount).fill(-1) : undefined;
  const numbers = new Map<number, number>();
  const vertices = new Uint32Array(list.length);
  let count = 0;
  const triangles = new Uint32Array(list.length);
  for (let corner = 0; corner < list.length; corner++) {
    const vertex = list[corner];
    if (vertex >= vertexCount) refuse(vertex);
    let known = table ? table[vertex] : (numbers.get(vertex) ?? -1);
    if (known < 0) {
      known = count++;
      vertices[known] = vertex;
      if (table) table[vertex] = known;
      else numbers.set(vertex, known);
    }
    triangles[corner] = known;
  }
  return { triangles, vertices: vertices.slice(0, count) };
}
