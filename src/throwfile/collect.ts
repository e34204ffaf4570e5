/** Faults as they are found, sorted, placed and told once each. */

import type * as z from "zod";
import { type Fault, shown, ThrowFileError } from "./errors.js";
import { isObject } from "./form.js";
import { unknownKey } from "./nearest.js";
import { find, locate, type Node } from "./tree.js";
import type { KeyPath } from "./types.js";

/** A remedy that costs time is a function: only those of faults that are told are asked. */
type Remedy = string | (() => string);

export class Faults {
  private readonly found: { path: KeyPath; fault: string; remedy: Remedy }[] = [];

  readonly tell = (path: KeyPath, fault: string, remedy: Remedy): void => {
    this.found.push({ path, fault, remedy });
  };

  /** Tells what a schema had against the value at `path`; true where the keys are right and only values are wrong. */
  tellIssues(path: KeyPath, value: unknown, schema: z.ZodType, issues: readonly z.core.$ZodIssue[]): boolean {
    for (const issue of issues) {
      const inner = issue.path as (string | number)[];
      const here = [...path, ...inner];
      const found = inner.reduce<unknown>((v, key) => (v as Record<string, unknown>)?.[key], value);
      if (issue.code === "custom") this.tell(here, issue.message, String(issue.params?.remedy));
      else if (issue.code === "unrecognized_keys")
        for (const key of issue.keys)
          this.tell([...here, key], "unknown key", () =>
            unknownKey(key, issue.message.split(" "), homes(schema, key)),
          );
      else if (issue.code === "invalid_type")
        this.tell(here, `not a map (found ${shown(found)})`, knownKeys(issue.message));
      // names are checked by names.ts
      else if (issue.code !== "invalid_key")
        this.tell(here, issue.message, "see the grammar of the throw file");
    }
    return issues.every((issue) => issue.code === "custom");
  }

  /**
   * Throws if there is any fault. `written`: the file before, `root` after everything was inherited; what several throws
   * inherit is told once, at the throw that wrote it.
   *
   * @throws ThrowFileError
   */
  finish(file: string, written: Node, root: Node): void {
    const told = new Map<string, { path: KeyPath; fault: string; remedy: Remedy }>();
    for (const draft of this.found) {
      const { line, column } = locate(root, draft.path);
      const id = `${line}:${column}:${draft.fault}`;
      if (!told.has(id) || (find(written, draft.path) && !find(written, told.get(id)!.path)))
        told.set(id, draft);
    }
    if (told.size === 0) return;
    const drafts = [...told.values()].map((draft) => ({ draft, at: locate(root, draft.path) }));
    drafts.sort((a, b) => a.at.line - b.at.line || a.at.column - b.at.column);
    const faults = drafts.slice(0, 10).map(({ draft, at }): Fault => {
      const remedy = typeof draft.remedy === "string" ? draft.remedy : draft.remedy();
      return { ...at, path: draft.path, fault: draft.fault, remedy };
    });
    throw new ThrowFileError(file, faults, drafts.length - faults.length);
  }
}

/** `message` names the keys, save of a map of names. */
const knownKeys = (message: string) =>
  /^Invalid/.test(message)
    ? "NAME: value"
    : `a map with keys such as ${message.split(" ").slice(0, 4).join(", ")}`;

/** Where within the entry a key that is unknown here is known. */
function homes(schema: z.ZodType, key: string): string[] {
  const shape = shapeOf(schema);
  const inside = Object.entries(shape).filter(([, inner]) => Object.hasOwn(shapeOf(inner), key));
  return [...(Object.hasOwn(shape, key) ? ["the entry itself"] : []), ...inside.map(([name]) => name)];
}

function shapeOf(schema: z.ZodType): Record<string, z.ZodType> {
  let inner = schema as z.ZodType & { unwrap?: () => z.ZodType; shape?: Record<string, z.ZodType> };
  while (inner.unwrap) inner = inner.unwrap() as typeof inner;
  return isObject(inner.shape) ? inner.shape : {};
}
