/** The throws and chains to choose from. */

import type { PageThrow } from "../page-data.js";
import type { App } from "./app.js";
import { el } from "./dom.js";
import { listBox, type Option } from "./list-box.js";
import { emptyWords, propOf, type State } from "./state.js";
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
    const about = aboutThrow(shown, data);
    return {
      key: shown.name,
      of: [first, prop, ...about],
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

function aboutThrow(shown: PageThrow, data: State["data"]): string[] {
  const { isChain, prop, takes, unheld } = shown;
  if (takes.length + unheld.length === 0) return [emptyWords(data, shown)];
  return [
    ...(isChain ? ["chain"] : []),
    ...(prop ? [prop] : []),
    counted(takes.length, "take"),
    ...(unheld.length > 0 ? [`${unheld.length} left out`] : []),
  ];
}
