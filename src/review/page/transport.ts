/** Play, pause, frame by frame, slow, once or looped. */

import type { App } from "./app.js";
import { el, fill, svg } from "./dom.js";
import { SLOWNESS, type Slowness } from "./state.js";

const SIGNS = {
  play: "M4 2.5 L13 8 L4 13.5 Z",
  pause: "M4 2.5 h3 v11 h-3 Z M9 2.5 h3 v11 h-3 Z",
  back: "M12 2.5 L6.5 8 L12 13.5 Z M3.5 2.5 h2 v11 h-2 Z",
  ahead: "M4 2.5 L9.5 8 L4 13.5 Z M10.5 2.5 h2 v11 h-2 Z",
} as const;

const SLOW_WORDS: Record<Slowness, string> = { 1: "1", 2: "½", 4: "¼", 8: "⅛" };

/** @param now where the time is said */
export function transport({ store, player }: App, now: HTMLElement): HTMLElement {
  const play = el("button", { type: "button", class: "play", onclick: () => player.toggle() });
  const back = el(
    "button",
    { type: "button", onclick: () => player.step(-1) },
    sign("back"),
    hideable("Frame"),
  );
  const ahead = el(
    "button",
    { type: "button", onclick: () => player.step(1) },
    hideable("Frame"),
    sign("ahead"),
  );
  back.setAttribute("aria-label", "One frame back");
  ahead.setAttribute("aria-label", "One frame ahead");
  const slow = el(
    "select",
    { onchange: () => store.send({ type: "slow", by: Number(slow.value) as Slowness }) },
    ...SLOWNESS.map((by) => el("option", { value: by }, `${SLOW_WORDS[by]} × speed`)),
  );
  slow.setAttribute("aria-label", "Speed");
  const loop = el("input", {
    type: "checkbox",
    onchange: () => store.send({ type: "loop", on: loop.checked }),
  });
  store.watch(
    ({ playing }) => [playing],
    (playing) => fill(play, sign(playing ? "pause" : "play"), el("span", {}, playing ? "Pause" : "Play")),
  );
  store.watch(
    (state) => [state.slow, state.loop],
    (by, loops) => {
      slow.value = String(by);
      loop.checked = loops;
    },
  );
  return el(
    "div",
    { class: "transport", role: "group", "aria-label": "Playing" },
    back,
    play,
    ahead,
    slow,
    el("label", { class: "chip" }, loop, el("span", {}, "Loop")),
    now,
  );
}

const hideable = (text: string) => el("span", { class: "wide-only" }, text);

const sign = (name: keyof typeof SIGNS) =>
  svg(
    "svg",
    { class: "sign", viewBox: "0 0 16 16", "aria-hidden": "true", focusable: "false" },
    svg("path", { d: SIGNS[name] }),
  );
