/** Asks the thread that bakes for the preview. */

import { Worker } from "node:worker_threads";
import type { PageError } from "../review/page-data.js";
import type { BakedPreview, OpenedPreview } from "./preview-baker.js";
import type { WorkerAnswer, WorkerRequest, WorkerSetup } from "./preview-worker.js";

/** What came of a request; `abandoned`: nobody wanted it any longer. */
export type Outcome<T> = { done: T } | { error: PageError } | { abandoned: true };

type Question = { open: readonly string[] } | { bake: string };

export class PreviewThread {
  private readonly worker: Worker;
  private readonly wanted = new Int32Array(new SharedArrayBuffer(4));
  private readonly waiting = new Map<number, (answer: WorkerAnswer) => void>();
  private last = 0;

  /**
   * @param script of `preview-worker.ts`
   * @param onFailure told of what nobody foresaw: the thread has ended
   */
  constructor(script: URL, path: string, onFailure: (error: Error) => void) {
    const workerData: WorkerSetup = { path, wanted: this.wanted };
    this.worker = new Worker(script, { workerData });
    this.worker.on("message", (answer: WorkerAnswer) => {
      this.waiting.get(answer.id)?.(answer);
      this.waiting.delete(answer.id);
    });
    this.worker.on("error", onFailure);
  }

  open = (changed: readonly string[]) => this.ask<OpenedPreview>({ open: changed });
  bake = (name: string) => this.ask<BakedPreview>({ bake: name });

  /** What is being baked is not wanted any longer. */
  abandon(): void {
    Atomics.add(this.wanted, 0, 1);
  }

  async close(): Promise<void> {
    await this.worker.terminate();
  }

  private ask<T>(question: Question): Promise<Outcome<T>> {
    const id = ++this.last;
    const request: WorkerRequest = { id, turn: this.wanted[0], ...question };
    return new Promise((settle) => {
      this.waiting.set(id, (answer) => settle(answer as WorkerAnswer & Outcome<T>));
      this.worker.postMessage(request);
    });
  }
}
