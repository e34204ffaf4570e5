/** What page this is, how it stands with it, and the way to the keys. */

import type { PageData } from "../page-data.js";
import type { App } from "./app.js";
import { el } from "./dom.js";
import { counted } from "./words.js";

export function header({ store }: Pick<App, "store">, live: boolean, showKeys: () => void): HTMLElement {
  const title = el("h1");
  const status = el("p", { class: "status" });
  store.watch(
    ({ data, connected }) => [data, connected],
    (data, connected) => {
      title.textContent = data.title;
      document.title = `${data.title} – tossbake`;
      const takes = data.throws.reduce((sum, shown) => sum + shown.takes.length, 0);
      const state = stateWords(data, live, connected);
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

function stateWords({ error, throws }: PageData, live: boolean, connected: boolean): string {
  if (!connected) return "stopped";
  if (error) return "error: motion from before";
  if (!live) return "as baked";
  const due = throws.filter(({ stamp }) => stamp === undefined).length;
  return due > 0 ? `${counted(due, "throw")} still to bake` : "follows the file";
}

function kinds({ throws }: PageData): string {
  const chains = throws.filter(({ isChain }) => isChain).length;
  const single = counted(throws.length - chains, "throw");
  return chains > 0 ? `${single} and ${counted(chains, "chain")}` : single;
}
