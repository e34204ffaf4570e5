/** takes.json as text, where its values are as they should be. */

import type { TakesRecord } from "./clip-record.js";
import type { BakedFolder } from "./compare.js";
import { formatRecord } from "./format.js";

/**
 * The number of the first line that is not as a bake writes it; undefined where all are. What may differ without drift (version, hash,
 * nearest takes) is taken from the text's own record; line ends do not count.
 */
export function lineThatDiffers({ record, text }: BakedFolder, fresh: TakesRecord): number | undefined {
  if (text === undefined) return undefined;
  const nearest = new Map(record.clips.map((clip) => [clip.name, clip.nearest]));
  const expected = formatRecord({
    ...fresh,
    tossbake: record.tossbake,
    throwFile: record.throwFile,
    clips: fresh.clips.map((clip) => ({ ...clip, nearest: nearest.get(clip.name) ?? null })),
  }).split("\n");
  const lines = text.replace(/\r\n/g, "\n").split("\n");
  const line = expected.findIndex((wanted, i) => lines[i] !== wanted);
  if (line >= 0) return line + 1;
  return lines.length > expected.length ? expected.length : undefined;
}
