/** The least of 1, 2, 5, 10, 20 … and 0.5, 0.2, 0.1 … that is no less than `least`. */
export function niceStep(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least));
  for (const factor of [1, 2, 5]) if (factor * power >= least * (1 - 1e-9)) return factor * power;
  return 10 * power;
}

/** As people write it: no digits that the step does not need. */
export const niceNumber = (value: number, step: number): string =>
  (Math.abs(value) < step / 1e6 ? 0 : value).toFixed(Math.max(0, -Math.floor(Math.log10(step) + 1e-9)));
