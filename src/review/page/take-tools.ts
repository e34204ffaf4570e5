/** In what order takes are listed, and which of them. */

import type { App } from "./app.js";
import { el, fill } from "./dom.js";
import { MEASURES, type MeasureKey, measureOf } from "./measures.js";
import type { Kept } from "./order.js";
import { listed, measured } from "./state.js";

const KEPT: Record<Kept, string> = {
  all: "all",
  open: "undecided",
  accepted: "accepted",
  rejected: "rejected",
};

export function takeTools({ store, say }: App): HTMLElement {
  const by = el(
    "select",
    { onchange: () => store.send({ type: "order", by: by.value as MeasureKey }) },
    ...MEASURES.map(({ key, label }) => el("option", { value: key }, label)),
  );
  const direction = el("button", {
    type: "button",
    onclick: () => store.send({ type: "sift", change: { highFirst: !store.state.order.highFirst } }),
  });
  const keep = el(
    "select",
    { onchange: () => store.send({ type: "sift", change: { keep: keep.value as Kept } }) },
    ...Object.entries(KEPT).map(([value, label]) => el("option", { value }, label)),
  );
  const least = bound("least");
  const most = bound("most");
  const unit = el("span", { class: "unit" });
  const count = el("span", { class: "count" });

  store.watch(
    ({ order }) => [order],
    (order) => {
      const measure = measureOf(order.by);
      by.value = order.by;
      keep.value = order.keep;
      direction.textContent = order.highFirst ? "highest first" : "lowest first";
      unit.textContent = measure.unit;
      for (const [input, value] of [
        [least, order.least],
        [most, order.most],
      ] as const)
        if (document.activeElement !== input)
          input.value = value === undefined ? "" : String(Number((value / measure.factor).toPrecision(12)));
    },
  );
  store.watch(
    ({ data, throwName, order, verdicts }) => [data, throwName, order, verdicts],
    () => {
      const [shown, all] = [listed(store.state).length, measured(store.state).length];
      const text = shown === all ? `${all}` : `${shown} of ${all}`;
      if (count.textContent && shown !== all && count.textContent !== text) say(`${text} takes listed`);
      count.textContent = text;
    },
  );

  function bound(which: "least" | "most"): HTMLInputElement {
    const input = el("input", {
      type: "number",
      step: "any",
      inputmode: "decimal",
      placeholder: "any",
      oninput: () => {
        const value = input.valueAsNumber * measureOf(store.state.order.by).factor;
        store.send({ type: "sift", change: { [which]: Number.isFinite(value) ? value : undefined } });
      },
    });
    return input;
  }

  const tools = el("div", { class: "take-tools" });
  fill(
    tools,
    el("h2", {}, "Takes ", count),
    el("label", {}, el("span", {}, "Order by"), by),
    direction,
    el("label", {}, el("span", {}, "from"), least),
    el("label", {}, el("span", {}, "to"), most, unit),
    el("label", {}, el("span", {}, "Show"), keep),
  );
  return tools;
}
