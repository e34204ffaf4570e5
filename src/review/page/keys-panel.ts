/** The list of the keys, and whether single characters are keys. */

import type { App } from "./app.js";
import { el } from "./dom.js";
import { KEYS } from "./keys.js";

export function keysPanel({ store }: App): HTMLDialogElement {
  const groups = [...new Set(KEYS.map(({ group }) => group))];
  const letters = el("input", {
    type: "checkbox",
    onchange: () => store.send({ type: "letters", on: letters.checked }),
  });
  store.watch(
    (state) => [state.letters],
    (on) => {
      letters.checked = on;
    },
  );
  const dialog = el(
    "dialog",
    { class: "keys", "aria-label": "Keys" },
    el(
      "div",
      { class: "keys-head" },
      el("h2", {}, "Keys"),
      el("button", { type: "button", onclick: () => dialog.close() }, "Close"),
    ),
    el("label", { class: "chip" }, letters, el("span", {}, "Single characters are keys")),
    el(
      "div",
      { class: "keys-groups" },
      ...groups.map((group) =>
        el(
          "section",
          {},
          el("h3", {}, group),
          el(
            "dl",
            {},
            ...KEYS.filter((key) => key.group === group).flatMap(({ label, does }) => [
              el("dt", {}, el("kbd", {}, label)),
              el("dd", {}, does),
            ]),
          ),
        ),
      ),
    ),
    el(
      "p",
      {},
      "In the lists of throws and takes arrows go along the list; Shift and a click puts a take beside the one that is looked at. ",
      "On the time line Page up and Page down go ten frames, Home and End to the ends.",
    ),
  );
  dialog.addEventListener("click", (event) => {
    if (event.target === dialog) dialog.close();
  });
  return dialog;
}
