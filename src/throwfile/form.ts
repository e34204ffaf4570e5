/**
 * A form: what one value of the throw file may look like. One object says both how it is read, with every complaint, and
 * what it is in JSON Schema, so that the two cannot part.
 */

import { shown } from "./errors.js";
import { nearest } from "./nearest.js";
import type { Choice } from "./types.js";

export type Json = Readonly<Record<string, unknown>>;

/** Tells of a fault at `path` within the value; the value found is added to the fault. */
export type Tell = (fault: string, remedy: string, ...path: (string | number)[]) => void;

export interface Form<T> {
  /** The value checked and converted; `undefined` once `tell` was called. */
  read(value: unknown, tell: Tell): T | undefined;
  readonly json: Json;
  /** What would be right, in a few words. */
  readonly expects: string;
}

export const at =
  (tell: Tell, ...inner: (string | number)[]): Tell =>
  (fault, remedy, ...path) =>
    tell(fault, remedy, ...inner, ...path);

export const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === "object" && value !== null && !Array.isArray(value);

/** The form, to stand once in the JSON Schema under this title. */
export const titled = <T>(title: string, form: Form<T>): Form<T> => ({
  ...form,
  json: { title, ...form.json },
});

/** One of a few words. */
export function word<const T extends string>(...words: T[]): Form<T> {
  const expects = words.length === 2 ? words.join(" or ") : `one of ${words.join(", ")}`;
  return {
    read(value, tell) {
      if ((words as unknown[]).includes(value)) return value as T;
      const near = typeof value === "string" && value !== "" ? nearest(value, words) : undefined;
      const hint = near !== undefined && words.length > 2 ? ` (nearest: ${near})` : "";
      tell(`unknown word (found ${shown(value)})`, expects + hint);
      return undefined;
    },
    json: { enum: words },
    expects,
  };
}

export const yesNo: Form<boolean> = {
  read(value, tell) {
    if (typeof value === "boolean") return value;
    tell(`neither true nor false (found ${shown(value)})`, "true or false");
    return undefined;
  },
  json: { type: "boolean" },
  expects: "true or false",
};

export const NAME = /^[A-Za-z0-9][A-Za-z0-9_-]{0,63}$/;

/** A name of this file, written as text. */
export function name(what: string): Form<string> {
  return {
    read(value, tell) {
      if (typeof value === "string" && NAME.test(value)) return value;
      const quotes = typeof value === "number" || typeof value === "boolean" ? ", in quotes" : "";
      tell(`not a name (found ${shown(value)})`, `the name of ${what}${quotes}`);
      return undefined;
    },
    json: { type: "string", pattern: NAME.source },
    expects: `the name of ${what}`,
  };
}

/** Text that is not empty. */
export function text(what: string): Form<string> {
  return {
    read(value, tell) {
      if (typeof value === "string" && value.trim() !== "") return value;
      const quotes = typeof value === "number" || typeof value === "boolean" ? ", in quotes" : "";
      tell(`not a text (found ${shown(value)})`, what + quotes);
      return undefined;
    },
    json: { type: "string", minLength: 1 },
    expects: what,
  };
}

/** A list of so many items. */
export function list<T>(item: Form<T>, least: number, most: number, expects: string): Form<T[]> {
  return {
    read(value, tell) {
      if (!Array.isArray(value) || value.length < least || value.length > most) {
        const what = Array.isArray(value) ? "too few or too many items" : "not a list";
        tell(`${what} (found ${shown(value)})`, expects);
        return undefined;
      }
      const items = value.map((v, i) => item.read(v, at(tell, i)));
      return items.includes(undefined) ? undefined : (items as T[]);
    },
    json: {
      type: "array",
      items: item.json,
      minItems: least,
      ...(most < Number.POSITIVE_INFINITY ? { maxItems: most } : {}),
    },
    expects,
  };
}

/** A value, or `{pick: […]}` or `{each: […]}` of such values (of `item`, where a single one may be more). */
export function choice<T, I = T>(
  form: Form<T>,
  item: Form<I> = form as unknown as Form<I>,
): Form<T | Choice<I>> {
  const items = list(item, 1, Number.POSITIVE_INFINITY, "a list of at least one value");
  const property = (description: string) => ({ ...items.json, description });
  return {
    read(value, tell) {
      if (!isObject(value) || !("pick" in value || "each" in value)) return form.read(value, tell);
      const key = "pick" in value ? "pick" : "each";
      const others = Object.keys(value).filter((k) => k !== key);
      if (others.length > 0) {
        tell(`not a key beside ${key}`, `{${key}: […]} alone`, others[0]);
        return undefined;
      }
      const read = items.read(value[key], at(tell, key));
      return read && ({ [key]: read } as unknown as Choice<I>);
    },
    json: {
      anyOf: [
        ...(Array.isArray(form.json.anyOf) ? form.json.anyOf : [form.json]),
        {
          type: "object",
          properties: {
            pick: property("each take draws one of these"),
            each: property("take n gets the n-th, round and round"),
          },
          minProperties: 1,
          maxProperties: 1,
          additionalProperties: false,
        },
      ],
    },
    expects: `${form.expects}, or {pick: […]} or {each: […]} of such`,
  };
}
