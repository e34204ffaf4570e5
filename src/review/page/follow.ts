/** Lets the page follow what its source has to say. */

import type { App } from "./app.js";
import { newsWords } from "./banner.js";
import type { Source } from "./source.js";
import { throwOf } from "./state.js";

/** ms without anything new: throws are baked one after the other. */
const QUIET = 1500;

export function follow({ store, files, strips, say }: App, source: Source): void {
  if (!source.live) return;
  let asking = false;
  let again = false;

  async function ask(): Promise<void> {
    again = true;
    if (asking) return;
    asking = true;
    while (again) {
      again = false;
      await take().catch(() => undefined);
    }
    asking = false;
  }

  async function take(): Promise<void> {
    const before = store.state.data;
    const after = await source.data(store.state.throwName);
    const stamps = new Map(before.throws.map(({ name, stamp }) => [name, stamp]));
    const changed = after.throws.filter(({ name, stamp }) => stamp !== stamps.get(name));
    files.forget(changed.flatMap(({ takes }) => takes.map(({ file }) => file)));
    if (changed.some(({ name }) => stamps.get(name) !== undefined)) strips.forget();
    const news = newsWords(before, after);
    store.send({ type: "data", data: after });
    if (news) tell(news);
  }

  let later: number | undefined;
  function tell({ text, urgent }: { text: string; urgent: boolean }): void {
    clearTimeout(later);
    if (urgent) say(text);
    else later = window.setTimeout(() => say(text), QUIET);
  }

  source.onChange(ask);
  source.onConnection((connected) => {
    store.send({ type: "connected", on: connected });
    // what changed between the first asking and now was told to nobody
    if (connected) ask();
  });
  // The server bakes what is looked at first.
  store.watch(
    (state) => [throwOf(state)],
    (shown) => {
      if (shown && shown.stamp === undefined) ask();
    },
  );
  // and so was what changed before anybody listened
  ask();
}
