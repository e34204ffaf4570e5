/** Threads that share the work of a batch. */

import { existsSync } from "node:fs";
import { availableParallelism } from "node:os";
import { fileURLToPath } from "node:url";
import { Piscina } from "piscina";
import type { Outcome } from "./bake-worker.js";
import { revived } from "./carried-error.js";
import type { BatchContext, Work, Worker } from "./work.js";

/** So few takes are baked sooner than a thread has started and weighed its props. */
const WORTH_A_THREAD = 40;

export interface Workers {
  /** Does a piece of work as soon as a thread is free, in the order in which they are asked for. */
  run: (work: Work) => Promise<Awaited<ReturnType<Worker>>>;
  /** Stops at once whatever is being done. */
  end: () => Promise<void>;
}

/**
 * @param own makes a worker of this very thread
 * @param jobs threads asked for; without, as many as there are cores and as the takes are worth
 * @param isStopped asked between takes, where this very thread does the work
 * @param onNote told where fewer threads do it than were asked for
 */
export function workersOf(
  context: BatchContext,
  { jobs, takes, pieces }: { jobs?: number; takes: number; pieces: number },
  own: () => Worker,
  isStopped: () => boolean,
  onNote: (text: string) => void = () => undefined,
): Workers {
  const wanted = jobs ?? Math.min(availableParallelism(), Math.floor(takes / WORTH_A_THREAD));
  const threads = Math.min(wanted, pieces);
  if (threads > 1 && existsSync(SCRIPT)) return pool(context, threads);
  if (threads > 1 && jobs !== undefined)
    onNote(`one thread does the work: ${SCRIPT} is not there to be run by more`);
  return thisThread(own(), isStopped);
}

/** By way of the rooms' common folder: right where all is bundled into a file of `cli` too. Run from its sources the program has no such file, and one thread. */
const SCRIPT = fileURLToPath(new URL("../node/bake-worker.js", import.meta.url));

function pool(context: BatchContext, threads: number): Workers {
  const piscina = new Piscina({
    filename: SCRIPT,
    workerData: context,
    minThreads: threads,
    maxThreads: threads,
    // a stopped program says so itself
    trackUnmanagedFds: false,
  });
  return {
    async run(work) {
      const outcome: Outcome = await piscina.run(work);
      if ("part" in outcome) return outcome.part;
      throw revived(outcome.fault as NonNullable<typeof outcome.fault>);
    },
    end: () => piscina.destroy(),
  };
}

/** One piece after the other. */
function thisThread(work: Worker, isStopped: () => boolean): Workers {
  let last: Promise<unknown> = Promise.resolve();
  let ended = false;
  return {
    run(piece) {
      const turn = last.then(() => (ended ? undefined : work(piece, () => ended || isStopped())));
      last = turn.catch(() => undefined);
      return turn;
    },
    async end() {
      ended = true;
      await last;
    },
  };
}
