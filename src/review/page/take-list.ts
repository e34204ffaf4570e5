/** The takes of the throw, as strips, in the order that was asked for. */

import type { PageThrow } from "../page-data.js";
import type { App } from "./app.js";
import { el, fill } from "./dom.js";
import { listBox, type Option } from "./list-box.js";
import { type Measure, type Measured, measureOf } from "./measures.js";
import { missedWords } from "./misses.js";
import { placeAmong } from "./order.js";
import { emptyWords, listed, measured, propOf, type State, throwOf } from "./state.js";
import { oldVerdict, verdictOf } from "./verdicts.js";
import { counted } from "./words.js";

/** Takes left out that are told without being asked for. */
const FEW = 3;

export function takeList({ store, strips }: App): HTMLElement {
  const list = listBox<number>("Takes", "takes", (take, second) =>
    store.send(second && take !== store.state.take ? { type: "beside", take } : { type: "take", take }),
  );
  const none = el("p", { class: "none", hidden: true });
  const showAll = el(
    "button",
    {
      type: "button",
      hidden: true,
      onclick: () => store.send({ type: "sift", change: { keep: "all", least: undefined, most: undefined } }),
    },
    "Show all takes",
  );

  const leftOutTitle = el("summary");
  const leftOutLines = el("ul", { class: "left-out" });
  const leftOut = el("details", { hidden: true }, leftOutTitle, leftOutLines);
  const box = el(
    "div",
    { class: "take-list" },
    leftOut,
    list.element,
    el("div", { class: "none-row" }, none, showAll),
  );

  store.watch(
    ({ data, throwName, order, verdicts, beside }) => [data, throwName, order, verdicts, beside],
    () => {
      const { state } = store;
      const takes = listed(state);
      const values = measured(state).flatMap((each) => measureOf(state.order.by).of(each) ?? []);
      list.show(
        takes.map((each) => option(each, state, values)),
        state.take,
      );
      const hidden = measured(state).length - takes.length;
      showAll.hidden = hidden === 0;
      none.hidden = takes.length > 0;
      none.textContent = noneWords(state, hidden);
    },
  );
  // above the takes: whoever looks for one that is not there starts from them
  store.watch(
    (state) => [throwOf(state)],
    (shown) => {
      const unheld = shown?.unheld ?? [];
      leftOut.hidden = unheld.length === 0;
      leftOut.open = unheld.length <= FEW;
      leftOutTitle.textContent = `${counted(unheld.length, "take")} left out`;
      fill(leftOutLines, ...unheld.map(leftOutLine));
    },
  );
  // What the new order puts first is what it was asked for.
  store.watch(
    ({ order, throwName }) => [order.by, order.highFirst, throwName],
    () => {
      list.element.scrollTo(0, 0);
      box.scrollTo(0, 0);
    },
  );
  store.watch(
    ({ take }) => [take],
    (take) => list.choose(take),
  );

  function option(each: Measured, state: State, values: readonly number[]): Option<number> {
    const { take, number } = each;
    const prop = propOf(state, throwOf(state));
    const verdict = verdictOf(state.verdicts, take.motion);
    const isBeside = number === state.beside;
    const measure = measureOf(state.order.by);
    const value = measure.of(each);
    const said = saidOf(each, measure);
    const place = said !== undefined && value !== null ? placeAmong(value, values) : null;
    const marks = [
      verdict ?? (oldVerdict(state.verdicts, take.motion) && "changed since you decided"),
      missedWords(each) && "misses",
      isBeside && "beside",
    ].filter((mark) => typeof mark === "string");
    return {
      key: number,
      of: [take, prop, measure, said, place, isBeside, ...marks],
      classes: [verdict ?? "", isBeside ? "beside" : ""].join(" "),
      content: () => [
        el(
          "span",
          { class: "take-head" },
          el("span", { class: "number" }, unseen("take "), String(number)),
          said !== undefined && el("span", { class: "value" }, unseen(`, ${measure.label} `), said),
        ),
        el("span", { class: "take-strip" }, prop && strips.strip(take, prop, "takes")),
        place !== null && bar(place),
        el(
          "span",
          { class: "marks" },
          ...marks.map((mark) => el("span", { class: `mark ${mark.split(" ")[0]}` }, unseen(", "), mark)),
        ),
      ],
    };
  }

  return box;
}

/** What the list is in order by, but for the number that each take shows anyway. */
function saidOf(each: Measured, measure: Measure): string | undefined {
  const value = measure.of(each);
  if (measure.key === "number") return undefined;
  if (value === null) return "none";
  return measure.key === "nearest" ? `${measure.say(value)} from ${each.nearest?.take}` : measure.say(value);
}

const leftOutLine = ({ name, reason }: PageThrow["unheld"][number]): HTMLElement =>
  el("li", {}, el("strong", {}, `${name} is left out:`), ` ${reason}`);

const unseen = (text: string): HTMLElement => el("span", { class: "unseen" }, text);

/** Where the value lies between the least and the greatest of all takes. */
function bar(place: number): HTMLElement {
  const filled = el("span", { class: "bar-fill" });
  filled.style.setProperty("width", `${Math.round(place * 100)}%`);
  return el("span", { class: "bar" }, filled);
}

function noneWords(state: State, hidden: number): string {
  const shown = throwOf(state);
  if (hidden > 0) return "No take is so.";
  return shown ? emptyWords(state.data, shown) : "There is no throw yet.";
}
