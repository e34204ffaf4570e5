/** One changed throw file, read and baked in memory; what must not come of it is thrown. */

import { join } from "node:path";
import { bake } from "../../src/bake/bake.js";
import type { ModelSource } from "../../src/bake/props.js";
import { readModel } from "../../src/gltf/read.js";
import { RequestError } from "../../src/math/request-error.js";
import { readModelFile } from "../../src/node/model-files.js";
import { formatRecord } from "../../src/record/format.js";
import { recordOf } from "../../src/record/record-of.js";
import { ThrowFileError } from "../../src/throwfile/errors.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { type ThrowEntry, type ThrowFile, takeNumbers } from "../../src/throwfile/types.js";
import { assets } from "../cli/folder.js";
import { LEFT_OUT } from "./cases.js";
import { Chance } from "./chance.js";
import { mutateText } from "./texts.js";
import { anyThrowFile, THROW_FILES } from "./throw-files.js";

/** Of a throw, and throws of a file: enough to run every stretch of the line. */
const MOST_TAKES = 1;
const MOST_THROWS = 3;

/** FILE:LINE:COLUMN KEY.PATH: what is wrong; what would be right. Keys that could be misread are in quotes. */
const FAULT = /^hostile\.yaml:\d+:\d+( ([\w<>-]+|"(\\.|[^"\\])*")(\.([\w<>-]+|"(\\.|[^"\\])*"))*)?: .+; .+$/;

const UNTOLD = /undefined|\[object|NaN/;

export function throwText(number: number): string {
  const chance = new Chance(1, number);
  return mutateText(anyThrowFile(chance), THROW_FILES, chance);
}

export async function throwCase(text: string): Promise<string> {
  let file: ThrowFile;
  try {
    file = capped(parseThrowFile("hostile.yaml", text));
  } catch (error) {
    checkTold(error);
    return "refused when read";
  }
  try {
    const names = [...file.chains.keys(), ...file.throws.keys()].slice(0, MOST_THROWS);
    const baked = await bake(file, models, file.bake.files === "together" ? {} : { only: names });
    const record = formatRecord(await recordOf(file, text, baked));
    JSON.parse(record);
    if (UNTOLD.test(record)) throw new Error(`the record holds ${UNTOLD.exec(record)![0]}`);
    for (const { name, content } of baked.files) if (name.endsWith(".glb")) await readModel(name, content);
    return baked.unheld.length > 0 ? LEFT_OUT : "baked";
  } catch (error) {
    checkTold(error);
    return "refused when baked";
  }
}

/** The same file with few takes of each throw. */
function capped(file: ThrowFile): ThrowFile {
  const few = (entry: ThrowEntry) => ({ ...entry, takes: takeNumbers(entry.takes).slice(0, MOST_TAKES) });
  return { ...file, throws: new Map(Array.from(file.throws, ([name, entry]) => [name, few(entry)])) };
}

const read = new Map<string, ReturnType<ModelSource>>();

const models: ModelSource = (path) => {
  const there = read.get(path) ?? readModelFile(join(assets("."), path), path);
  read.set(path, there);
  return there;
};

/** Throws an error that is none of the request's, and one whose words are not as they should be. */
export function checkTold(error: unknown): void {
  if (!(error instanceof ThrowFileError || error instanceof RequestError)) throw error;
  const lines = error.message.split("\n");
  if (UNTOLD.test(error.message) || lines.length > 11) throw new Error(`told badly: ${error.message}`);
  if (!(error instanceof ThrowFileError)) return;
  if (/^and \d+ more$/.test(lines.at(-1)!)) lines.pop();
  const bad = lines.find((line) => !FAULT.test(line));
  if (bad !== undefined) throw new Error(`told badly: ${bad}`);
}
