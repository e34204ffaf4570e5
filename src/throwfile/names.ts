/** Names of props, throws, points and chains. */

import { pathText } from "./errors.js";
import { RESERVED_POINTS } from "./facing.js";
import { NAME } from "./form.js";
import { find, type Node } from "./tree.js";
import type { KeyPath } from "./types.js";

/** Files of these names cannot be made on some systems (Microsoft Learn, "Naming Files, Paths, and Namespaces"). */
const DEVICE = /^(con|prn|aux|nul|com\d|lpt\d)$/i;

/** Each throw and chain has a sheet of its own name, and all takes together have this one. */
const ALL_TAKES = "takes";

/** Tells of every name that cannot be; throws and chains share one space, names differ by more than their case. */
export function checkNames(root: Node, tell: (path: KeyPath, fault: string, remedy: string) => void): void {
  const check = (paths: KeyPath[], what: string, reserved: readonly string[] = [], meaning = "") => {
    const seen = new Map<string, KeyPath>();
    for (const path of paths) {
      const node = find(root, path);
      if (node?.kind !== "map") continue;
      for (const name of node.entries.keys()) {
        const here = [...path, name];
        const lower = name.toLowerCase();
        const twin = seen.get(lower);
        if (!NAME.test(name))
          tell(
            here,
            `not a name for ${what}`,
            "1 to 64 letters A to Z, digits, - and _, beginning with a letter or digit",
          );
        else if (DEVICE.test(name)) tell(here, "the name of a device on some systems", "another name");
        else if (reserved.includes(lower)) tell(here, meaning, "another name");
        else if (twin !== undefined)
          tell(here, `the same name twice, but for its case (found ${pathText(twin)} too)`, "another name");
        else seen.set(lower, here);
      }
    }
  };
  check([["props"]], "a prop");
  check(
    [["throws"], ["chains"]],
    "a throw or chain",
    [ALL_TAKES],
    "the name of the sheet of all takes, takes.svg",
  );
  const props = find(root, ["props"]);
  if (props?.kind === "map")
    for (const prop of props.entries.keys())
      check(
        [["props", prop, "points"]],
        "a point",
        RESERVED_POINTS,
        "a word that already means a direction or a place",
      );
}
