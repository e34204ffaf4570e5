/** One table of the benchmark. */
export interface Section {
  /** Also what `npm run bench -- NAME` calls it. */
  name: string;
  /** What is compared, and how to read it. */
  about: string;
  run(): Promise<{ head: string[]; rows: string[][] }>;
}

/** "12.3 µs", to three digits. */
export function duration(seconds: number): string {
  if (seconds < 1e-3) return `${(seconds * 1e6).toPrecision(3)} µs`;
  return seconds < 1 ? `${(seconds * 1e3).toPrecision(3)} ms` : `${seconds.toPrecision(3)} s`;
}

/** Three digits without an exponent. */
export const figure = (value: number): string =>
  value >= 100 ? Math.round(value).toString() : value.toPrecision(3);

/** "2e-16" */
export const tiny = (value: number): string => value.toExponential(0);
