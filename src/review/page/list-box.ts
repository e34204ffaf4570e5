/** A list of which one is chosen: one tab stop, arrows go along it, as the ARIA practices have it for a listbox. */

import { type Child, el, fill } from "./dom.js";

export interface Option<Key> {
  key: Key;
  /** What it shows: while these are the same nothing of it is made anew, so that no click falls between two. */
  of: readonly unknown[];
  /** Its text is what screen readers say. */
  content: () => Child[];
  classes?: string;
}

export interface ListBox<Key> {
  readonly element: HTMLElement;
  show(options: readonly Option<Key>[], chosen: Key | undefined): void;
  choose(chosen: Key | undefined): void;
  /** Its chosen option takes the focus. */
  focus(): void;
}

/** @param pick told of clicks and arrows; `second` where Shift or Ctrl was held */
export function listBox<Key extends string | number>(
  label: string,
  classes: string,
  pick: (key: Key, second: boolean) => void,
): ListBox<Key> {
  const element = el("div", { role: "listbox", "aria-label": label, class: classes, tabindex: 0 });
  const items = new Map<Key, { item: HTMLElement; of: readonly unknown[] }>();
  const itemOf = (key: Key | undefined) => (key === undefined ? undefined : items.get(key)?.item);
  let keys: Key[] = [];
  let current: Key | undefined;

  element.addEventListener("click", (event) => {
    const item = (event.target as Element).closest<HTMLElement>("[role=option]");
    const key = keys.find((other) => itemOf(other) === item);
    if (key === undefined) return;
    pick(key, event.shiftKey || event.ctrlKey || event.metaKey);
    focus();
  });
  element.addEventListener("keydown", (event) => {
    if (event.altKey || event.ctrlKey || event.metaKey || event.shiftKey) return;
    const at = current === undefined ? -1 : keys.indexOf(current);
    const to = target(event.key, at);
    if (to === undefined || keys.length === 0) return;
    event.preventDefault();
    event.stopPropagation();
    pick(keys[Math.max(0, Math.min(keys.length - 1, to))], false);
    focus();
  });

  /** Up and down go by a whole row where the options lie beside each other. */
  function target(pressed: string, at: number): number | undefined {
    const row = columns();
    switch (pressed) {
      case "ArrowRight":
        return at + 1;
      case "ArrowLeft":
        return at - 1;
      case "ArrowDown":
        return at + row;
      case "ArrowUp":
        return at - row;
      case "Home":
        return 0;
      case "End":
        return keys.length - 1;
    }
  }

  function columns(): number {
    const tops = keys.map((key) => itemOf(key)?.offsetTop);
    const count = tops.findIndex((top) => top !== tops[0]);
    return Math.max(1, count);
  }

  function mark(): void {
    for (const [key, { item }] of items) {
      item.setAttribute("aria-selected", String(key === current));
      item.tabIndex = key === current ? 0 : -1;
    }
    // Without a chosen option the list itself is the tab stop.
    element.tabIndex = current !== undefined && items.has(current) ? -1 : 0;
  }

  function focus(): void {
    const item = itemOf(current);
    (item ?? element).focus({ preventScroll: true });
    item?.scrollIntoView({ block: "nearest", inline: "nearest" });
  }

  return {
    element,
    show(options, chosen) {
      const hadFocus = element.contains(document.activeElement);
      const before = new Map(items);
      items.clear();
      keys = options.map(({ key }) => key);
      for (const option of options) {
        const known = before.get(option.key);
        const item = known?.item ?? el("div", { role: "option" });
        if (!known || !isSame(known.of, option.of)) {
          item.className = `option ${option.classes ?? ""}`;
          fill(item, ...option.content());
        }
        items.set(option.key, { item, of: option.of });
      }
      const elements = keys.map((key) => itemOf(key) as HTMLElement);
      if (!isSame(elements, [...element.children])) fill(element, ...elements);
      current = chosen;
      mark();
      if (hadFocus) focus();
    },
    choose(chosen) {
      if (chosen === current) return;
      current = chosen;
      mark();
      itemOf(chosen)?.scrollIntoView({ block: "nearest", inline: "nearest" });
    },
    focus,
  };
}

const isSame = (a: readonly unknown[], b: readonly unknown[]): boolean =>
  a.length === b.length && a.every((value, i) => Object.is(value, b[i]));
