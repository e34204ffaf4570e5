import { InvalidArgumentError } from "commander";

/** More threads than any machine has cores for cost memory and gain nothing. */
const MOST_JOBS = 256;

export function jobCount(text: string): number {
  const count = /^\d{1,4}$/.test(text) ? Number(text) : 0;
  if (count >= 1 && count <= MOST_JOBS) return count;
  throw new InvalidArgumentError(`It is a number of threads from 1 to ${MOST_JOBS}.`);
}
