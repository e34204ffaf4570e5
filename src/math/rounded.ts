/** Digits that are kept of a number that is written down; below `NOTHING` it is rounding and is written 0. */
const DIGITS = 12;
const NOTHING = 1e-12;

/** Numbers with 12 significant digits, differences from zero below 1e-12 as 0, at any depth; other values as they are. */
export function rounded<T>(value: T): T;
export function rounded(value: unknown): unknown {
  if (typeof value === "number") return Math.abs(value) < NOTHING ? 0 : Number(value.toPrecision(DIGITS));
  if (Array.isArray(value)) return value.map((item) => rounded(item));
  if (value !== null && typeof value === "object")
    return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, rounded(inner)]));
  return value;
}
