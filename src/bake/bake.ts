/** The one place that runs the line: draw, aim, fly, cut, splice, record. */

import { spliceGlb } from "../gltf/splice.js";
import { RequestError } from "../math/request-error.js";
import type { ClipRecord, PropRecord, TakesRecord } from "../record/clip-record.js";
import { rounded } from "../record/format.js";
import { textSha256 } from "../record/hash.js";
import { VERSION } from "../record/version.js";
import { throwFileError } from "../throwfile/errors.js";
import { type ThrowEntry, type ThrowFile, takeNumbers } from "../throwfile/types.js";
import { clipExtras, clipRecord } from "./clip-record.js";
import { oneNodeGraft } from "./graft.js";
import { nearestFinder } from "./nearest.js";
import { type LoadedProp, loadProps, type ModelSource } from "./props.js";
import { cutTake, solveTake } from "./take.js";

export interface BakedFile {
  /** Name within the output folder. */
  name: string;
  content: Uint8Array;
}

export interface Bake {
  files: BakedFile[];
  record: TakesRecord;
}

export interface BakeOptions {
  /** Names of the throws to bake; default all. */
  only?: readonly string[];
  /** Told after each take. */
  onTake?: (done: number, total: number) => void;
}

/**
 * Bakes a throw file in memory.
 *
 * @param text of the throw file, for its hash
 * @throws ThrowFileError for a throw that cannot be, ModelError for a model that cannot be used
 */
export async function bake(
  file: ThrowFile,
  text: string,
  source: ModelSource,
  options: BakeOptions = {},
): Promise<Bake> {
  const throws = selectThrows(file, options.only);
  const props = await loadProps(file, new Set(throws.map((entry) => entry.prop)), source);
  const total = throws.reduce((sum, entry) => sum + takeNumbers(entry.takes).length, 0);
  let done = 0;
  const baked = throws.map((entry) =>
    bakeThrow(file, entry, props.get(entry.prop) as LoadedProp, () => options.onTake?.(++done, total)),
  );
  return {
    files: baked.map(({ file }) => file),
    record: {
      format: 1,
      tossbake: VERSION,
      throwFile: { name: file.name.replace(/^.*[\\/]/, ""), sha256: await textSha256(text) },
      props: Object.fromEntries(Array.from(props, ([name, loaded]) => [name, propRecord(loaded)])),
      clips: baked.flatMap(({ clips }) => clips),
    },
  };
}

function selectThrows(file: ThrowFile, only?: readonly string[]): ThrowEntry[] {
  for (const name of only ?? [])
    if (!file.throws.has(name))
      throw new RequestError(
        ["--only"],
        `there is no throw "${name}"`,
        `one of ${[...file.throws.keys()].join(", ")}`,
      );
  return [...file.throws.values()].filter((entry) => !only || only.includes(entry.name));
}

function bakeThrow(
  file: ThrowFile,
  entry: ThrowEntry,
  loaded: LoadedProp,
  onTake: () => void,
): { file: BakedFile; clips: ClipRecord[] } {
  const { prop, model } = loaded;
  const name = `${entry.name}.glb`;
  const nearest = nearestFinder(prop.reach);
  try {
    const takes = takeNumbers(entry.takes).map((number) => {
      const take = solveTake(file, entry, prop, number);
      const track = cutTake(file, prop, take);
      const record = clipRecord(file, entry, prop, take, track, nearest(number, take.flight), name);
      onTake();
      return {
        record,
        named: { name: record.name, track, extras: rounded(clipExtras(record, take)) as object },
      };
    });
    const graft = oneNodeGraft(
      prop,
      takes.map(({ named }) => named),
    );
    return { file: { name, content: spliceGlb(model, graft) }, clips: takes.map(({ record }) => record) };
  } catch (error) {
    if (!(error instanceof RequestError)) throw error;
    const path = error.path[0] === "bake" ? error.path : ["throws", entry.name, ...error.path];
    throw throwFileError(file, new RequestError(path, error.fault, error.remedy));
  }
}

export function propRecord({ prop, source, sha256 }: LoadedProp): PropRecord {
  const { mass, volume, centerOfMass, inertia, principal, reach, warnings } = prop;
  return { source, sha256, mass, volume, centerOfMass, inertia, principal, reach, warnings: [...warnings] };
}
