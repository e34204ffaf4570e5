/** The throws and chains to choose from. */

import type { PageThrow } from "../page-data.js";
import type { App } from "./app.js";
import { el } from "./dom.js";
import { listBox, type Option } from "./list-box.js";
import { propOf, type State } from "./state.js";
import { counted } from "./words.js";

export function throwList({ store, strips }: App, onPicked: () => void): HTMLElement {
  const list = listBox<string>("Throws", "throws", (name) => {
    store.send({ type: "throw", name });
    onPicked();
  });
  store.watch(
    ({ data }) => [data],
    (data) =>
      list.show(
        data.throws.map((shown) => option(shown, data)),
        store.state.throwName,
      ),
  );
  store.watch(
    ({ throwName }) => [throwName],
    (name) => list.choose(name),
  );

  function option(shown: PageThrow, data: State["data"]): Option<string> {
    const prop = propOf({ data }, shown);
    const [first] = shown.takes;
    const about = aboutThrow(shown);
    return {
      key: shown.name,
      content: () => [
        el("span", { class: "throw-strip" }, first && prop && strips.strip(first, prop, "throws")),
        el(
          "span",
          { class: "throw-words" },
          el("span", { class: "name" }, shown.name),
          el("span", { class: "about" }, about.join(" · ")),
        ),
      ],
    };
  }

  return list.element;
}

function aboutThrow({ isChain, prop, takes, unheld, stamp }: PageThrow): string[] {
  if (takes.length === 0 && unheld.length === 0 && stamp === undefined) return ["being baked"];
  return [
    ...(isChain ? ["chain"] : []),
    ...(prop ? [prop] : []),
    counted(takes.length, "take"),
    ...(unheld.length > 0 ? [`${unheld.length} left out`] : []),
  ];
}
