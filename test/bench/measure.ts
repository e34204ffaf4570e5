/**
 * Times things against each other within one run, by the processor time that this process took: other programs on the machine
 * do not count, helper threads that collect garbage do.
 */

export interface Contestant<T = unknown> {
  /** Before each timed call, untimed: what the call uses up. */
  prepare?: () => Promise<T>;
  run: (prepared: T) => unknown;
}

/** A timed batch lasts at least this long, s: far above the clock's grain. */
const BATCH = 0.005;
const FEWEST_ROUNDS = 5;

/**
 * Seconds that one call of each contestant takes, warm: medians over rounds in which each has its turn, so that whatever
 * slows the processor slows all alike.
 *
 * @param budget s for all of them together
 */
export async function secondsEach(
  // biome-ignore lint/suspicious/noExplicitAny: each contestant prepares something of its own kind
  contestants: readonly Contestant<any>[],
  budget = 2,
): Promise<number[]> {
  const batches: number[] = [];
  for (const contestant of contestants)
    batches.push(await warmUp(contestant, budget / 3 / contestants.length));
  const times = contestants.map((): number[] => []);
  const end = performance.now() + 667 * budget;
  while (times[0].length < FEWEST_ROUNDS || performance.now() < end)
    for (const [i, contestant] of contestants.entries()) times[i].push(await timed(contestant, batches[i]));
  return times.map(median);
}

export const median = (values: readonly number[]): number =>
  [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];

/** Calls that make a batch. */
async function warmUp(contestant: Contestant, budget: number): Promise<number> {
  const end = performance.now() + 1000 * budget;
  let batch = 1;
  do {
    const seconds = batch * (await timed(contestant, batch));
    // what is prepared serves one call
    if (seconds < BATCH && !contestant.prepare) batch *= 2;
  } while (performance.now() < end);
  return batch;
}

/** Seconds a call. */
async function timed(contestant: Contestant, batch: number): Promise<number> {
  const prepared = await contestant.prepare?.();
  const start = process.cpuUsage();
  for (let i = 0; i < batch; i++) {
    const answer = contestant.run(prepared);
    if (answer instanceof Promise) await answer;
  }
  const { user, system } = process.cpuUsage(start);
  return (user + system) / 1e6 / batch;
}
