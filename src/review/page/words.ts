/** Numbers as the page says them: fixed digits, a point, the unit behind a no-break space. */

const SPACE = "\u00a0";

const unit = (text: string, name: string): string => `${text}${SPACE}${name}`;

/** No "-0.0". */
export const decimals = (value: number, digits: number): string => {
  const text = value.toFixed(digits);
  return Number(text) === 0 ? (0).toFixed(digits) : text;
};

/** Three digits, never with an exponent. */
export function digits(value: number, count = 3): string {
  if (value === 0) return "0";
  const whole = Math.floor(Math.log10(Math.abs(value))) + 1;
  return decimals(value, Math.max(0, Math.min(12, count - whole)));
}

export const seconds = (value: number): string => unit(decimals(value, 3), "s");
export const turns = (value: number): string => decimals(value, 2);
export const degrees = (value: number): string => `${decimals(value, 1)}°`;
export const percent = (share: number): string => unit(decimals(share * 100, 0), "%");
export const speed = (value: number): string => unit(decimals(value, 2), "m/s");
export const rate = (radians: number): string => unit(decimals(radians / (2 * Math.PI), 2), "turns/s");
export const bytes = (value: number): string => unit(String(value), "bytes");

/** Millimetres below a metre; what no eye and no file can tell from nothing is said so. */
export function metres(value: number): string {
  if (value === 0) return unit("0", "mm");
  if (Math.abs(value) < 1e-6) return unit("under 0.001", "mm");
  if (Math.abs(value) < 1) return unit(digits(value * 1000), "mm");
  return unit(decimals(value, 2), "m");
}

/** Radians given, degrees said. */
export function angle(radians: number): string {
  const value = (radians * 180) / Math.PI;
  return value !== 0 && Math.abs(value) < 0.001 ? "under 0.001°" : `${decimals(value, value < 1 ? 3 : 1)}°`;
}

/** "1 take", "3 takes". */
export const counted = (count: number, what: string): string => `${count} ${what}${count === 1 ? "" : "s"}`;
