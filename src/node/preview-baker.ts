/** Bakes a throw file for the page throw by throw, each only when what it is made of has changed. */

import { dirname, resolve } from "node:path";
import { bake } from "../bake/bake.js";
import type { ModelSource } from "../bake/props.js";
import { ModelError } from "../gltf/model.js";
import { textSha256 } from "../math/hash.js";
import { RequestError } from "../math/request-error.js";
import { recordOf } from "../record/record-of.js";
import { VERSION } from "../record/version.js";
import {
  type PageData,
  type PageError,
  type PageThrow,
  pageHead,
  pageProps,
  pageThrows,
  shownFile,
} from "../review/page-data.js";
import { ThrowFileError } from "../throwfile/errors.js";
import type { ChainEntry, ThrowEntry, ThrowFile } from "../throwfile/types.js";
import type { ModelFile } from "./model-files.js";
import { plainGlb } from "./plain-glb.js";
import { type OpenedThrowFile, openThrowFile } from "./throw-file.js";

/** A throw file as it is now. */
export interface OpenedPreview {
  head: PageData;
  /** By the names of throws and chains, in the file's order: what each is made of. */
  stamps: Record<string, string>;
  /** Absolute paths of all files that it is made of, also of those that are not there. */
  inputs: string[];
}

/** A throw or chain, baked. */
export interface BakedPreview {
  props: PageData["props"];
  shown: PageThrow;
  files: { name: string; content: Uint8Array }[];
}

/** Somebody no longer wants what is being baked. */
export class Abandoned extends Error {
  override name = "Abandoned";
}

export class PreviewBaker {
  private opened?: OpenedThrowFile;
  private readonly models = new Map<string, ModelFile>();

  constructor(private readonly path: string) {}

  /**
   * @param changed absolute paths of files that are no longer as they were
   * @throws ThrowFileError, RequestError as `openThrowFile` does
   */
  async open(changed: readonly string[]): Promise<OpenedPreview> {
    for (const [name, { paths }] of this.models)
      if (paths.some((path) => changed.includes(path))) this.models.delete(name);
    const opened = await openThrowFile(this.path);
    this.opened = opened;
    const { file } = opened;
    const sums = new Map<string, string>();
    for (const [name, { model }] of file.props)
      sums.set(name, model === undefined ? "" : await this.sumOf(model));
    const stamps: [string, string][] = [];
    for (const entry of [...file.throws.values(), ...file.chains.values()])
      stamps.push([entry.name, await stampOf(file, entry, sums)]);
    return { head: pageHead(file), stamps: Object.fromEntries(stamps), inputs: this.inputs(file) };
  }

  /**
   * @param isStale asked after each take
   * @throws ThrowFileError for what cannot be baked, Abandoned once it is stale
   */
  async bake(name: string, isStale: () => boolean): Promise<BakedPreview> {
    const { file, text } = this.opened as OpenedThrowFile;
    const onTake = () => {
      if (isStale()) throw new Abandoned(name);
    };
    const asShown = shownFile(file);
    const baked = await bake(asShown, this.source, { only: [name], onTake });
    const [shown] = pageThrows(file, baked, await recordOf(asShown, text, baked));
    const files: BakedPreview["files"] = [];
    for (const each of baked.files) files.push({ name: each.name, content: await plainGlb(each.content) });
    return { props: pageProps(baked), shown, files };
  }

  private readonly source: ModelSource = async (model) => {
    const known = this.models.get(model);
    if (known) return known;
    const read = (await this.opened?.models(model)) as ModelFile;
    this.models.set(model, read);
    return read;
  };

  /** A model that cannot be read is told of when a throw of it is baked. */
  private async sumOf(model: string): Promise<string> {
    try {
      return (await this.source(model)).sha256;
    } catch (error) {
      if (error instanceof ModelError) return error.message;
      throw error;
    }
  }

  private inputs(file: ThrowFile): string[] {
    const named = [...file.props.values()].flatMap(({ model }) =>
      model === undefined ? [] : [resolve(dirname(this.path), model)],
    );
    const read = [...this.models.values()].flatMap(({ paths }) => paths);
    return [...new Set([resolve(this.path), ...named, ...read])];
  }
}

function stampOf(
  file: ThrowFile,
  entry: ThrowEntry | ChainEntry,
  sums: ReadonlyMap<string, string>,
): Promise<string> {
  const { seed, gravity, frameRate, host, bake } = file;
  const members = "throws" in entry ? entry.throws.map((name) => file.throws.get(name)) : [entry];
  const prop = (members[0] as ThrowEntry).prop;
  const made = [
    VERSION,
    seed,
    gravity,
    frameRate,
    host,
    bake,
    entry,
    members,
    file.props.get(prop),
    sums.get(prop),
  ];
  return textSha256(JSON.stringify(made));
}

/** What the page shows of an error that a person can mend; any other is thrown on. */
export function pageError(error: unknown): PageError {
  if (error instanceof ThrowFileError) {
    const [{ line, column }] = error.faults;
    return { message: error.message, line, column };
  }
  if (error instanceof RequestError || error instanceof ModelError) return { message: error.message };
  throw error;
}
