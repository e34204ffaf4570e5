/** What is known of the take that is looked at, and of the one beside it. */

import type { PageProp, PageThrow } from "../page-data.js";
import type { App } from "./app.js";
import { differencePlot } from "./difference-plot.js";
import { type Child, el, fill } from "./dom.js";
import { apart, drawnGroup, factGroups } from "./fact-rows.js";
import { factTable } from "./fact-table.js";
import type { Measured } from "./measures.js";
import { missedWords } from "./misses.js";
import { measuredOf, propOf, throwOf } from "./state.js";
import { metres } from "./words.js";

/** `drawn` is to be called when other takes stand on the stage. */
export function facts(app: App): { element: HTMLElement; drawn(): void } {
  const { store } = app;
  const title = el("h2");
  const notes = el("div");
  const numbers = el("div");
  const draws = el("div");
  const about = el("div", { class: "about-throw" });
  const plot = differencePlot(app);

  store.watch(
    ({ data, throwName, take, beside }) => [data, throwName, take, beside],
    () => {
      const { state } = store;
      const shown = throwOf(state);
      const first = measuredOf(state, state.take);
      const second = state.beside === state.take ? undefined : measuredOf(state, state.beside);
      title.textContent = first?.take.motion.name ?? shown?.name ?? "Nothing to see yet";
      plot.element.hidden = !first;
      fill(notes, ...(first ? notesOn(app, first, second) : []));
      const names = [first, second].flatMap((each) => (each ? [`take ${each.number}`] : []));
      fill(numbers, first && factTable("Numbers", names, factGroups(first), second && factGroups(second)));
      fill(
        draws,
        first && factTable("What was drawn", names, drawnGroup(first), second && drawnGroup(second)),
      );
      fill(about, ...(shown ? aboutThrow(shown, propOf(state, shown)) : []));
    },
  );

  return {
    element: el(
      "section",
      { class: "facts", "aria-label": "The take's numbers" },
      title,
      notes,
      numbers,
      plot.element,
      draws,
      about,
    ),
    drawn: plot.draw,
  };
}

function notesOn(app: App, first: Measured, second?: Measured): Child[] {
  const { beside, take } = app.store.state;
  return [
    ...[first, second].map((each) => each && missNote(each)),
    ...warningNotes(first),
    beside !== undefined && beside === take
      ? el("p", { class: "hint" }, `Take ${beside} stays beside. Choose another take to see both.`)
      : null,
    second && apartNote(first, second),
    likeNote(app, first),
  ];
}

function missNote(measured: Measured): HTMLElement | null {
  const missed = missedWords(measured);
  return missed === undefined
    ? null
    : el("p", { class: "note" }, el("strong", {}, `Take ${measured.number} misses ${missed}.`));
}

const warningNotes = ({ take }: Measured): HTMLElement[] =>
  (take.warnings ?? []).map((text) => el("p", { class: "note" }, text));

function apartNote(first: Measured, second: Measured): HTMLElement {
  const { release, arrival } = apart(first, second);
  return el(
    "p",
    { class: "hint" },
    `Takes ${first.number} and ${second.number} leave ${metres(release)} and arrive ${metres(arrival)} apart.`,
  );
}

function likeNote({ store }: App, { nearest, number }: Measured): HTMLElement | null {
  if (!nearest) return null;
  const { take, distance } = nearest;
  const button = (text: string, send: () => void) => el("button", { type: "button", onclick: send }, text);
  return el(
    "p",
    { class: "like" },
    el("span", {}, `Most like it: take ${take}, never more than ${metres(distance)} apart.`),
    button(`Go to take ${take}`, () => store.send({ type: "take", take })),
    store.state.beside !== take &&
      button(`See ${take} beside ${number}`, () => store.send({ type: "beside", take })),
  );
}

function aboutThrow(shown: PageThrow, prop?: PageProp): Child[] {
  const list = (title: string, items: readonly Child[]) =>
    items.length > 0 ? [el("h3", {}, title), el("ul", {}, ...items.map((item) => el("li", {}, item)))] : [];
  return [
    ...list(
      "Spin asked for",
      Object.entries(shown.spin ?? {}).map(([key, text]) => `${key}: ${text}`),
    ),
    ...list(prop ? `About ${prop.name}` : "", prop?.warnings ?? []),
  ];
}
