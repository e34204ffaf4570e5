/** What is wrong, in words, while the old motion stays. */

import type { PageError } from "../page-data.js";
import type { App } from "./app.js";
import { el, fill } from "./dom.js";
import type { State } from "./state.js";
import { counted } from "./words.js";

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
            el("pre", {}, faultWords(title, error)),
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

/** Without the folders before the file's name, which are longer than what is wrong. */
export const faultWords = (title: string, { message }: PageError): string =>
  message
    .split("\n")
    .map((line) => line.slice(Math.max(0, line.indexOf(`${title}:`))))
    .join("\n");

/** What is to be said when new data come; what is `urgent` is said at once, else when no more comes. */
export function newsWords(
  before: State["data"],
  after: State["data"],
): { text: string; urgent: boolean } | undefined {
  const takes = after.throws.reduce((sum, shown) => sum + shown.takes.length, 0);
  const { title, error } = after;
  if (error) {
    const isNew = error.message !== before.error?.message;
    return isNew
      ? { text: `${placeWords(title, error)}: ${faultWords(title, error)}`, urgent: true }
      : undefined;
  }
  if (before.error) return { text: `In order again: ${counted(takes, "take")}.`, urgent: true };
  const stamps = new Map(before.throws.map(({ name, stamp }) => [name, stamp]));
  const isOther =
    after.throws.length !== before.throws.length ||
    after.throws.some(({ name, stamp }) => stamp !== stamps.get(name));
  return isOther ? { text: `Baked anew: ${counted(takes, "take")}.`, urgent: false } : undefined;
}
