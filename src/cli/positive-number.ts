import { InvalidArgumentError } from "commander";

/** Reads an option's number above 0 of the unit named. */
export const positiveNumber =
  (unit: string) =>
  (text: string): number => {
    const value = Number(text);
    if (!(value > 0 && value < Number.POSITIVE_INFINITY))
      throw new InvalidArgumentError(`It is a number above 0, in ${unit}.`);
    return value;
  };
