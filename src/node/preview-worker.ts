/** The thread in which the preview bakes, so that its server always answers. */

import { parentPort, workerData } from "node:worker_threads";
import type { PageError } from "../review/page-data.js";
import {
  Abandoned,
  type BakedPreview,
  type OpenedPreview,
  PreviewBaker,
  pageError,
} from "./preview-baker.js";

export interface WorkerSetup {
  /** Of the throw file. */
  path: string;
  /** One number, counted up by whoever no longer wants what was asked before. */
  wanted: Int32Array;
}

export type WorkerRequest = { id: number; turn: number } & ({ open: readonly string[] } | { bake: string });

export type WorkerAnswer = { id: number } & (
  | { done: OpenedPreview | BakedPreview }
  | { error: PageError }
  | { abandoned: true }
);

const { path, wanted } = workerData as WorkerSetup;
const baker = new PreviewBaker(path);

parentPort?.on("message", async (request: WorkerRequest) => {
  const { id, turn } = request;
  try {
    const done =
      "open" in request
        ? await baker.open(request.open)
        : await baker.bake(request.bake, () => Atomics.load(wanted, 0) !== turn);
    answer({ id, done }, "files" in done ? done.files.map(({ content }) => content) : []);
  } catch (error) {
    answer(error instanceof Abandoned ? { id, abandoned: true } : { id, error: pageError(error) });
  }
});

function answer(message: WorkerAnswer, contents: readonly Uint8Array[] = []): void {
  const owned = contents.map(({ buffer }) => buffer as ArrayBuffer);
  parentPort?.postMessage(message, [...new Set(owned)]);
}
