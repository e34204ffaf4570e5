/** A take's numbers as a table; with a second take in two columns, what differs marked. */

import { el } from "./dom.js";
import { type FactGroup, type Likeness, type PairedRow, paired } from "./fact-rows.js";

/** @param names of the takes: one, or two */
export function factTable(
  caption: string,
  names: readonly string[],
  first: FactGroup[],
  second?: FactGroup[],
): HTMLElement {
  const columns = second ? 3 : 1;
  return el(
    "table",
    {},
    el("caption", { class: "unseen" }, caption),
    second &&
      el(
        "thead",
        {},
        el("tr", {}, el("td"), ...names.map((name) => el("th", { scope: "col" }, name)), el("td")),
      ),
    ...first.map(({ title, rows }) => {
      const others = second?.find((group) => group.title === title)?.rows;
      return el(
        "tbody",
        {},
        el("tr", { class: "group" }, el("th", { scope: "rowgroup", colspan: 1 + columns }, title)),
        ...(second
          ? paired(rows, others ?? []).map(pairedRow)
          : rows.map(({ label, text, about }) => el("tr", {}, rowHead(label, about), el("td", {}, text)))),
      );
    }),
  );
}

/** A key of the throw file may break after its dots. */
const rowHead = (label: string, about?: string): HTMLElement =>
  el(
    "th",
    { scope: "row", title: about },
    ...label.split(/(?<=\.)/).flatMap((part, i) => (i > 0 ? [el("wbr"), part] : [part])),
  );

const SIGNS: Record<Likeness, [sign: string, words: string]> = {
  same: ["=", "same"],
  near: ["≈", "nearly the same"],
  differs: ["≠", "differs"],
};

function pairedRow({ label, about, texts, likeness }: PairedRow): HTMLElement {
  const [sign, words] = SIGNS[likeness];
  return el(
    "tr",
    { class: likeness },
    rowHead(label, about),
    ...texts.map((text) => el("td", {}, text)),
    el(
      "td",
      { class: "sign" },
      el("span", { "aria-hidden": "true" }, sign),
      el("span", { class: "unseen" }, words),
    ),
  );
}
