/** Small maps with a fixed set of keys. */

import { shown } from "./errors.js";
import { at, type Form, isObject, type Tell } from "./form.js";
import { unknownKey } from "./nearest.js";

type Forms<T> = { [K in keyof T]: Form<T[K]> };

/** A map with all of the keys of `required` and perhaps those of `optional`; `check` compares them once each is right. */
export function fields<T extends object, O extends object = object>(
  required: Forms<T>,
  optional: Forms<O> = {} as Forms<O>,
  check?: (value: T & Partial<O>, tell: Tell) => void,
): Form<T & Partial<O>> {
  const forms = { ...required, ...optional } as Record<string, Form<unknown>>;
  const names = Object.keys(forms);
  const expects = `{${names.map((key) => (key in required ? key : `${key} (if wanted)`)).join(", ")}}`;
  return {
    read(value, tell) {
      if (!isObject(value)) {
        tell(`not a map (found ${shown(value)})`, expects);
        return undefined;
      }
      let wrong = false;
      const fault: Tell = (...args) => {
        wrong = true;
        tell(...args);
      };
      for (const key of Object.keys(value))
        if (!names.includes(key)) fault("unknown key", unknownKey(key, names), key);
      const result: Record<string, unknown> = {};
      for (const key of names)
        if (value[key] !== undefined) result[key] = forms[key].read(value[key], at(fault, key));
        else if (key in required) fault(`${key} is missing`, `needs ${expects}`);
      if (!wrong) check?.(result as T & Partial<O>, fault);
      return wrong ? undefined : (result as T & Partial<O>);
    },
    json: {
      type: "object",
      properties: Object.fromEntries(names.map((key) => [key, forms[key].json])),
      required: Object.keys(required),
      additionalProperties: false,
    },
    expects,
  };
}
