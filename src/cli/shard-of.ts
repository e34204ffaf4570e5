import { InvalidArgumentError } from "commander";
import type { Shard } from "../bake/plan.js";

/** "2/8": the second of eight shares. */
export function shardOf(text: string): Shard {
  const match = /^(\d{1,6})\/(\d{1,6})$/.exec(text);
  const [index, of] = [Number(match?.[1]), Number(match?.[2])];
  if (index >= 1 && of >= index) return { index, of };
  throw new InvalidArgumentError("It is a share and how many there are, from 1/N to N/N, such as 2/8.");
}
