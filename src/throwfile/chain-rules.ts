/** Whether the throws of a chain can follow one another. */

import { shown } from "./errors.js";
import type { Tell } from "./form.js";
import { nearestHint } from "./nearest.js";
import type { ThrowEntry } from "./types.js";

/** `throws`: those of the file without a fault; `names`: all of them. */
export function checkChain(
  members: readonly string[],
  throws: ReadonlyMap<string, ThrowEntry>,
  names: readonly string[],
  tell: (fault: string, remedy: string | (() => string), ...path: Parameters<Tell>[2][]) => void,
): void {
  const seen = new Set<string>();
  const known = new Set(names);
  const first = throws.get(members[0]);
  for (const [i, name] of members.entries()) {
    const path = ["throws", i];
    if (!known.has(name))
      tell(`no throw has this name (found ${shown(name)})`, () => nearestHint(name, names, "throw"), ...path);
    else if (seen.has(name))
      tell(
        `a circle: this throw twice (found ${shown(name)})`,
        "each throw once; loop: true closes a chain",
        ...path,
      );
    seen.add(name);
    const entry = throws.get(name);
    if (first === undefined || entry === undefined) continue;
    if (entry.prop !== first.prop)
      tell(
        `another prop than the chain's first throw (found ${shown(entry.prop)})`,
        `throws of the prop ${shown(first.prop)} alone`,
        ...path,
      );
    if (!sameTakes(entry.takes, first.takes))
      tell(
        `not the takes of the chain's first throw (found takes: ${shown(entry.takes)} after ${shown(first.takes)})`,
        "the same takes in every throw of a chain",
        ...path,
      );
  }
}

function sameTakes(a: ThrowEntry["takes"], b: ThrowEntry["takes"]): boolean {
  const at = (takes: ThrowEntry["takes"], i: number) => (typeof takes === "number" ? i + 1 : takes[i]);
  const count = (takes: ThrowEntry["takes"]) => (typeof takes === "number" ? takes : takes.length);
  if (count(a) !== count(b)) return false;
  for (let i = 0; i < count(a); i++) if (at(a, i) !== at(b, i)) return false;
  return true;
}
