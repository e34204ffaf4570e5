/** The clip's time as a slider, with what happens when. */

import type { App } from "./app.js";
import { type Cue, cuesOf, holdsOf, placeCues } from "./cues.js";
import { el, fill, freshId } from "./dom.js";
import { takeOf } from "./state.js";
import { decimals, seconds } from "./words.js";

/** Frames that Page up and Page down go. */
const PAGE = 10;
/** px that a word's letter takes on the line, and what is kept free beside it. */
const LETTER = 6.6;
const GAP = 8;

/** `now` says the time in words. */
export function timeLine({ store, player }: App): { element: HTMLElement; now: HTMLElement } {
  const id = freshId();
  const slider = el("input", {
    type: "range",
    id,
    min: 0,
    step: "any",
    class: "slider",
    "aria-label": "Time in the clip",
  });
  const ticks = el("div", { class: "ticks", "aria-hidden": "true" });
  const now = el("output", { class: "now", for: id });
  let cues: Cue[] = [];

  slider.addEventListener("input", () => player.hold(slider.valueAsNumber));
  slider.addEventListener("keydown", (event) => {
    if (event.altKey || event.ctrlKey || event.metaKey || event.shiftKey) return;
    const moved = move(event.key);
    if (!moved) return;
    event.preventDefault();
    event.stopPropagation();
    moved();
  });

  function move(key: string): (() => void) | undefined {
    switch (key) {
      case "ArrowRight":
      case "ArrowUp":
        return () => player.step(1);
      case "ArrowLeft":
      case "ArrowDown":
        return () => player.step(-1);
      case "PageUp":
        return () => player.step(PAGE);
      case "PageDown":
        return () => player.step(-PAGE);
      case "Home":
        return () => player.hold(0);
      case "End":
        return () => player.hold(player.duration);
    }
  }

  function layOut(): void {
    const take = takeOf(store.state);
    const duration = take?.motion.duration ?? 0;
    cues = take ? cuesOf(take.motion) : [];
    const share = (time: number) => `${duration > 0 ? (100 * time) / duration : 0}%`;
    const placed = placeCues(cues, duration, ticks.clientWidth, (text) => LETTER * text.length + GAP);
    fill(
      ticks,
      ...(take ? holdsOf(take.motion) : []).map(({ from, to }) => {
        const hold = el("span", { class: "hold", title: "stands still" });
        hold.style.setProperty("left", share(from));
        hold.style.setProperty("width", share(to - from));
        return hold;
      }),
      ...cues.map((cue) => {
        const tick = el("span", { class: `tick ${cue.kind}` });
        tick.style.setProperty("left", share(cue.time));
        return tick;
      }),
      ...placed.map(({ cue, row, left }) => {
        const word = el("span", { class: `cue row${row}` }, cue.short);
        word.style.setProperty("left", `${left + GAP / 2}px`);
        return word;
      }),
    );
  }

  function show(time: number): void {
    const { frameRate } = store.state.data;
    slider.value = String(time);
    const text = `${seconds(time)} · frame ${decimals(time * frameRate, 1)}`;
    now.textContent = text;
    // A screen reader would never stop while it plays.
    if (!store.state.playing)
      slider.setAttribute("aria-valuetext", `${text}${nearWords(cues, time, 0.5 / frameRate)}`);
  }

  store.watch(
    (state) => [takeOf(state)],
    (take) => {
      slider.max = String(take?.motion.duration ?? 0);
      slider.disabled = !take;
      layOut();
      show(player.time);
    },
  );
  store.watch(
    ({ playing }) => [playing],
    () => show(player.time),
  );
  player.onTime(show);
  new ResizeObserver(layOut).observe(ticks);

  return { element: el("div", { class: "rail" }, ticks, slider), now };
}

/** ", apex" while the time is within `close` of a cue, else what came last. */
function nearWords(cues: readonly Cue[], time: number, close: number): string {
  const here = cues.filter((cue) => Math.abs(cue.time - time) <= close);
  if (here.length > 0) return `, ${here.map((cue) => cue.text).join(", ")}`;
  const past = cues.filter((cue) => cue.time < time).pop();
  return past ? `, after ${past.text}` : "";
}
