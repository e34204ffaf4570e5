/** Keeps the stage as the state has it. */

import type { PageThrow } from "../page-data.js";
import type { App } from "./app.js";
import { el } from "./dom.js";
import { VIEWS } from "./scene-tools.js";
import { emptyWords, propOf, type State, takeOf, throwOf } from "./state.js";

/** @param shown told when another throw or other takes are in the picture, or none can be */
export function scene(app: App, canvas: HTMLCanvasElement, shown: () => void): HTMLElement {
  const { store, stage, player, files } = app;
  const caption = el("p", { class: "caption" });
  const waiting = el("p", { class: "waiting", hidden: true });
  let standing: PageThrow | undefined;
  let wanted = 0;

  store.watch(
    (state) => [throwOf(state)],
    () => {
      put();
    },
  );
  store.watch(
    (state) => [throwOf(state), state.data],
    (shown, data) => {
      waiting.hidden = !shown || shown.takes.length > 0;
      waiting.textContent = shown ? emptyWords(data, shown) : "";
    },
  );
  store.watch(
    ({ take, beside }) => [take, beside],
    () => {
      choose().catch(tell);
    },
  );
  store.watch(
    ({ view }) => [view],
    (view) => stage.setView(view),
  );
  store.watch(
    ({ layers }) => [layers],
    (layers) => {
      for (const [layer, on] of Object.entries(layers)) stage.setLayer(layer as keyof State["layers"], on);
    },
  );
  store.watch(
    ({ throwName, take, view }) => [throwName, take, view],
    (name, take, view) => {
      const label = VIEWS.find((other) => other.view === view)?.label.toLowerCase();
      canvas.setAttribute(
        "aria-label",
        name === undefined ? "Nothing to see yet" : `${name}, take ${take}, ${label} view`,
      );
      caption.textContent = takeOf(store.state)?.motion.name ?? "";
    },
  );
  player.onTime((time) => {
    stage.time = time;
  });
  stage.onScrub = (time) => player.hold(time);

  async function put(): Promise<void> {
    const { state } = store;
    const data = throwOf(state);
    const prop = propOf(state, data);
    const turn = ++wanted;
    if (!data || !prop || data.takes.length === 0) {
      const isComing = data && data.stamp === undefined && data.unheld.length === 0 && !state.data.error;
      if (!isComing) shown();
      return;
    }
    try {
      await stage.show(data, prop, (name) => files.get(name));
      if (turn !== wanted) return;
      standing = data;
      store.send({ type: "trouble" });
      await choose();
    } catch (error) {
      if (turn !== wanted) return;
      tell(error);
      shown();
    }
  }

  function tell(error: unknown): void {
    store.send({ type: "trouble", text: error instanceof Error ? error.message : String(error) });
  }

  async function choose(): Promise<void> {
    const { take, beside } = store.state;
    if (!standing || standing.name !== store.state.throwName) return;
    const at = (number?: number) => standing!.takes.findIndex(({ motion }) => motion.take === number);
    const [first, second] = [at(take), at(beside)];
    if (first < 0) return;
    await stage.select(first, second < 0 || second === first ? undefined : second);
    stage.time = player.time;
    afterPicture(shown);
  }

  return el("div", { class: "scene" }, canvas, caption, waiting);
}

/** A page that is not seen draws none. */
function afterPicture(then: () => void): void {
  if (document.hidden) then();
  else requestAnimationFrame(() => setTimeout(then, 0));
}
