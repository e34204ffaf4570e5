/** The page's keys: one list that is both shown and acted on. */

import type { App } from "./app.js";
import { cuesOf, nextCue } from "./cues.js";
import { LAYERS, VIEWS } from "./scene-tools.js";
import { SLOWNESS, stepTake, stepThrow, takeOf } from "./state.js";
import { giveVerdict, keepBeside } from "./verdict-bar.js";

/** What a key does that lies outside the state. */
export interface Hands {
  copy(): void;
  showKeys(): void;
}

export interface Key {
  /** Values of `KeyboardEvent.key`, letters small. */
  keys: readonly string[];
  shift?: boolean;
  /** As it is written on the key. */
  label: string;
  does: string;
  group: "Takes" | "Time" | "Picture" | "Page";
  run(app: App, hands: Hands): void;
}

const DEGREES = 10;
const NEARER = 1.25;

const letter = (key: string, group: Key["group"], does: string, run: Key["run"]): Key => ({
  keys: [key],
  label: key.toUpperCase(),
  does,
  group,
  run,
});

const turning = (key: string, label: string, does: string, right: number, up: number): Key => ({
  keys: [key],
  shift: true,
  label: `Shift ${label}`,
  does,
  group: "Picture",
  run: ({ stage }) => stage.turn(right * DEGREES, up * DEGREES),
});

export const KEYS: readonly Key[] = [
  letter("n", "Takes", "next take of the list", (app) => toTake(app, 1)),
  letter("p", "Takes", "take before", (app) => toTake(app, -1)),
  {
    keys: ["n"],
    shift: true,
    label: "Shift N",
    does: "next throw",
    group: "Takes",
    run: (app) => toThrow(app, 1),
  },
  {
    keys: ["p"],
    shift: true,
    label: "Shift P",
    does: "throw before",
    group: "Takes",
    run: (app) => toThrow(app, -1),
  },
  letter("a", "Takes", "accept the take, or take that back", (app) => giveVerdict(app, "accepted")),
  letter("r", "Takes", "reject the take, or take that back", (app) => giveVerdict(app, "rejected")),
  letter("b", "Takes", "keep the take beside the next ones, or stop", (app) => keepBeside(app)),
  letter("y", "Takes", "copy the list of takes", (_, hands) => hands.copy()),
  { keys: [" "], label: "Space", does: "play or pause", group: "Time", run: ({ player }) => player.toggle() },
  {
    keys: ["ArrowRight"],
    label: "→",
    does: "one frame ahead",
    group: "Time",
    run: ({ player }) => player.step(1),
  },
  {
    keys: ["ArrowLeft"],
    label: "←",
    does: "one frame back",
    group: "Time",
    run: ({ player }) => player.step(-1),
  },
  { keys: ["]"], label: "]", does: "next cue", group: "Time", run: (app) => toCue(app, 1) },
  { keys: ["["], label: "[", does: "cue before", group: "Time", run: (app) => toCue(app, -1) },
  letter("s", "Time", "slower; after the slowest at full speed", ({ store }) => {
    const at = SLOWNESS.indexOf(store.state.slow);
    store.send({ type: "slow", by: SLOWNESS[(at + 1) % SLOWNESS.length] });
  }),
  letter("l", "Time", "looped or once", ({ store }) => store.send({ type: "loop", on: !store.state.loop })),
  ...VIEWS.map(
    ({ view, label }, i): Key => ({
      keys: [String(i + 1)],
      label: String(i + 1),
      does: `${label.toLowerCase()} view`,
      group: "Picture",
      run: ({ store }) => store.send({ type: "view", view }),
    }),
  ),
  turning("ArrowRight", "→", "camera to the right", 1, 0),
  turning("ArrowLeft", "←", "camera to the left", -1, 0),
  turning("ArrowUp", "↑", "camera up", 0, 1),
  turning("ArrowDown", "↓", "camera down", 0, -1),
  { keys: ["+", "="], label: "+", does: "nearer", group: "Picture", run: ({ stage }) => stage.zoom(NEARER) },
  {
    keys: ["-"],
    label: "−",
    does: "further off",
    group: "Picture",
    run: ({ stage }) => stage.zoom(1 / NEARER),
  },
  letter("v", "Picture", "camera as it was", ({ stage }) => stage.resetView()),
  ...LAYERS.map(
    ({ layer, label }, i): Key =>
      letter("othwgf"[i], "Picture", `${label.toLowerCase()} on or off`, ({ store }) =>
        store.send({ type: "layer", layer, on: !store.state.layers[layer] }),
      ),
  ),
  { keys: ["?"], label: "?", does: "these keys", group: "Page", run: (_, hands) => hands.showKeys() },
];

/** What a pressed key stands for; nothing while it belongs to the element that has the focus. */
export function keyFor(event: KeyboardEvent, letters: boolean): Key | undefined {
  if (event.altKey || event.ctrlKey || event.metaKey || event.isComposing) return undefined;
  const pressed = event.key.length === 1 ? event.key.toLowerCase() : event.key;
  if (isOwn(event.target as Element | null, pressed)) return undefined;
  const isCharacter = pressed.length === 1 && pressed !== " ";
  if (isCharacter && !letters) return undefined;
  const isLetter = /^[a-z]$/.test(pressed) || pressed.startsWith("Arrow");
  // Where a sign needs Shift is the keyboard's matter.
  return KEYS.find(
    ({ keys, shift = false }) => keys.includes(pressed) && (!isLetter || shift === event.shiftKey),
  );
}

/** Fields take all keys, buttons and boxes the space bar, what has a choice of its own the arrows. */
function isOwn(target: Element | null, pressed: string): boolean {
  if (!target) return false;
  if (target.closest("dialog")) return true;
  if (target.matches("select, textarea, input:not([type=checkbox], [type=radio], [type=range], [readonly])"))
    return true;
  if (pressed === " " || pressed === "Enter")
    return target.matches("button, a, summary, input, [role=option]");
  return pressed.startsWith("Arrow") && target.matches("input[type=radio], input[readonly]");
}

function toTake({ store, say }: App, by: number): void {
  const take = stepTake(store.state, by);
  if (take === undefined || take === store.state.take) return;
  store.send({ type: "take", take });
  say(`take ${take}`);
}

function toThrow({ store, say }: App, by: number): void {
  const name = stepThrow(store.state, by);
  if (name === undefined || name === store.state.throwName) return;
  store.send({ type: "throw", name });
  say(name);
}

function toCue({ store, player, say }: App, direction: 1 | -1): void {
  const take = takeOf(store.state);
  const cue = take && nextCue(cuesOf(take.motion), player.time, direction);
  if (!cue) return;
  player.hold(cue.time);
  say(cue.text);
}
