/** Where the page has its data from: the server that it was opened from, or itself. */

import { DATA_ID, FILE_CLASS, FILE_NAME } from "../embedded.js";
import type { PageData } from "../page-data.js";

export interface Source {
  /** There is a server, and what it says may change. */
  readonly live: boolean;
  /** @param looking the throw that is being looked at: a server bakes it before the others */
  data(looking?: string): Promise<PageData>;
  /** A whole .glb by the name that `PageTake.file` gives. */
  file(name: string): Promise<ArrayBuffer>;
  /** Tells the server that the first picture is drawn: until then it leaves the machine to the page. */
  drawn(): void;
  /** Told when `data()` would say something new. */
  onChange(listener: () => void): void;
  /** Told when the server goes, and when it is there again. */
  onConnection(listener: (connected: boolean) => void): void;
}

/** The page as one file holds its data; the page from a server does not. */
export const openSource = (): Source =>
  document.getElementById(DATA_ID) ? embeddedSource() : serverSource();

/** Speaks to the server of `tossbake preview`. */
export function serverSource(): Source {
  const events = new EventSource("events");
  return {
    live: true,
    async data(looking) {
      const query = looking === undefined ? "" : `?throw=${encodeURIComponent(looking)}`;
      return (await fetched(`data.json${query}`)).json();
    },
    file: async (name) => (await fetched(`files/${encodeURIComponent(name)}`)).arrayBuffer(),
    drawn: () => void fetched("drawn").catch(() => undefined),
    onChange: (listener) => events.addEventListener("change", () => listener()),
    onConnection(listener) {
      events.addEventListener("open", () => listener(true));
      events.addEventListener("error", () => listener(false));
    },
  };
}

async function fetched(url: string): Promise<Response> {
  const response = await fetch(url, { cache: "no-store" });
  if (!response.ok) throw new Error(`${url}: ${response.status} ${await response.text()}`);
  return response;
}

/** Reads what `one-page.ts` put into the page. */
export function embeddedSource(): Source {
  const data: PageData = JSON.parse(document.getElementById(DATA_ID)?.textContent ?? "null");
  return {
    live: false,
    data: async () => data,
    async file(name) {
      const elements = document.getElementsByClassName(FILE_CLASS);
      const element = Array.from(elements).find((other) => other.getAttribute(FILE_NAME) === name);
      if (!element) throw new Error(`${name} is not in this page`);
      const text = atob(element.textContent ?? "");
      return Uint8Array.from(text, (character) => character.charCodeAt(0)).buffer;
    },
    drawn: () => undefined,
    onChange: () => undefined,
    onConnection: () => undefined,
  };
}
