import type { BakedThrow } from "./bake.js";

/** What should be known of some takes of a throw. */
export interface TakeWarning {
  throwName: string;
  /** Ascending. */
  takes: number[];
  /** That of the first of them; the others' may differ in its numbers. */
  text: string;
  differs: boolean;
}

/** The warnings of the aim, those that differ in nothing but their numbers once for each throw. */
export function takeWarnings(throws: readonly BakedThrow[]): TakeWarning[] {
  return throws.flatMap(({ entry, takes }) => {
    const found = new Map<string, TakeWarning>();
    for (const { take } of takes)
      for (const text of "warnings" in take.aimed ? take.aimed.warnings : []) {
        const kind = text.replace(/\d+(\.\d+)?(e[-+]\d+)?/g, "#");
        const known = found.get(kind);
        if (!known) found.set(kind, { throwName: entry.name, takes: [take.number], text, differs: false });
        else {
          known.takes.push(take.number);
          known.differs ||= text !== known.text;
        }
      }
    return [...found.values()];
  });
}
