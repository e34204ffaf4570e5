/** Cases run one after the other, each measured by the time that the processor spent on it, which other programs do not lengthen. */

import { Worker } from "node:worker_threads";

/** s of the processor's time. */
const MOST_SECONDS = 5;
/** A take that no draw can hold within its limits is drawn a thousand times, as the README says, before it is left out: that may last, and is no hang. */
const MOST_WHERE_LEFT_OUT = 150;
export const LEFT_OUT = "with takes left out";

/** Whether the long version is asked for. */
export const SOAK = process.env.SOAK === "1";

export interface Tally {
  /** Cases by what came of them. */
  counts: Record<string, number>;
  /** What must not be, by the case's number. */
  faults: string[];
  /** Of the processor, s, and the case. */
  slowest: [number, number];
}

/**
 * @param run answers what came of a case, in a word, or throws what must not be
 * @param first number of the first case
 * @param mostSeconds of the processor, of a case of which no take is left out
 */
export async function runCases(
  count: number,
  run: (number: number) => Promise<string>,
  first = 0,
  mostSeconds = MOST_SECONDS,
): Promise<Tally> {
  const tally: Tally = { counts: {}, faults: [], slowest: [0, -1] };
  const watch = new Watch();
  try {
    for (let number = first; number < first + count; number++) {
      watch.begin(number);
      const most = (word: string) => (word === LEFT_OUT ? MOST_WHERE_LEFT_OUT : mostSeconds);
      let [word, seconds, fault] = await timed(() => run(number));
      // a machine that is shared may count for ours what others had of it
      if (seconds > most(word)) [word, seconds, fault] = await timed(() => run(number));
      if (seconds > tally.slowest[0]) tally.slowest = [seconds, number];
      if (seconds > most(word)) fault ??= `took ${seconds.toFixed(1)} s`;
      if (fault !== undefined) tally.faults.push(`case ${number}: ${fault}`);
      tally.counts[word] = (tally.counts[word] ?? 0) + 1;
    }
  } finally {
    await watch.end();
  }
  return tally;
}

/** What came of it, the processor's time that it took, s, and what must not have been. */
async function timed(run: () => Promise<string>): Promise<[string, number, string | undefined]> {
  const before = process.cpuUsage();
  let [word, fault]: [string, string | undefined] = ["a fault", undefined];
  try {
    word = await run();
  } catch (error) {
    fault = error instanceof Error ? (error.stack ?? error.message) : String(error);
  }
  const { user, system } = process.cpuUsage(before);
  return [word, (user + system) / 1e6, fault];
}

/** Ends a process whose case never does, and says which it was. */
class Watch {
  readonly #at = new Int32Array(new SharedArrayBuffer(4));
  readonly #worker = new Worker(
    `const { workerData: at } = require("node:worker_threads");
     const used = () => { const { user, system } = process.cpuUsage(); return (user + system) / 1e6; };
     let [seen, since] = [-1, 0];
     setInterval(() => {
       const now = Atomics.load(at, 0);
       if (now !== seen) [seen, since] = [now, used()];
       else if (used() - since > ${2 * MOST_WHERE_LEFT_OUT}) {
         require("node:fs").writeSync(2, "case " + now + " does not end\\n");
         process.kill(process.pid, "SIGKILL");
       }
     }, 500).unref();
     require("node:worker_threads").parentPort.on("message", () => process.exit());`,
    { eval: true, workerData: this.#at },
  );

  begin(number: number): void {
    Atomics.store(this.#at, 0, number);
  }

  async end(): Promise<void> {
    await this.#worker.terminate();
  }
}

export const told = ({ counts, slowest: [seconds, number] }: Tally): string =>
  `${Object.entries(counts)
    .map(([word, count]) => `${count} ${word}`)
    .join(", ")}; slowest case ${number}: ${seconds.toFixed(2)} s of the processor`;
