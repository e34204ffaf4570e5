/** A small throw file, baked in memory. */

import { bake } from "../../src/bake/bake.js";
import type { TakesRecord } from "../../src/record/clip-record.js";
import { type BakedFolder, compareBakes, type Drift, type FolderFile } from "../../src/record/compare.js";
import { formatRecord } from "../../src/record/format.js";
import { recordOf } from "../../src/record/record-of.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import type { ThrowFile } from "../../src/throwfile/types.js";

/** A thole pin, turned about its balance point: where it arrives and how often it turns is what the file says, to the letter. */
export const LOB = `seed: 1
props:
  pin: { shape: { box: [0.02, 0.05, 0.3] }, density: 700 }
throws:
  lob:
    prop: pin
    takes: 3
    release: { at: [0, 1, 0], scatter: 0..5 }
    arrive: { at: [0, 1, 3], after: 1 }
    spin: { axis: short, turns: 1.5 }
`;

export interface BakedLob extends Required<BakedFolder> {
  file: ThrowFile;
  contents: Map<string, Uint8Array>;
}

export async function bakeText(text: string): Promise<BakedLob> {
  const file = parseThrowFile("lob.throws.yaml", text);
  const baked = await bake(file, () => Promise.reject(new Error("no models here")));
  const record = await recordOf(file, text, baked);
  return {
    file,
    record,
    text: formatRecord(record),
    contents: new Map(baked.files.map(({ name, content }) => [name, content])),
  };
}

/** What a folder baked with one text is told when the throw file holds another. */
export async function drift(before: string, now: string): Promise<Drift[]> {
  const [old, fresh] = [await bakeText(before), await bakeText(now)];
  const written = { ...old, record: JSON.parse(old.text) as TakesRecord };
  const files = [...old.contents].flatMap(([name, bytes]): FolderFile[] => {
    const other = fresh.contents.get(name);
    return other ? [{ name, state: Buffer.compare(bytes, other) === 0 ? "same" : "different" }] : [];
  });
  return compareBakes(written, { record: fresh.record }, files, fresh.file.host);
}
