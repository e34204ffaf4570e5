/**
 * The grammar: every key of the throw file, what it means and which form it has. Read by `parse.ts` and printed as JSON
 * Schema by `throwFileSchema`.
 */

import * as z from "zod";
import { list, NAME, name, text, word, yesNo } from "./form.js";
import { host } from "./host.js";
import { hoist, inheritable, type JsonSchema } from "./json-schema.js";
import { defaulting, keys, leaf, optional } from "./key.js";
import { number } from "./numbers.js";
import { propSchema } from "./prop-schema.js";
import { seed } from "./scalars.js";
import { throwSchema } from "./throw-schema.js";

export const chainSchema = keys(
  {
    throws: leaf(
      list(name("a throw"), 1, Number.POSITIVE_INFINITY, "a list of names of throws"),
      "names of the throws, in order; each starts where, and as, the one before arrived",
    ),
    loop: defaulting(yesNo, false, "true: the end must be the start"),
  },
  "throws one after the other in one clip",
);

const bakeSchema = keys(
  {
    tolerance: optional(
      number({ above: 0, unit: "m" }),
      "m: no point of the prop is ever further than this from the true motion; default: the smaller of 0.001 and 0.5 % of the reach",
    ),
    keys: defaulting(
      word("linear", "cubic", "smallest", "frames"),
      "linear",
      "linear: plays everywhere; cubic; smallest: whichever takes fewer bytes; frames: one on every frame",
    ),
    layout: defaulting(
      word("one-node", "two-node", "turn-only"),
      "one-node",
      "one-node; two-node: the outer follows the centre of mass, the inner turns; turn-only: rotation alone",
    ),
    files: defaulting(
      word("per-throw", "per-take", "together"),
      "per-throw",
      "per-throw: the prop once, every take a clip; per-take; together",
    ),
    container: defaulting(word("glb", "gltf"), "glb", "glb or gltf"),
    mesh: defaulting(yesNo, true, "false: nodes and clips alone"),
    pack: defaulting(word("float", "int16"), "float", "float, or int16 for rotations of linear keys"),
  },
  "how clips are written",
);

const byName = <S extends z.ZodType>(entry: S, description: string) =>
  z.record(z.string().regex(NAME), entry).optional().meta({ description });

/** The whole file. */
const fileSchema = (throwEntry: typeof usualThrow) =>
  keys(
    {
      $schema: optional(
        text("where an editor finds the schema"),
        "where an editor finds this schema; says nothing about throws",
      ),
      seed: defaulting(seed, "0", "text or whole number: another seed, other draws"),
      gravity: defaulting(number({ min: 0, unit: "m/s²" }), 9.80665, "m/s² along -Y"),
      frameRate: defaulting(
        number({ above: 0, unit: "frames per second" }),
        30,
        "what 12f means as a time, and what keys: frames writes",
      ),
      host: optional(
        host,
        "the engine's axes as directions of glTF, and its unit in metres: {axes: [z, -x, y], unit: 0.01}",
      ),
      bake: bakeSchema.prefault({}),
      props: byName(propSchema, "what is thrown, by name"),
      throws: byName(throwEntry, "the throws, by name"),
      chains: byName(chainSchema, "throws one after the other, by name"),
    },
    "a throw file of tossbake",
  );

/** At the usual frame rate: built once, as building takes longer than reading. */
export const usualThrow = throwSchema(30);
export const USUAL = fileSchema(usualThrow);

/** JSON Schema (draft 7, which editors know best) of the throw file, with a description for each key. */
export function throwFileSchema(): Record<string, unknown> {
  const schema = z.toJSONSchema(USUAL, { io: "input", target: "draft-7" }) as JsonSchema;
  const { props, throws, chains } = schema.properties!;
  for (const map of [props, throws, chains]) (map as JsonSchema).propertyNames = { pattern: NAME.source };
  inheritable(throws.additionalProperties as JsonSchema);
  (throws.additionalProperties as JsonSchema).anyOf = [{ required: ["prop"] }, { required: ["like"] }];
  schema.required = ["props"];
  const definitions: Record<string, JsonSchema> = {};
  const hoisted = hoist(schema, definitions) as JsonSchema;
  return { ...hoisted, definitions };
}
