/** Forms of a few single keys. */

import { shown } from "./errors.js";
import type { Form } from "./form.js";
import { number, spreadNumber } from "./numbers.js";
import type { DrawableNumber } from "./types.js";

/** `seed`: 7 and "7" are the same seed. */
export const seed: Form<string> = {
  read(value, tell) {
    if (typeof value === "string") return value;
    if (typeof value === "number" && Number.isSafeInteger(value)) return String(value);
    tell(
      `neither text nor a whole number (found ${shown(value)})`,
      "text, or a whole number of at most 15 digits",
    );
    return undefined;
  },
  json: { anyOf: [{ type: "string" }, { type: "integer" }] },
  expects: "text or a whole number",
};

const MOST_TAKES = 1_000_000;

/** `takes`: a count, or numbers; comes out ascending. */
export const takes: Form<number | number[]> = (() => {
  const rule = { whole: true, min: 1, max: MOST_TAKES };
  const count = number(rule);
  const expects = "how many, a whole number from 1 to 1000000, or a list of such numbers, such as [3, 7, 19]";
  return {
    read(value, tell) {
      if (typeof value === "number") return count.read(value, tell);
      if (!Array.isArray(value) || value.length === 0) {
        tell(`not a count (found ${shown(value)})`, expects);
        return undefined;
      }
      const seen = new Map<unknown, number>();
      let wrong = false;
      for (const [i, take] of value.entries()) {
        const read = count.read(take, (fault, remedy) => tell(fault, remedy, i));
        if (read !== undefined && seen.has(read)) tell(`take ${read} twice`, "each number once", i);
        if (read === undefined || seen.has(read)) wrong = true;
        seen.set(read, i);
      }
      return wrong ? undefined : (value as number[]).slice().sort((a, b) => a - b);
    },
    json: { anyOf: [count.json, { type: "array", items: count.json, minItems: 1, uniqueItems: true }] },
    expects,
  };
})();

/** A throw's own `gravity`. */
export const gravity: Form<DrawableNumber | "free"> = (() => {
  const form = spreadNumber({ min: 0, unit: "m/s²" });
  const expects = `${form.expects}, or free`;
  return {
    read: (value, tell) =>
      value === "free" ? value : form.read(value, (fault, _, ...path) => tell(fault, expects, ...path)),
    json: { anyOf: [...(form.json.anyOf as unknown[]), { const: "free" }] },
    expects,
  };
})();
