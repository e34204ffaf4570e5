/** Accept or reject the take that is looked at, put another beside it, and take the list away. */

import type { App } from "./app.js";
import { el, fill } from "./dom.js";
import { takeOf, throwOf } from "./state.js";
import { oldVerdict, takesLine, type Verdict, verdictOf, wanted } from "./verdicts.js";

export function verdictBar(app: App): { element: HTMLElement; copy(): void } {
  const { store, say } = app;
  const which = el("strong", { class: "which" });
  const accept = verdictButton("accepted", "Accept", "✓");
  const reject = verdictButton("rejected", "Reject", "✕");
  const beside = el("button", {
    type: "button",
    title: "B",
    onclick: () => keepBeside(app),
  });
  const old = el("p", { class: "old" });
  const line = el("input", {
    type: "text",
    readonly: true,
    class: "line",
    "aria-label": "List for the throw file",
    onfocus: () => line.select(),
  });
  const copy = el("button", { type: "button", title: "Y", onclick: () => copyLine(line, say) }, "Copy list");
  const rule = el("p", { class: "rule" });
  const forget = el(
    "button",
    { type: "button", class: "quiet", onclick: () => store.send({ type: "clear" }) },
    "Clear",
  );

  function verdictButton(verdict: Verdict, label: string, sign: string): HTMLButtonElement {
    return el(
      "button",
      {
        type: "button",
        class: `verdict ${verdict}`,
        title: label[0],
        onclick: () => giveVerdict(app, verdict),
      },
      el("span", { "aria-hidden": "true" }, sign),
      label,
    );
  }

  store.watch(
    ({ data, throwName, take, beside: second, verdicts }) => [data, throwName, take, second, verdicts],
    () => {
      const { state } = store;
      const take = takeOf(state);
      const verdict = take && verdictOf(state.verdicts, take.motion);
      which.textContent = state.take === undefined ? "No take" : `Take ${state.take}`;
      for (const [button, own] of [
        [accept, "accepted"],
        [reject, "rejected"],
      ] as const) {
        button.disabled = !take;
        button.setAttribute("aria-pressed", String(verdict === own));
      }
      const past = take && oldVerdict(state.verdicts, take.motion);
      old.textContent = past ? `You ${past} it before its motion changed: decide again.` : "";
      old.hidden = !past;
      beside.disabled = !take;
      const isOn = state.beside !== undefined;
      beside.setAttribute("aria-pressed", String(isOn));
      fill(beside, isOn ? `Beside take ${state.beside}: stop` : "Keep beside");
      const motions = throwOf(state)?.takes.map(({ motion }) => motion) ?? [];
      const { takes, accepted, rejected } = wanted(state.verdicts, motions);
      line.value = takesLine(takes);
      line.size = Math.min(60, line.value.length + 1);
      copy.disabled = motions.length === 0;
      rule.textContent = ruleWords(accepted, rejected, motions.length);
      forget.hidden = accepted + rejected === 0;
    },
  );

  const element = el(
    "div",
    { class: "verdict-bar" },
    el("div", { class: "verdicts", role: "group", "aria-label": "This take" }, which, accept, reject, beside),
    old,
    el("div", { class: "list-line" }, line, copy, forget),
    rule,
  );
  return { element, copy: () => copyLine(line, say) };
}

const ruleWords = (accepted: number, rejected: number, all: number): string =>
  accepted > 0
    ? `The ${accepted} accepted of ${all}.`
    : rejected > 0
      ? `All but the ${rejected} rejected of ${all}.`
      : "All of them: nothing is decided yet.";

export function giveVerdict({ store, say }: App, verdict: Verdict): void {
  const before = takeOf(store.state);
  if (!before) return;
  store.send({ type: "verdict", verdict });
  say(`take ${before.motion.take} ${verdictOf(store.state.verdicts, before.motion) ?? "undecided again"}`);
}

/** The take stays while others are looked at; again, or with none other chosen, it goes. */
export function keepBeside({ store, say }: App): void {
  const { take, beside } = store.state;
  if (take === undefined) return;
  store.send({ type: "beside", take: beside === undefined ? take : undefined });
  say(beside === undefined ? `take ${take} stays beside: choose another one` : "one take alone");
}

/** Where the page may not write to the clipboard the text is left chosen for it. */
export async function copyLine(line: HTMLInputElement, say: (text: string) => void): Promise<void> {
  try {
    await navigator.clipboard.writeText(line.value);
    say(`copied: ${line.value}`);
  } catch {
    line.focus();
    line.select();
    say("The list is chosen: copy it with Ctrl+C or ⌘C.");
  }
}
