/** What the rules about keys that go together see of a throw: keys present and values as written. */

import { isObject } from "./form.js";

export interface Rules {
  /** Whether the key, dots between, is there. */
  has(key: string): boolean;
  value(key: string): unknown;
  /** Tells at a key ("" is the throw). */
  tell(key: string, fault: string, remedy: string): void;
  /** Tells at the one of the keys that the throw itself wrote last. */
  tellLatest(keys: readonly string[], fault: string, remedy: string): void;
  /** Whether both keys are there, which is told: one has to go. */
  together(keys: readonly [string, string], why?: string): boolean;
}

export function rulesOf(
  entry: unknown,
  tell: Rules["tell"],
  latest: (keys: readonly string[]) => string,
): Rules {
  const value = (key: string) =>
    key.split(".").reduce<unknown>((v, k) => (isObject(v) && Object.hasOwn(v, k) ? v[k] : undefined), entry);
  const has = (key: string) => value(key) !== undefined;
  const tellLatest: Rules["tellLatest"] = (keys, fault, remedy) =>
    tell(latest(keys.filter(has)), fault, remedy);
  return {
    has,
    value,
    tell,
    tellLatest,
    together([a, b], why = "they exclude each other") {
      if (!has(a) || !has(b)) return false;
      tellLatest([a, b], `${why} (found ${a} and ${b})`, `drop ${a} or ${b}`);
      return true;
    },
  };
}
