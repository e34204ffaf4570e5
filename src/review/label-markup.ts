import type { PlacedLabel } from "./place-labels.js";
import { element, pathData, textAt } from "./svg.js";

/** A label that has its place, with the line that leads to it where it stands far off. */
export function labelMarkup({ x, y, lead, at, baseline, text, kind, anchor }: PlacedLabel): string {
  const leader = lead
    ? element("path", { class: "lead", d: pathData([[x, y, ...lead]], { decimals: 1 }) })
    : "";
  return leader + textAt(at, baseline, text, { class: kind, "text-anchor": anchor });
}
