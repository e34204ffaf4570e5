import type { ThrowEntry } from "../../src/throwfile/types.js";

type Parts = { [K in keyof ThrowEntry]?: Partial<ThrowEntry[K]> | ThrowEntry[K] };

/** A throw with the defaults that the parser fills in, and the given keys. */
export function entry(parts: Parts = {}): ThrowEntry {
  return {
    name: "lob",
    prop: "lantern",
    takes: 1,
    vary: "even",
    ...parts,
    release: { point: "centerOfMass", ...parts.release },
    arrive: { ...parts.arrive },
    arc: { branch: "low", ...parts.arc },
    hold: { before: 0, after: 0, ...parts.hold },
  } as ThrowEntry;
}
