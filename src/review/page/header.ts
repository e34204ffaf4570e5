/** What page this is, how it stands with it, and the way to the keys. */

import type { PageData } from "../page-data.js";
import type { App } from "./app.js";
import { el } from "./dom.js";
import { counted } from "./words.js";

function kinds({ throws }: PageData): string {
  const chains = throws.filter(({ isChain }) => isChain).length;
  const single = counted(throws.length - chains, "throw");
  return chains > 0 ? `${single} and ${counted(chains, "chain")}` : single;
}

export function header({ store }: Pick<App, "store">, live: boolean, showKeys: () => void): HTMLElement {
  const title = el("h1");
  const status = el("p", { class: "status" });
  store.watch(
    ({ data, connected }) => [data, connected],
    (data, connected) => {
      title.textContent = data.title;
      document.title = `${data.title} – tossbake`;
      const takes = data.throws.reduce((sum, shown) => sum + shown.takes.length, 0);
      const waiting = data.throws.filter(
        ({ takes, unheld, stamp }) => takes.length + unheld.length === 0 && !stamp,
      );
      const state = !connected
        ? "stopped"
        : data.error
          ? "error: motion from before"
          : live && waiting.length > 0
            ? `${counted(waiting.length, "throw")} still to bake`
            : live
              ? "follows the file"
              : "as baked";
      status.textContent = `${counted(takes, "take")} of ${kinds(data)} · ${state}`;
    },
  );
  return el(
    "header",
    { class: "head" },
    el("span", { class: "mark-name" }, "tossbake"),
    title,
    status,
    el(
      "button",
      { type: "button", onclick: showKeys, "aria-haspopup": "dialog" },
      "Keys ",
      el("kbd", {}, "?"),
    ),
  );
}
