/** Sizes of accessor elements (glTF 2.0, 3.6.2). */

export const COMPONENT_BYTES = new Map([
  [5120, 1],
  [5121, 1],
  [5122, 2],
  [5123, 2],
  [5125, 4],
  [5126, 4],
]);

export const FLOAT = 5126;
export const SHORT = 5122;
export const UNSIGNED = [5121, 5123, 5125];

const COLUMNS_ROWS = new Map([
  ["SCALAR", [1, 1]],
  ["VEC2", [1, 2]],
  ["VEC3", [1, 3]],
  ["VEC4", [1, 4]],
  ["MAT2", [2, 2]],
  ["MAT3", [3, 3]],
  ["MAT4", [4, 4]],
]);

export const ACCESSOR_TYPES = [...COLUMNS_ROWS.keys()];

/** Bytes of one element; the columns of a matrix start at multiples of four. */
export function elementBytes(type: string, componentType: number): number {
  const [columns, rows] = COLUMNS_ROWS.get(type)!;
  const column = rows * COMPONENT_BYTES.get(componentType)!;
  return columns === 1 ? column : columns * (column + (-column & 3));
}
