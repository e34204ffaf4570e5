/** What is wrong, in words, while the old motion stays. */

import type { PageError } from "../page-data.js";
import type { App } from "./app.js";
import { el, fill } from "./dom.js";
import type { State } from "./state.js";

export function banner({ store }: Pick<App, "store">): HTMLElement {
  const element = el("div", { class: "banner", role: "region", "aria-label": "What is wrong", hidden: true });
  store.watch(
    ({ data, trouble, connected }) => [data.error, trouble, connected, data.title, data.throws.length],
    (error, trouble, connected, title, count) => {
      const faults = faultsOf({ error, trouble, connected, title, shown: count > 0 });
      element.hidden = faults.length === 0;
      fill(element, ...faults);
    },
  );
  return element;
}

interface Faults {
  error?: PageError;
  trouble?: string;
  connected: boolean;
  title: string;
  shown: boolean;
}

function faultsOf({ error, trouble, connected, title, shown }: Faults): HTMLElement[] {
  const old = shown ? " What you see is the motion from before." : "";
  return [
    ...(error
      ? [
          el(
            "div",
            { class: "fault" },
            el("strong", {}, placeWords(title, error)),
            el("pre", {}, error.message),
            el("p", {}, `Mend it and save: the page follows.${old}`),
          ),
        ]
      : []),
    ...(trouble
      ? [
          el(
            "div",
            { class: "fault" },
            el("strong", {}, "This page could not do that"),
            el("pre", {}, trouble),
          ),
        ]
      : []),
    ...(connected
      ? []
      : [
          el(
            "div",
            { class: "fault" },
            el("strong", {}, "The preview has stopped"),
            el("p", {}, `It no longer follows the throw file. Start tossbake preview again.${old}`),
          ),
        ]),
  ];
}

export const placeWords = (title: string, { line, column }: PageError): string =>
  line === undefined
    ? `${title} cannot be baked`
    : `${title}, line ${line}${column === undefined ? "" : `, column ${column}`}`;

/** What is to be said when new data come. */
export function newsWords(before: State["data"], after: State["data"]): string | undefined {
  const takes = after.throws.reduce((sum, shown) => sum + shown.takes.length, 0);
  if (after.error) {
    const isNew = after.error.message !== before.error?.message;
    return isNew ? `${placeWords(after.title, after.error)}: ${after.error.message}` : undefined;
  }
  if (before.error) return `In order again: ${takes} takes.`;
  const isOther = after.throws.some(
    ({ name, stamp }) => stamp !== before.throws.find((shown) => shown.name === name)?.stamp,
  );
  return isOther || after.throws.length !== before.throws.length ? `Baked anew: ${takes} takes.` : undefined;
}
