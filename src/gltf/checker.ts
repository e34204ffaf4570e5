import { ModelError } from "./model.js";

export type JsonObject = Record<string, unknown>;

/** Small checks on parsed JSON that say where a value stands, what it is and what it should be. */
export class Checker {
  constructor(readonly model: string) {}

  refuse(fault: string, hint: string): never {
    throw new ModelError(this.model, fault, hint);
  }

  object(value: unknown, where: string): JsonObject {
    if (typeof value !== "object" || value === null || Array.isArray(value))
      this.refuse(`${where} is ${shown(value)}`, "it must be an object");
    return value as JsonObject;
  }

  array(value: unknown, where: string): unknown[] {
    if (!Array.isArray(value)) this.refuse(`${where} is ${shown(value)}`, "it must be a list");
    return value as unknown[];
  }

  /** The list of objects under a key; none where there is no such key. */
  objects(parent: JsonObject, key: string, where = key): JsonObject[] {
    if (parent[key] === undefined) return [];
    return this.array(parent[key], where).map((item, i) => this.object(item, `${where}[${i}]`));
  }

  string(value: unknown, where: string): string {
    if (typeof value !== "string") this.refuse(`${where} is ${shown(value)}`, "it must be a string");
    return value as string;
  }

  integer(value: unknown, where: string, least: number, greatest = Number.MAX_SAFE_INTEGER): number {
    if (!Number.isSafeInteger(value) || (value as number) < least || (value as number) > greatest)
      this.refuse(
        `${where} is ${shown(value)}`,
        greatest === Number.MAX_SAFE_INTEGER
          ? `it must be a whole number, ${least} or more`
          : `it must be a whole number from ${least} to ${greatest}`,
      );
    return value as number;
  }

  /** An index into a list of `count` things; `undefined` passes where it is `optional`. */
  index(value: unknown, where: string, count: number, what: string, optional?: "optional"): void {
    if (optional && value === undefined) return;
    if (!Number.isSafeInteger(value) || (value as number) < 0 || (value as number) >= count)
      this.refuse(
        `${where} is ${shown(value)}`,
        count === 0
          ? `the model has no ${what}`
          : `it must be the index of one of ${what}, 0 to ${count - 1}`,
      );
  }

  /** A list of indices. */
  indices(value: unknown, where: string, count: number, what: string): number[] {
    const list = this.array(value, where);
    list.forEach((entry, i) => {
      // Lists may be long, and a place is only named where something is wrong.
      if (!Number.isSafeInteger(entry) || (entry as number) < 0 || (entry as number) >= count)
        this.index(entry, `${where}[${i}]`, count, what);
    });
    return list as number[];
  }

  /** `length` finite numbers, or any number of them. */
  numbers(value: unknown, where: string, length?: number): number[] {
    const list = this.array(value, where);
    if (length !== undefined && list.length !== length)
      this.refuse(`${where} has ${list.length} entries`, `it must have ${length}`);
    list.forEach((entry, i) => {
      if (!Number.isFinite(entry))
        this.refuse(`${where}[${i}] is ${shown(entry)}`, "it must be a finite number");
    });
    return list as number[];
  }
}

/** A value as a message shows it: short, and never run as code by being turned into text. */
export function shown(value: unknown): string {
  if (value === undefined) return "missing";
  if (typeof value === "number") return String(value);
  if (Array.isArray(value)) return "a list";
  if (typeof value === "object" && value !== null) return "an object";
  const text = JSON.stringify(value);
  return text.length > 40 ? `${text.slice(0, 40)}…` : text;
}
