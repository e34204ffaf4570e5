/** What JSON Schema needs beyond what zod writes. */

export interface JsonSchema extends Record<string, unknown> {
  properties?: Record<string, JsonSchema>;
}

/** In a throw that is like another any key may be missing, or `null`. */
export function inheritable(schema: JsonSchema): void {
  delete schema.required;
  for (const [key, inner] of Object.entries(schema.properties ?? {})) {
    inheritable(inner);
    const { description, default: value, ...form } = inner;
    const rest = value === undefined || isEmptyMap(value) ? {} : { default: value };
    schema.properties![key] = { description, ...rest, anyOf: [form, { type: "null" }] };
  }
}

/** Forms that have a title stand once, under `definitions`. */
export function hoist(node: unknown, definitions: Record<string, JsonSchema>): unknown {
  if (Array.isArray(node)) return node.map((item) => hoist(item, definitions));
  if (typeof node !== "object" || node === null) return node;
  const inner = Object.entries(node).map(([key, value]) => [key, hoist(value, definitions)]);
  const { title, description, ...form } = Object.fromEntries(inner) as JsonSchema;
  if (typeof title !== "string") return Object.fromEntries(inner);
  definitions[title] ??= form;
  const reference = { $ref: `#/definitions/${title}` };
  // beside a reference draft 7 reads nothing
  return description === undefined ? reference : { description, allOf: [reference] };
}

const isEmptyMap = (value: unknown) =>
  typeof value === "object" && value !== null && !Array.isArray(value) && Object.keys(value).length === 0;
