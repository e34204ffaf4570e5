/** Orientations and directions as they are written; which points a prop has is checked later, by `points.ts`. */

import { WORLD_DIRECTIONS } from "../aim/world-directions.js";
import { cross, length, type Vec3 } from "../math/vec3.js";
import { shown } from "./errors.js";
import { fields } from "./fields.js";
import { at, choice, type Form, isObject, list, NAME, name, type Tell, titled } from "./form.js";
import { nearest } from "./nearest.js";
import { anyNumber, spreadVector } from "./numbers.js";
import {
  type Choice,
  type Drawable,
  type Facing,
  type FacingPair,
  PROP_DIRECTIONS,
  type PropDirection,
  type SpreadQuat,
  type SpreadVector,
  type WorldDirection,
  type WorldDirectionName,
} from "./types.js";

/** Words that no point may be called, whatever their case: they would be misread. */
export const RESERVED_POINTS: readonly string[] = [
  ...PROP_DIRECTIONS,
  ...WORLD_DIRECTIONS,
  "any",
  "release",
  "rest",
  "centerofmass",
];

const PROP_WORDS = `${PROP_DIRECTIONS.join(", ")}, a named point (a leading - turns it round), or [x, y, z]`;
const POINT = NAME.source.replace("^", "^-?");
const PAIR = "a pair [direction of the prop, direction of the world]";
const WORLD_WORDS = `${WORLD_DIRECTIONS.join(", ")}, or [x, y, z]`;

/** A direction of the prop; words of the world are refused. */
const propDirection: Form<PropDirection> = direction(PROP_DIRECTIONS, PROP_WORDS, (word, tell) => {
  const bare = word.replace(/^-/, "");
  if (isWorldWord(bare)) {
    tell(`a direction of the world where one of the prop stands (found ${shown(word)})`, PROP_WORDS);
    return undefined;
  }
  if (NAME.test(bare) && bare !== "any") return word;
  tell(`not a direction of the prop (found ${shown(word)})`, PROP_WORDS);
  return undefined;
});

const worldDirection: Form<WorldDirection> = direction(WORLD_DIRECTIONS, WORLD_WORDS, (word, tell) => {
  if (isWorldWord(word)) return word;
  const near = nearest(word.replace(/^-/, ""), WORLD_DIRECTIONS);
  const turned = word.startsWith("-") && isWorldWord(word.slice(1));
  tell(
    `not a direction of the world (found ${shown(word)})`,
    turned
      ? `${OPPOSITE[near as WorldDirectionName] ?? "[x, y, z]"}, as no - goes before these`
      : `${WORLD_WORDS} (nearest: ${near})`,
  );
  return undefined;
});

const OPPOSITE: Partial<Record<WorldDirectionName, WorldDirectionName>> = {
  up: "down",
  down: "up",
  ahead: "back",
  back: "ahead",
  left: "right",
  right: "left",
};

/** `spin.axis` */
export const axis: Form<Drawable<PropDirection | WorldDirection | "any">> = choice(
  direction(
    [...PROP_DIRECTIONS, ...WORLD_DIRECTIONS, "any"],
    `${PROP_WORDS}; ${WORLD_DIRECTIONS.join(", ")}; or any`,
    (word, tell) => {
      if (word === "any" || isWorldWord(word) || (NAME.test(word.replace(/^-/, "")) && word !== "-any")) {
        if (!word.startsWith("-") || !isWorldWord(word.slice(1))) return word;
        const opposite = OPPOSITE[word.slice(1) as WorldDirectionName];
        tell(`no - goes before a direction of the world (found ${shown(word)})`, opposite ?? "[x, y, z]");
        return undefined;
      }
      tell(`not a direction (found ${shown(word)})`, `${PROP_WORDS}; ${WORLD_DIRECTIONS.join(", ")}; or any`);
      return undefined;
    },
  ),
);

/** `release.facing` and `arrive.facing`; the latter knows two words more. */
export function facing(when: "release" | "arrive"): Form<Drawable<Facing>> {
  const words = when === "release" ? ["any"] : ["any", "release", "rest"];
  const expects = `pairs such as [[long, up], [short, ahead]], {rotation: [x, y, z, w]}, or ${words.join(" or ")}`;
  return choice<Facing>({
    read(value, tell) {
      if (typeof value === "string" && words.includes(value)) return value as Facing;
      if (Array.isArray(value)) return readPairs(value, tell);
      if (isObject(value)) return rotation.read(value, tell);
      if (value === "release" || value === "rest") tell(`only at arrival (found ${shown(value)})`, expects);
      else tell(`not an orientation (found ${shown(value)})`, expects);
      return undefined;
    },
    json: { anyOf: [{ enum: words }, pairs.json, rotation.json] },
    expects,
  });
}

const propSide = titled("prop-direction", choice(propDirection));
const worldSide = titled("world-direction", choice(worldDirection));
// both places are read one by one in `readPairs`; here they are for the schema
const pair: Form<unknown> = {
  ...list<unknown>({ read: (value) => value, json: {}, expects: "" }, 2, 2, PAIR),
  json: { type: "array", items: [propSide.json, worldSide.json], minItems: 2, maxItems: 2 },
};
const pairs = list(pair, 1, 2, "one or two pairs [direction of the prop, direction of the world]");

function readPairs(value: unknown[], tell: Tell): Facing | undefined {
  if (value.length === 2 && !value.some(Array.isArray)) {
    tell(`a pair that stands alone (found ${shown(value)})`, "a list of pairs: put [ ] around it once more");
    return undefined;
  }
  if (pairs.read(value, tell) === undefined) return undefined;
  const read = (value as [unknown, unknown][]).map(([p, w], i) => {
    if (isWorldWord(p) && typeof w === "string" && !isWorldWord(w)) {
      tell(
        `a pair the wrong way round (found ${shown([p, w])})`,
        "[direction of the prop, direction of the world]",
        i,
      );
      return [undefined];
    }
    return [propSide.read(p, at(tell, i, 0)), worldSide.read(w, at(tell, i, 1))];
  });
  if (read.some((r) => r.includes(undefined))) return undefined;
  const facing = read as unknown as [FacingPair] | [FacingPair, FacingPair];
  if (facing.length === 2)
    for (const side of [0, 1] as const) {
      const whose = side === 0 ? "the prop" : "the world";
      if (!parallel(facing[0][side], facing[1][side])) continue;
      tell(
        `both pairs have the same line of ${whose} (found ${shown(plainly(facing[1][side]))})`,
        "two directions at an angle to each other, or one pair alone",
        1,
        side,
      );
      return undefined;
    }
  return facing;
}

const plainly = (value: unknown) => (Array.isArray(value) ? value.map(String) : value);

const quaternion: Form<SpreadQuat | Choice<SpreadQuat>> = choice(
  nonZero(list(anyNumber, 4, 4, "a list of four numbers [x, y, z, w]")) as unknown as Form<SpreadQuat>,
);
const point = choice(name("a point of the prop"));

const rotation = (() => {
  const form = fields({ rotation: quaternion }, { point });
  // a throw like another may write one of the two alone
  return titled("rotation", { ...form, json: { ...form.json, required: [] } });
})();

function direction<T extends string>(
  words: readonly string[],
  expects: string,
  readWord: (word: string, tell: Tell) => T | undefined,
): Form<T | SpreadVector> {
  const vector = nonZero(spreadVector());
  const points = words.includes("long");
  return {
    read(value, tell) {
      if (typeof value === "string") return readWord(value, tell);
      if (Array.isArray(value)) return vector.read(value, tell);
      tell(`not a direction (found ${shown(value)})`, expects);
      return undefined;
    },
    json: { anyOf: [{ enum: words }, ...(points ? [{ type: "string", pattern: POINT }] : []), vector.json] },
    expects,
  };
}

/** Refuses a list whose every number is 0. */
function nonZero<T>(form: Form<T>): Form<T> {
  return {
    ...form,
    read(value, tell) {
      const read = form.read(value, tell);
      if (!Array.isArray(read) || !read.every((x) => x === 0)) return read;
      tell(`no direction (found ${shown(read)})`, "at least one number that is not 0");
      return undefined;
    },
  };
}

const isWorldWord = (word: unknown): word is WorldDirectionName =>
  (WORLD_DIRECTIONS as readonly unknown[]).includes(word);

/** Whether two directions are known to lie on one line, before anything is drawn and any prop weighed. */
function parallel(a: unknown, b: unknown): boolean {
  const [u, v] = [known(a), known(b)];
  if (typeof u === "string" || typeof v === "string") return u === v;
  if (u === undefined || v === undefined) return false;
  return length(cross(u, v)) <= 1e-9 * length(u) * length(v);
}

const LINES: Record<string, Vec3 | string> = {
  x: [1, 0, 0],
  y: [0, 1, 0],
  z: [0, 0, 1],
  up: [0, 1, 0],
  down: [0, 1, 0],
  back: "ahead",
  right: "left",
};

/** A word for a line that only comes to be known later, its vector where it is known already. */
function known(direction: unknown): Vec3 | string | undefined {
  if (typeof direction === "string") {
    const bare = direction.replace(/^-/, "");
    return Object.hasOwn(LINES, bare) ? LINES[bare] : bare;
  }
  const plain = Array.isArray(direction) && direction.every((x) => typeof x === "number");
  return plain ? (direction as unknown as Vec3) : undefined;
}
