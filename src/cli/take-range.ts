import { InvalidArgumentError } from "commander";

/** "3-7" as first and last take. */
export function takeRange(text: string): [number, number] {
  const match = /^(\d{1,9})-(\d{1,9})$/.exec(text);
  const [first, last] = [Number(match?.[1]), Number(match?.[2])];
  if (!(first >= 1 && last >= first))
    throw new InvalidArgumentError("It is the first and the last take, such as 3-7.");
  return [first, last];
}
