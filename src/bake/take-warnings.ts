import type { BakedTake, BakedThrow } from "./bake.js";

/** What should be known of some takes of a throw. */
export interface TakeWarning {
  throwName: string;
  /** Ascending. */
  takes: number[];
  /** That of the first of them; the others' may differ in its numbers. */
  text: string;
  differs: boolean;
}

/** Points that never part by more than this, m, move the same. */
const SAME = 1e-9;

/** What the aim warns of, and takes that are no other than an earlier one; those that differ in nothing but their numbers once for each throw. */
export function takeWarnings(throws: readonly BakedThrow[]): TakeWarning[] {
  return throws.flatMap(({ entry, takes }) => {
    const found = new Map<string, TakeWarning>();
    for (const baked of takes) {
      const { take } = baked;
      for (const text of textsOf(baked)) {
        const kind = text.replace(/\d+(\.\d+)?(e[-+]\d+)?/g, "#");
        const known = found.get(kind);
        if (!known) found.set(kind, { throwName: entry.name, takes: [take.number], text, differs: false });
        else {
          known.takes.push(take.number);
          known.differs ||= text !== known.text;
        }
      }
    }
    return [...found.values()];
  });
}

const textsOf = ({ take, nearest }: BakedTake): string[] => [
  ...("warnings" in take.aimed ? take.aimed.warnings : []),
  ...(nearest && nearest.distance < SAME
    ? [
        `moves exactly as take ${nearest.take}: leave something open (a..b, scatter, wobble) to tell them apart`,
      ]
    : []),
];
