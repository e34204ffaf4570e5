/** Numbers and words as sheets write them; a figure and its unit stay on one line. */

const KEPT = "\u00a0";

/** "1.20 m" */
export const metres = (value: number): string => `${fixed(value, 2)}${KEPT}m`;

/** "0.67 s" */
export const seconds = (value: number): string => `${fixed(value, 2)}${KEPT}s`;

/** "1.5 turns", "1 turn"; two decimals where there are any. */
export function turnsText(turns: number): string {
  const text = String(Number(turns.toFixed(2)));
  return `${text}${KEPT}${text === "1" ? "turn" : "turns"}`;
}

/** Never "-0.00". */
export function fixed(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? (0).toFixed(decimals) : text;
}

/** "1,234" */
export const counted = (count: number): string => String(count).replace(/\B(?=(\d{3})+$)/g, ",");

export const degrees = (radians: number): string => `${Math.round((radians * 180) / Math.PI)}°`;

/** "a spanner", "an oar" */
export const withArticle = (name: string): string => `${/^[aeiou]/i.test(name) ? "an" : "a"} ${name}`;

export const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** A small distance: "3 mm", "0.12 m". */
export const numeralMetres = (value: number): string =>
  value < 0.1 ? `${Number((value * 1000).toPrecision(2))}${KEPT}mm` : metres(value);
