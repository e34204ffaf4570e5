import { describe, expect, test } from "vitest";
import { parse } from "yaml";
import { throwFileSchema } from "../../src/throwfile/schema.js";
import { EVERY_KEY, QUAY } from "./quay.js";

type Schema = Record<string, unknown>;
const SCHEMA = throwFileSchema();

/**
 * What JSON Schema draft 7 says of a value, for the keywords this schema has (draft-handrews-json-schema-validation-01):
 * paths that do not conform. An unknown keyword is an error, so that none is passed over.
 */
function broken(schema: Schema, value: unknown, path = ""): string[] {
  const faults: string[] = [];
  const fail = (ok: boolean) => ok || faults.push(path);
  const object =
    typeof value === "object" && value !== null && !Array.isArray(value) ? (value as Schema) : undefined;
  for (const [keyword, given] of Object.entries(schema)) {
    const g = given as never;
    if (["$schema", "description", "default", "definitions"].includes(keyword)) continue;
    else if (keyword === "$ref")
      faults.push(
        ...broken((SCHEMA.definitions as Schema)[(given as string).slice(14)] as Schema, value, path),
      );
    else if (keyword === "type") fail(([] as string[]).concat(g).some((type) => isType(type, value)));
    else if (keyword === "enum") fail((given as unknown[]).includes(value));
    else if (keyword === "const") fail(given === value);
    else if (keyword === "allOf") for (const s of given as Schema[]) faults.push(...broken(s, value, path));
    else if (keyword === "anyOf") {
      const tried = (given as Schema[]).map((s) => broken(s, value, path));
      if (tried.every((t) => t.length > 0))
        faults.push(tried.sort((a, b) => b[0].length - a[0].length)[0][0]);
    } else if (keyword === "minimum") fail(typeof value !== "number" || value >= g);
    else if (keyword === "maximum") fail(typeof value !== "number" || value <= g);
    else if (keyword === "exclusiveMinimum") fail(typeof value !== "number" || value > g);
    else if (keyword === "exclusiveMaximum") fail(typeof value !== "number" || value < g);
    else if (keyword === "pattern") fail(typeof value !== "string" || new RegExp(g, "u").test(value));
    else if (keyword === "minLength") fail(typeof value !== "string" || value.length >= g);
    else if (keyword === "minItems") fail(!Array.isArray(value) || value.length >= g);
    else if (keyword === "maxItems") fail(!Array.isArray(value) || value.length <= g);
    else if (keyword === "uniqueItems") fail(!Array.isArray(value) || new Set(value).size === value.length);
    else if (keyword === "items") {
      if (Array.isArray(value))
        for (const [i, item] of value.entries()) {
          const inner = Array.isArray(given) ? given[i] : given;
          if (inner) faults.push(...broken(inner as Schema, item, `${path}/${i}`));
        }
    } else if (keyword === "minProperties") fail(!object || Object.keys(object).length >= g);
    else if (keyword === "maxProperties") fail(!object || Object.keys(object).length <= g);
    else if (keyword === "required")
      for (const key of given as string[]) fail(!object || Object.hasOwn(object, key));
    else if (keyword === "propertyNames")
      for (const key of Object.keys(object ?? {})) faults.push(...broken(g, key, `${path}/${key}`));
    else if (keyword === "properties") {
      for (const [key, inner] of Object.entries(given as Schema))
        if (object && Object.hasOwn(object, key))
          faults.push(...broken(inner as Schema, object[key], `${path}/${key}`));
    } else if (keyword === "additionalProperties") {
      const known = Object.keys((schema.properties ?? {}) as Schema);
      for (const [key, inner] of Object.entries(object ?? {}).filter(([k]) => !known.includes(k)))
        if (given === false) faults.push(`${path}/${key}`);
        else faults.push(...broken(given as Schema, inner, `${path}/${key}`));
    } else throw new Error(`unknown keyword ${keyword} at ${path}`);
  }
  return faults;
}

function isType(type: string, value: unknown): boolean {
  if (type === "integer") return Number.isInteger(value);
  if (type === "array") return Array.isArray(value);
  if (type === "null") return value === null;
  if (type === "object") return typeof value === "object" && value !== null && !Array.isArray(value);
  return typeof value === type;
}

const check = (text: string) => broken(SCHEMA, parse(text));

describe("the JSON Schema", () => {
  test("passes the grammar's example and a file with every key", () => {
    expect(check(QUAY)).toEqual([]);
    expect(check(EVERY_KEY)).toEqual([]);
  });

  test("passes a throw like another, with keys taken away and none of its own", () => {
    const heir = `${QUAY}  heir: { like: lob-to-bench, spin: null, release: { facing: null } }\n`;
    expect(check(heir)).toEqual([]);
  });

  test.each([
    ["takes: 24", "taks: 24", "/throws/lob-to-bench/taks"],
    ["seed:", "sead:", "/sead"],
    ["density:", "densty:", "/props/spanner/densty"],
    ["scatter:", "scater:", "/throws/lob-to-bench/release/scater"],
    ["prop: spanner", "gravity: 1", "/throws/lob-to-bench"],
    ["takes: 24", "takes: 0", "/throws/lob-to-bench/takes"],
    ["turns: 1.5", "turns: often", "/throws/lob-to-bench/spin/turns"],
    ["[short, up]", "[short, upp]", "/throws/lob-to-bench/release/facing"],
    ["[3.2, 1.0, 0.4]", "[3.2, 1.0]", "/throws/lob-to-bench/arrive/at"],
    ["  lob-to-bench:", "  lob to bench:", "/throws/lob to bench"],
  ])("refuses %s as %s", (right, wrong, path) => {
    const faults = check(QUAY.replace(right, wrong));
    expect(faults).not.toEqual([]);
    for (const fault of faults) expect(fault.startsWith(path)).toBe(true);
  });

  test("describes every key of the grammar", () => {
    const bare: string[] = [];
    const visit = (schema: Schema, path: string) => {
      for (const [key, inner] of Object.entries((schema.properties ?? {}) as Record<string, Schema>)) {
        if (typeof inner.description !== "string" || inner.description === "") bare.push(`${path}/${key}`);
        visit(inner, `${path}/${key}`);
      }
      for (const inner of (schema.anyOf ?? []) as Schema[]) if (inner.properties) visit(inner, path);
      const named = schema.additionalProperties;
      if (typeof named === "object" && named !== null) visit(named as Schema, `${path}/*`);
    };
    visit(SCHEMA, "");
    // what stands in the value of one key is told by that key's own description
    expect(bare.filter((path) => !/\/(host|shape\/\w+|weights|points\/\*|clear)\//.test(path))).toEqual([]);
  });
});
