/** A live region: what happens without the focus moving is said by screen readers. */

import { el } from "./dom.js";

export function announcer(): { element: HTMLElement; say(text: string): void } {
  const element = el("div", { class: "unseen", role: "status", "aria-live": "polite" });
  return {
    element,
    say(text) {
      // The same words twice are said twice.
      element.textContent = element.textContent === text ? `${text}\u00a0` : text;
    },
  };
}
