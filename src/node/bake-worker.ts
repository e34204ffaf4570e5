/** What a thread of a batch runs. */

import { workerData } from "node:worker_threads";
import { carried } from "./carried-error.js";
import type { Part } from "./staging.js";
import { type BatchContext, type Work, workerOf } from "./work.js";

/** The pool hands over what it was given beside its own. */
const work = workerOf(workerData as BatchContext);

export type Outcome = { part: Part | undefined } | { fault: ReturnType<typeof carried> };

export default async function run(task: Work): Promise<Outcome> {
  try {
    return { part: await work(task) };
  } catch (error) {
    const fault = carried(error);
    if (!fault) throw error;
    return { fault };
  }
}
