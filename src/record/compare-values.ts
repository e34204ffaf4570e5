/** Which values of two records differ. */

export interface Change {
  /** Keys joined by dots, e.g. "arrival.velocity". */
  key: string;
  /** Absent where the record has no such key. */
  before?: unknown;
  now?: unknown;
}

/** The leaves that differ; lists are leaves. Keys in `now`'s order, then those that are gone. */
export function changes(before: unknown, now: unknown, passedOver: readonly string[] = []): Change[] {
  const old = leaves(before);
  const fresh = leaves(now);
  return [...new Set([...fresh.keys(), ...old.keys()])]
    .filter((key) => !passedOver.some((name) => key === name || key.startsWith(`${name}.`)))
    .filter((key) => JSON.stringify(old.get(key)) !== JSON.stringify(fresh.get(key)))
    .map((key) => ({
      key,
      ...(old.has(key) && { before: old.get(key) }),
      ...(fresh.has(key) && { now: fresh.get(key) }),
    }));
}

function leaves(value: unknown, key = "", found = new Map<string, unknown>()): Map<string, unknown> {
  if (value === null || typeof value !== "object" || Array.isArray(value)) found.set(key, value);
  else
    for (const [name, inner] of Object.entries(value))
      leaves(inner, key === "" ? name : `${key}.${name}`, found);
  return found;
}
