/** Trees of maps and lists, such as JSON, changed in a place or several. */

import type { Chance } from "./chance.js";
import { anyValue, otherNumber } from "./values.js";

type Holder = Record<string, unknown>;

interface Place {
  holder: Holder;
  key: string;
}

/** Changes the tree in place. `harsh` is the share of changes that put something in the wrong place or take it away. */
export function mutateTree(root: unknown, chance: Chance, harsh = 0.5): void {
  for (let count = chance.few(4); count > 0; count--) {
    const places = placesOf(root);
    if (places.length === 0) return;
    change(chance.pick(places), places, chance, harsh);
  }
}

function placesOf(root: unknown): Place[] {
  const places: Place[] = [];
  const walk = (value: unknown) => {
    if (typeof value !== "object" || value === null) return;
    for (const key of Object.keys(value)) {
      places.push({ holder: value as Holder, key });
      walk((value as Holder)[key]);
    }
  };
  walk(root);
  return places;
}

function change({ holder, key }: Place, places: readonly Place[], chance: Chance, harsh: number): void {
  const value = holder[key];
  if (chance.part() > harsh) {
    mild({ holder, key }, places, chance);
    return;
  }
  const other = chance.pick(places);
  const copy = structuredClone(other.holder[other.key]);
  const way = chance.below(8);
  if (way === 0) remove(holder, key);
  else if (way === 1) put(holder, key, copy);
  else if (way === 2) {
    put(other.holder, other.key, structuredClone(value));
    put(holder, key, copy);
  } else if (way === 3) put(holder, other.key, copy);
  else if (way === 4) put(holder, key, [value, structuredClone(value)]);
  else if (way === 5) put(holder, key, { [other.key]: value });
  else if (way === 6 && Array.isArray(holder)) holder.splice(chance.below(holder.length + 1), 0, copy);
  else put(holder, key, anyValue(chance));
}

/** What may well be right still: other numbers, or what stands elsewhere under the same key. */
function mild({ holder, key }: Place, places: readonly Place[], chance: Chance): void {
  const value = holder[key];
  const alike = places.filter((place) => place.key === key && place.holder !== holder);
  if (typeof value === "number") put(holder, key, spread(chance, value));
  else if (alike.length > 0) {
    const from = chance.pick(alike);
    put(holder, key, structuredClone(from.holder[from.key]));
  } else if (typeof value === "boolean") put(holder, key, !value);
  else if (!Array.isArray(holder) && chance.below(3) === 0) remove(holder, key);
}

function spread(chance: Chance, value: number): unknown {
  const [a, b] = [otherNumber(chance, value), otherNumber(chance, value)];
  const way = chance.below(12);
  if (way === 0) return `${Math.min(a, b)}..${Math.max(a, b)}`;
  if (way === 1) return `${a} ± ${Math.abs(b)}`;
  if (way === 2) return { pick: [a, b] };
  if (way === 3) return { each: [a, b, value] };
  return a;
}

function remove(holder: Holder, key: string): void {
  if (Array.isArray(holder)) holder.splice(Number(key), 1);
  else delete holder[key];
}

/** Also `__proto__`, as a key like any other. */
function put(holder: Holder, key: string, value: unknown): void {
  Object.defineProperty(holder, key, { value, writable: true, enumerable: true, configurable: true });
}
