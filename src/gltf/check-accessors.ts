import { ACCESSOR_TYPES, COMPONENT_BYTES, elementBytes, UNSIGNED } from "./accessor-layout.js";
import { type Checker, type JsonObject, shown } from "./checker.js";

/** Bytes that an accessor without a view may stand for: those are zeros made from nothing. */
const GREATEST_FROM_NOTHING = 1 << 24;

/** Checks that buffer views lie within their buffers and accessors within their views, before anything is allocated. */
export function checkAccessors(json: JsonObject, check: Checker): void {
  const buffers = check.objects(json, "buffers");
  buffers.forEach((buffer, i) => {
    check.integer(buffer.byteLength, `buffers[${i}].byteLength`, 1);
    if (buffer.uri !== undefined) check.string(buffer.uri, `buffers[${i}].uri`);
  });
  const views = check.objects(json, "bufferViews");
  views.forEach((view, i) => {
    const where = `bufferViews[${i}]`;
    check.index(view.buffer, `${where}.buffer`, buffers.length, "buffers");
    const length = check.integer(view.byteLength, `${where}.byteLength`, 1);
    const end = offset(view, where, check) + length;
    const available = buffers[view.buffer as number].byteLength as number;
    if (end > available)
      check.refuse(`${where} ends at byte ${end}`, `buffers[${view.buffer}] has ${available} bytes`);
    if (view.byteStride !== undefined) check.integer(view.byteStride, `${where}.byteStride`, 4, 252);
  });
  check.objects(json, "accessors").forEach((accessor, i) => {
    checkAccessor(accessor, `accessors[${i}]`, views, check);
  });
}

function checkAccessor(accessor: JsonObject, where: string, views: JsonObject[], check: Checker): void {
  const { type, componentType } = accessor;
  if (!ACCESSOR_TYPES.includes(type as string))
    check.refuse(`${where}.type is ${shown(type)}`, `it must be one of ${ACCESSOR_TYPES.join(", ")}`);
  checkComponentType(componentType, where, [...COMPONENT_BYTES.keys()], check);
  const count = check.integer(accessor.count, `${where}.count`, 1);
  const size = elementBytes(type as string, componentType as number);
  if (accessor.bufferView !== undefined) checkRange(accessor, where, size, count, views, check);
  else if (count * size > GREATEST_FROM_NOTHING)
    check.refuse(`${where}.count is ${count} without a bufferView`, "so many zeros are not read");

  if (accessor.sparse === undefined) return;
  const sparse = check.object(accessor.sparse, `${where}.sparse`);
  const changed = check.integer(sparse.count, `${where}.sparse.count`, 1, count);
  const indices = check.object(sparse.indices, `${where}.sparse.indices`);
  checkComponentType(indices.componentType, `${where}.sparse.indices`, UNSIGNED, check);
  const indexSize = elementBytes("SCALAR", indices.componentType as number);
  checkRange(indices, `${where}.sparse.indices`, indexSize, changed, views, check);
  const values = check.object(sparse.values, `${where}.sparse.values`);
  checkRange(values, `${where}.sparse.values`, size, changed, views, check);
}

function checkComponentType(value: unknown, where: string, allowed: number[], check: Checker): void {
  if (!allowed.includes(value as number))
    check.refuse(`${where}.componentType is ${shown(value)}`, `it must be one of ${allowed.join(", ")}`);
}

/** Whether `count` elements of `size` bytes fit the view that `part` names, at its offset. */
function checkRange(
  part: JsonObject,
  where: string,
  size: number,
  count: number,
  views: JsonObject[],
  check: Checker,
): void {
  check.index(part.bufferView, `${where}.bufferView`, views.length, "bufferViews");
  const view = views[part.bufferView as number];
  const stride = (view.byteStride as number | undefined) ?? size;
  if (stride < size)
    check.refuse(
      `bufferViews[${part.bufferView}].byteStride is ${stride}`,
      `${where} has elements of ${size} bytes`,
    );
  const end = offset(part, where, check) + stride * (count - 1) + size;
  if (end > (view.byteLength as number))
    check.refuse(
      `${where} needs ${end} bytes (${count} elements)`,
      `bufferViews[${part.bufferView}] has ${view.byteLength}`,
    );
}

const offset = (part: JsonObject, where: string, check: Checker): number =>
  part.byteOffset === undefined ? 0 : check.integer(part.byteOffset, `${where}.byteOffset`, 0);
