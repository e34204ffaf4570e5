/**
 * The grammar: every key of the throw file, what it means and which form it has. Read by `parse.ts` and printed as JSON
 * Schema by `throwFileSchema`.
 */

import * as z from "zod";
import { density, inertia, point, shape, weights } from "./bodies.js";
import { axis, facing } from "./facing.js";
import { fields } from "./fields.js";
import { choice, type Form, list, NAME, name, type Tell, text, word, yesNo } from "./form.js";
import { host } from "./host.js";
import { bounds, drawnVector, number, spreadNumber, time, vector } from "./numbers.js";
import { gravity, seed, takes } from "./scalars.js";

/** A value of a form. Faults travel as `params` of custom issues. */
const leaf = <T>(form: Form<T>, description: string) =>
  z
    .any()
    .transform((value, context): T => {
      const tell: Tell = (fault, remedy, ...path) =>
        context.addIssue({ code: "custom", message: fault, params: { remedy }, path });
      if (value === undefined) tell("this key is missing", form.expects);
      return (value === undefined ? undefined : form.read(value, tell)) as T;
    })
    .meta({ description, ...form.json });

/** A map of known keys; for a fault of the map itself the message is the keys known. */
const keys = <S extends z.ZodRawShape>(shape: S, description: string) =>
  z
    .strictObject(shape, {
      error: (issue) =>
        issue.code === "unrecognized_keys" || issue.code === "invalid_type"
          ? Object.keys(shape).join(" ")
          : undefined,
    })
    .meta({ description });

const optional = <T>(form: Form<T>, description: string) => leaf(form, description).optional();

/** A key with a default that the JSON Schema tells too. */
const defaulting = <T>(form: Form<T>, value: T, description: string) =>
  leaf(form, description).default(value as never);

const metres = { unit: "m" };
const degrees = { unit: "degrees" };
const speed = { min: 0, unit: "m/s" };

export const propSchema = keys(
  {
    model: optional(
      text("a .glb or .gltf file, relative to this file"),
      "a .glb or .gltf file, relative to this file; this or shape",
    ),
    shape: optional(shape, "a primitive with a mesh of its own, axis +Y, centred, m; this or model"),
    node: optional(
      text("the name of a node of the model"),
      "weigh and animate this node of the model and all below it; default: the whole scene",
    ),
    scale: defaulting(number({ above: 0 }), 1, "a factor on the model (0.01 for a model in centimetres)"),
    density: defaulting(
      density,
      1000,
      "kg/m³: one number, or a map from material name, else node name; `default` for the rest",
    ),
    mass: optional(number({ above: 0, unit: "kg" }), "kg; scales the density so that the total is this"),
    solid: defaulting(
      word("auto", "hull", "surface"),
      "auto",
      "auto: closed parts are solid, flat openings are capped, what stays open is a thin surface; hull: the convex hull; surface: thin walls",
    ),
    wall: optional(
      number({ above: 0, unit: "m" }),
      "m; thin walls: mass = density × wall × area. Surfaces take 0.002 unless stated",
    ),
    weights: defaulting(weights, [], "point masses added: [{at: [x, y, z], mass: kg}]"),
    centerOfMass: optional(vector(metres), "[x, y, z], m, stated instead of worked out"),
    inertia: optional(
      inertia,
      "about the centre of mass in the model's axes, kg m²: [xx, yy, zz] or [xx, yy, zz, xy, xz, yz]; stated instead of worked out",
    ),
    points: z
      .record(
        z.string().regex(NAME),
        leaf(point, "[x, y, z] in the model's scene frame, m, or {node: NAME}: that node's place and axes"),
      )
      .default({})
      .meta({ description: "named points of the prop" }),
  },
  "what is thrown",
);

const box = fields(
  {
    box: list(vector(metres), 2, 2, "two corners [[x, y, z], [x, y, z]]") as unknown as Form<
      [[number, number, number], [number, number, number]]
    >,
  },
  { turn: number(degrees) },
  ({ box: [low, high] }, tell) => {
    for (const i of [0, 1, 2])
      if (low[i] >= high[i])
        tell(
          `the first corner is not below the second in ${"xyz"[i]} (found ${low[i]} and ${high[i]})`,
          "the smaller number in the first corner",
          "box",
        );
  },
);
const boxes: Form<{ box: [[number, number, number], [number, number, number]]; turn: number }[]> = (() => {
  const form = list(box, 0, Number.POSITIVE_INFINITY, "a list of boxes {box: [[x, y, z], [x, y, z]], turn}");
  return { ...form, read: (value, tell) => form.read(value, tell)?.map((b) => ({ turn: 0, ...b })) };
})();

export const throwSchema = (frameRate: number) =>
  keys(
    {
      prop: leaf(name("a prop"), "which prop is thrown"),
      like: optional(
        name("another throw"),
        "another throw whose keys are taken, merged key by key; null takes an inherited key away",
      ),
      takes: defaulting(takes, 1, "how many takes, or a list of the numbers wanted, such as [3, 7, 19]"),
      gravity: optional(
        gravity,
        "m/s² along -Y for this throw; free: solved, so that one condition more can be given",
      ),
      release: keys(
        {
          at: optional(
            drawnVector(),
            "place of the release point at time 0, m; default: where the model stands",
          ),
          point: defaulting(
            choice(name("a point of the prop, or centerOfMass")),
            "centerOfMass",
            "centerOfMass or a named point",
          ),
          facing: optional(facing("release"), "orientation at release; default as modelled"),
          scatter: optional(
            spreadNumber({ min: 0, max: 180, ...degrees }),
            "degrees by which it is turned from that about an evenly drawn axis",
          ),
          velocity: optional(drawnVector(), "of the release point, m/s"),
          angularVelocity: optional(
            drawnVector(),
            "world frame, rad/s, instead of spin; not with arrive.facing",
          ),
        },
        "how it leaves the hand",
      ).prefault({}),
      arrive: keys(
        {
          at: optional(drawnVector(), "place of the arrival point at the end, m"),
          point: optional(
            choice(name("a point of the prop, or centerOfMass")),
            "centerOfMass or a named point; default: release.point",
          ),
          after: optional(time({ above: 0 }, frameRate), "flight time: seconds, or whole frames such as 27f"),
          facing: optional(
            facing("arrive"),
            "orientation at the end: the spin is solved so that it comes true",
          ),
          scatter: optional(
            spreadNumber({ min: 0, max: 180, ...degrees }),
            "degrees by which it is turned from that; not with rest",
          ),
          floor: optional(
            spreadNumber(metres),
            "instead of at: the flight ends when any part of the prop first touches this height, m",
          ),
        },
        "how it ends",
      ).prefault({}),
      arc: keys(
        {
          apex: optional(
            spreadNumber({ min: 0, ...metres }),
            "how far the centre of mass rises above its place at release, m",
          ),
          through: optional(
            drawnVector(),
            "[x, y, z]: the centre of mass passes at this height where it is abreast of the point",
          ),
          speed: optional(spreadNumber(speed), "of the launch of the centre of mass, m/s"),
          elevation: optional(
            spreadNumber({ min: -90, max: 90, ...degrees }),
            "of the launch, degrees above level",
          ),
          heading: optional(spreadNumber(degrees), "of the launch, degrees about +Y from +Z towards +X"),
          branch: defaulting(choice(word("low", "high")), "low", "where two arcs fit"),
        },
        "the arc of the centre of mass",
      ).prefault({}),
      spin: keys(
        {
          axis: optional(
            axis,
            "a direction of the prop, or of the world (left: topspin, right: backspin), or any",
          ),
          turns: optional(
            spreadNumber({ unit: "turns" }),
            "turns about the angular momentum, right-hand rule; negative for the other way",
          ),
          rate: optional(spreadNumber({ unit: "turns per second" }), "the same per second"),
          wobble: optional(
            spreadNumber({ min: 0, below: 90, ...degrees }),
            "degrees by which the angular momentum is tilted from that of a clean spin; default 0, but 3 about a middle axis",
          ),
          phase: optional(
            spreadNumber(degrees),
            "degrees: where round the axis the tilt lies; default drawn",
          ),
        },
        "how it turns",
      ).optional(),
      limits: keys(
        {
          minHeight: optional(number(metres), "no part of the prop goes below this, m"),
          maxHeight: optional(number(metres), "no part of the prop goes above this, m"),
          clear: defaulting(
            boxes,
            [],
            "boxes that no part of the prop enters: [{box: [[x, y, z], [x, y, z]], turn: degrees about +Y}]",
          ),
          speed: optional(number(speed), "greatest of the centre of mass, m/s"),
          rate: optional(
            number({ min: 0, unit: "turns per second" }),
            "greatest angular speed, turns per second",
          ),
          turns: optional(bounds({ min: 0, unit: "turns" }), "least and most turns, such as 1..2"),
          share: optional(
            number({ min: 0, max: 1 }),
            "least share of the turning that is about spin.axis, 0 to 1",
          ),
        },
        "bounds every take holds, or it is drawn again; a range here is a bound, never a draw",
      ).optional(),
      vary: defaulting(
        word("even", "chance"),
        "even",
        "even: takes differ from one another as much as they can; chance: drawn independently",
      ),
      hold: keys(
        {
          before: defaulting(
            time({ min: 0 }, frameRate),
            0,
            "the clip stands still at the release pose first, seconds or frames",
          ),
          after: defaulting(
            time({ min: 0 }, frameRate),
            0,
            "the clip stands still at the arrival pose after, seconds or frames",
          ),
        },
        "stillness around the flight",
      ).prefault({}),
    },
    "a throw",
  );

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
  const schema = z.toJSONSchema(USUAL, { io: "input", target: "draft-7" }) as Schema;
  const { props, throws, chains } = schema.properties!;
  for (const map of [props, throws, chains]) (map as Schema).propertyNames = { pattern: NAME.source };
  inheritable(throws.additionalProperties as Schema);
  (throws.additionalProperties as Schema).anyOf = [{ required: ["prop"] }, { required: ["like"] }];
  schema.required = ["props"];
  const definitions: Record<string, Schema> = {};
  const hoisted = hoist(schema, definitions) as Schema;
  return { ...hoisted, definitions };
}

interface Schema extends Record<string, unknown> {
  properties?: Record<string, Schema>;
}

/** In a throw that is like another any key may be missing, or `null`. */
function inheritable(schema: Schema): void {
  delete schema.required;
  for (const [key, inner] of Object.entries(schema.properties ?? {})) {
    inheritable(inner);
    const { description, default: value, ...form } = inner;
    const rest = value === undefined || isEmptyMap(value) ? {} : { default: value };
    schema.properties![key] = { description, ...rest, anyOf: [form, { type: "null" }] };
  }
}

/** Forms that have a title stand once, under `definitions`. */
function hoist(node: unknown, definitions: Record<string, Schema>): unknown {
  if (Array.isArray(node)) return node.map((item) => hoist(item, definitions));
  if (typeof node !== "object" || node === null) return node;
  const inner = Object.entries(node).map(([key, value]) => [key, hoist(value, definitions)]);
  const { title, description, ...form } = Object.fromEntries(inner) as Schema;
  if (typeof title !== "string") return Object.fromEntries(inner);
  definitions[title] ??= form;
  const reference = { $ref: `#/definitions/${title}` };
  // beside a reference draft 7 reads nothing
  return description === undefined ? reference : { description, allOf: [reference] };
}

const isEmptyMap = (value: unknown) =>
  typeof value === "object" && value !== null && !Array.isArray(value) && Object.keys(value).length === 0;
