/** A throw file that is being worked on: baked throw by throw as it changes; what is wrong leaves the old motion standing. */

import { basename, resolve } from "node:path";
import { emptyPage, type PageData, type PageError, type PageThrow } from "../review/page-data.js";
import { Pause } from "./pause.js";
import type { BakedPreview, OpenedPreview } from "./preview-baker.js";
import type { PreviewSource } from "./preview-source.js";
import { PreviewThread } from "./preview-thread.js";
import { watchFiles } from "./watch.js";

interface Baked {
  shown: PageThrow;
  files: BakedPreview["files"];
}

/** Among errors: that of the throw file as a whole. */
const WHOLE = "";

export class ThrowFilePreview implements PreviewSource {
  readonly title: string;
  private readonly thread: PreviewThread;
  private readonly watch = watchFiles((paths) => this.reopen(paths));
  private readonly listeners: (() => void)[] = [];

  private opened?: OpenedPreview;
  /** Once it was tried to open the throw file for the first time. */
  private readonly isOpened: Promise<void>;
  private props: PageData["props"] = {};
  private readonly baked = new Map<string, Baked>();
  private readonly errors = new Map<string, PageError>();
  /** Throws that could not be baked since the file was opened. */
  private readonly failed = new Set<string>();
  /** Paths that have changed since it was opened; the file has to be opened. */
  private changed?: string[];
  private looking?: string;
  private isRunning = false;
  private readonly pause = new Pause();

  /**
   * Starts to bake and to watch.
   *
   * @param script of `preview-worker.ts`
   * @param onError told of each error in the throw file and its models
   * @param onFailure told of what nobody foresaw; the preview is at its end then
   */
  constructor(
    path: string,
    script: URL,
    private readonly onError: (error: PageError) => void,
    private readonly onFailure: (error: unknown) => void,
  ) {
    this.title = basename(path);
    this.thread = new PreviewThread(script, path, onFailure);
    this.watch.setPaths([resolve(path)]);
    this.isOpened = new Promise((done) => this.listeners.push(done));
    this.reopen([]);
  }

  async data(looking?: string): Promise<PageData> {
    if (looking !== undefined) this.looking = looking;
    this.pause.wake();
    await this.isOpened;
    const head = this.opened?.head ?? emptyPage(this.title);
    const [error] = this.errors.values();
    return {
      ...head,
      ...(error && { error }),
      props: this.props,
      throws: head.throws.map((shown) => this.baked.get(shown.name)?.shown ?? shown),
    };
  }

  async file(name: string): Promise<Uint8Array | undefined> {
    for (const { files } of this.baked.values())
      for (const file of files) if (file.name === name) return file.content;
    return undefined;
  }

  onChange(listener: () => void): void {
    this.listeners.push(listener);
  }

  opening(): void {
    this.pause.begin();
  }

  drawn(): void {
    this.pause.end();
  }

  async close(): Promise<void> {
    this.watch.close();
    this.pause.end();
    await this.thread.close();
  }

  private reopen(paths: readonly string[]): void {
    this.changed = [...(this.changed ?? []), ...paths];
    this.thread.abandon();
    this.pause.wake();
    if (!this.isRunning) this.run().catch(this.onFailure);
  }

  /** Opens and bakes until nothing is left to do. */
  private async run(): Promise<void> {
    this.isRunning = true;
    for (;;) {
      const next = this.nextThrow();
      if (this.changed) await this.open(this.changed);
      else if (next === undefined) break;
      else if (this.canWait(next)) {
        await this.pause.wait();
        continue;
      } else await this.bake(next);
      for (const listener of this.listeners) listener();
    }
    this.isRunning = false;
  }

  private async open(changed: readonly string[]): Promise<void> {
    this.changed = undefined;
    const outcome = await this.thread.open(changed);
    if ("error" in outcome) this.tell(WHOLE, outcome.error);
    if (!("done" in outcome)) return;
    this.opened = outcome.done;
    this.watch.setPaths(this.opened.inputs);
    this.failed.clear();
    this.forget();
  }

  private async bake(name: string): Promise<void> {
    const outcome = await this.thread.bake(name);
    if ("error" in outcome) {
      this.failed.add(name);
      this.tell(name, outcome.error);
    }
    if (!("done" in outcome)) return;
    const { shown, files, props } = outcome.done;
    this.errors.delete(name);
    this.props = { ...this.props, ...props };
    this.baked.set(name, { shown: { ...shown, stamp: this.stampOf(name) }, files });
  }

  /** A page that is being opened shows another one first. */
  private canWait(name: string): boolean {
    return this.pause.isOn && this.baked.size > 0 && name !== this.looking;
  }

  /** What is looked at first, then in the file's order. */
  private nextThrow(): string | undefined {
    const names = this.opened?.head.throws.map((shown) => shown.name) ?? [];
    const first = names.filter((name) => name === this.looking);
    return [...first, ...names].find((name) => this.isDue(name) && !this.failed.has(name));
  }

  /** The file has it, and it is not baked as the file has it. */
  private isDue(name: string): boolean {
    const stamp = this.stampOf(name);
    return stamp !== undefined && this.baked.get(name)?.shown.stamp !== stamp;
  }

  private stampOf = (name: string): string | undefined => this.opened?.stamps[name];

  private tell(about: string, error: PageError): void {
    if (this.errors.get(about)?.message !== error.message) this.onError(error);
    this.errors.set(about, error);
  }

  /** What the file as it is now no longer has, and errors of what is again as it was. */
  private forget(): void {
    for (const name of this.baked.keys()) if (this.stampOf(name) === undefined) this.baked.delete(name);
    for (const name of this.errors.keys()) if (!this.isDue(name)) this.errors.delete(name);
  }
}
