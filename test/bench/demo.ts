/** The demo's throw file and its props; the benchmark runs in the package's folder. */

import { type LoadedProp, loadProps } from "../../src/bake/props.js";
import { openThrowFile } from "../../src/node/throw-file.js";
import type { ThrowEntry, ThrowFile } from "../../src/throwfile/types.js";

export async function openDemo() {
  const opened = await openThrowFile("assets/quay.throws.yaml");
  const props = await loadProps(opened.file, new Set(opened.file.props.keys()), opened.models);
  return {
    ...opened,
    throwOf(name: string): { entry: ThrowEntry; loaded: LoadedProp } {
      const entry = opened.file.throws.get(name) as ThrowEntry;
      return { entry, loaded: props.get(entry.prop) as LoadedProp };
    },
  };
}

/** The file with one throw alone, changed; nothing that was remembered of it before is known of the copy. */
export const withThrow = (file: ThrowFile, entry: ThrowEntry, changes: Partial<ThrowEntry>): ThrowFile => ({
  ...file,
  throws: new Map([[entry.name, { ...entry, ...changes }]]),
});
