/** The preview page: puts its parts together and lets them follow the source. */

import { announcer } from "./announcer.js";
import type { App } from "./app.js";
import { banner } from "./banner.js";
import { type Child, el } from "./dom.js";
import { facts } from "./facts.js";
import { fetchedOnce } from "./files.js";
import { follow } from "./follow.js";
import { header } from "./header.js";
import { keyFor } from "./keys.js";
import { keysPanel } from "./keys-panel.js";
import { Player } from "./player.js";
import { scene } from "./scene.js";
import { sceneTools } from "./scene-tools.js";
import { openSource, type Source } from "./source.js";
import { Stage } from "./stage.js";
import { firstState, reduce } from "./state.js";
import { makeStore } from "./store.js";
import { lazyStrips } from "./strips.js";
import { takeList } from "./take-list.js";
import { takeTools } from "./take-tools.js";
import { throwList } from "./throw-list.js";
import { timeLine } from "./time-line.js";
import { transport } from "./transport.js";
import { verdictBar } from "./verdict-bar.js";
import { sessionShelf } from "./verdicts.js";

await open(openSource());

async function open(source: Source): Promise<void> {
  const data = await source.data();
  const shelf = sessionShelf(data.title);
  const still = matchMedia("(prefers-reduced-motion: reduce)").matches;
  const dark = matchMedia("(prefers-color-scheme: dark)");
  const store = makeStore(firstState(data, { playing: !still, verdicts: shelf.read() }), reduce);
  const canvas = el("canvas", { role: "img" });
  const stage = new Stage(canvas, { reducedMotion: still, dark: dark.matches });
  const files = fetchedOnce(source);
  const voice = announcer();
  const app: App = {
    store,
    stage,
    files,
    player: new Player(store),
    strips: lazyStrips(files),
    say: voice.say,
  };

  store.watch(
    ({ verdicts }) => [verdicts],
    (verdicts) => shelf.write(verdicts),
  );
  dark.addEventListener("change", () => stage.setDark(dark.matches));
  new ResizeObserver(() => stage.resize()).observe(canvas);
  build(app, canvas, voice.element, source);
  follow(app, source);
  expose(app);
}

function build(app: App, canvas: HTMLCanvasElement, voice: HTMLElement, source: Source): void {
  const keys = keysPanel(app);
  const verdicts = verdictBar(app);
  const numbers = facts(app);
  const time = timeLine(app);
  let isFirst = true;
  const drawn = () => {
    if (isFirst) source.drawn();
    isFirst = false;
    numbers.drawn();
    app.strips.start();
  };
  const root = document.getElementById("app") as HTMLElement;
  root.append(
    throwsBox(app),
    el(
      "section",
      { class: "stage-box", "aria-label": "The throw" },
      scene(app, canvas, drawn),
      time.element,
      el("div", { class: "tools" }, transport(app, time.now), sceneBox(app)),
    ),
    el(
      "section",
      { class: "takes-box", "aria-label": "Its takes" },
      takeTools(app),
      takeList(app),
      verdicts.element,
    ),
    numbers.element,
  );
  document.body.prepend(
    header(app, source.live, () => keys.showModal()),
    banner(app),
  );
  document.body.append(keys, voice);
  document.addEventListener("keydown", (event) => {
    const key = keyFor(event, app.store.state.letters);
    if (!key) return;
    event.preventDefault();
    key.run(app, { copy: verdicts.copy, showKeys: () => keys.showModal() });
  });
}

function throwsBox(app: App): HTMLElement {
  const chosen = el("span", { class: "chosen" });
  app.store.watch(
    ({ throwName }) => [throwName],
    (name) => {
      chosen.textContent = name ?? "";
    },
  );
  const box = foldable("throws-box", ["Throw: ", chosen], "(min-width: 1200px)");
  box.element.append(throwList(app, box.fold));
  return box.element;
}

function sceneBox(app: App): HTMLElement {
  const { element } = foldable("scene-box", ["Camera and drawing"], "(min-width: 700px)");
  element.append(sceneTools(app));
  return element;
}

/** Where there is little room it is folded away, and again once a choice is made. */
function foldable(
  classes: string,
  title: Child[],
  roomy: string,
): { element: HTMLDetailsElement; fold(): void } {
  const room = matchMedia(roomy);
  const element = el("details", { class: classes }, el("summary", {}, ...title));
  const fold = () => {
    element.open = room.matches;
  };
  room.addEventListener("change", fold);
  fold();
  return { element, fold };
}

/** For tests and for the curious, to read. */
function expose({ stage, store, player }: App): void {
  const hook = {
    stage,
    get state() {
      return store.state;
    },
    get time() {
      return player.time;
    },
  };
  Object.defineProperty(window, "tossbake", { value: Object.freeze(hook) });
}
