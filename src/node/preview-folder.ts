/** A folder that was baked into, shown as it is: nothing is baked, and its files are read when they are asked for. */

import { basename, join, resolve } from "node:path";
import { textSha256 } from "../math/hash.js";
import { RequestError } from "../math/request-error.js";
import { length as size } from "../math/vec3.js";
import type { ClipRecord } from "../record/clip-record.js";
import { binOf } from "../record/compare-files.js";
import { fallsOtherwise, gravity } from "../record/compare-host.js";
import type { PageData, PageError } from "../review/page-data.js";
import { pageOfRecord } from "../review/page-of-record.js";
import { readBakedFolder } from "./baked-folder.js";
import { readPlainGlb } from "./plain-glb.js";
import { pageError } from "./preview-baker.js";
import type { PreviewSource } from "./preview-source.js";
import { watchFiles } from "./watch.js";

/**
 * What the page shows of the folder.
 *
 * @throws RequestError for a folder that was not baked into, or with a host
 */
export async function readPageData(folder: string): Promise<PageData> {
  const { record } = await readBakedFolder(folder);
  const clip = fallsOtherwise(record.clips);
  if (clip)
    throw new RequestError(
      [join(folder, "takes.json")],
      `${clip.name} does not fall along -Y: the numbers are those of a host`,
      "name the throw file instead of the folder",
    );
  const scaled = record.clips.find(inHostUnit);
  if (scaled)
    throw new RequestError(
      [join(folder, "takes.json")],
      `${scaled.name} falls at ${Number(size(gravity(scaled)).toPrecision(6))} a second squared: the numbers are in a host's unit`,
      "name the throw file instead of the folder",
    );
  const data = pageOfRecord(basename(resolve(folder)), record);
  const stamp = await textSha256(JSON.stringify(record));
  return { ...data, throws: data.throws.map((shown) => ({ ...shown, stamp })) };
}

/** m: centimetre, millimetre, decimetre, inch, foot, kilometre. */
const UNITS = [0.01, 0.001, 0.1, 0.0254, 0.3048, 1000];
/** m/s² (CGPM 1901) */
const STANDARD_GRAVITY = 9.80665;

/** The world's own gravity, in another unit than the metre: a record does not name its host, and any other gravity may be meant. */
const inHostUnit = (clip: ClipRecord): boolean =>
  UNITS.some((unit) => Math.abs((size(gravity(clip)) * unit) / STANDARD_GRAVITY - 1) < 1e-6);

/** Names of the files that the data speak of, each once; a record that was tampered with may name one elsewhere. */
export const filesOf = ({ throws }: PageData): string[] => [
  ...new Set(
    throws.flatMap(({ takes }) => takes.map(({ file }) => file)).filter((name) => basename(name) === name),
  ),
];

export class FolderPreview implements PreviewSource {
  readonly title: string;
  private readonly listeners: (() => void)[] = [];
  private readonly watch = watchFiles(() => void this.reread());
  private changes = 0;
  private error?: PageError;

  private constructor(
    private readonly folder: string,
    private shown: PageData,
  ) {
    this.title = shown.title;
    this.watchAll();
  }

  /** @throws as `readPageData` does */
  static async open(folder: string): Promise<FolderPreview> {
    return new FolderPreview(folder, await readPageData(folder));
  }

  async data(): Promise<PageData> {
    const throws = this.shown.throws.map((shown) => ({ ...shown, stamp: `${shown.stamp} ${this.changes}` }));
    return { ...this.shown, throws, ...(this.error && { error: this.error }) };
  }

  async file(name: string): Promise<Uint8Array | undefined> {
    return filesOf(this.shown).includes(name) ? readPlainGlb(this.folder, name) : undefined;
  }

  onChange(listener: () => void): void {
    this.listeners.push(listener);
  }

  async close(): Promise<void> {
    this.watch.close();
  }

  private watchAll(): void {
    const files = filesOf(this.shown);
    const all = ["takes.json", ...files, ...files.flatMap((name) => binOf(name) ?? [])];
    this.watch.setPaths(all.map((name) => resolve(this.folder, name)));
  }

  private async reread(): Promise<void> {
    this.changes++;
    try {
      this.shown = await readPageData(this.folder);
      this.error = undefined;
      this.watchAll();
    } catch (error) {
      this.error = pageError(error);
    }
    for (const listener of this.listeners) listener();
  }
}
