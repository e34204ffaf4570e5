/** Numbers as messages show them: four digits, rounded to the side on which the request can be met. */

/** To four significant digits. */
export const shown = (value: number): string => String(Number(value.toPrecision(4)));

/** The smallest number of four digits that is no less. */
export function atLeast(value: number): string {
  const rounded = Number(value.toPrecision(4));
  return String(rounded >= value ? rounded : Number((rounded + lastDigit(value)).toPrecision(4)));
}

/** The largest number of four digits that is no more. */
export const atMost = (value: number): string => String(-Number(atLeast(-value)) || 0);

const lastDigit = (value: number): number => Number(`1${value.toExponential(3).replace(/^.*e/, "e")}`) / 1000;
