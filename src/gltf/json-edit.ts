import { outline, type Part } from "./json-outline.js";

export type JsonPath = readonly (string | number)[];

/**
 * Changes to a JSON text that leave every other character as it was: numbers keep their literals, keys their order,
 * unknown members their place. Paths are those of the text as given; changes are put in all at once by `result`.
 */
export class JsonEdit {
  readonly #changes: { from: number; to: number; content: string }[] = [];
  readonly #outlines = new Map<number, ReturnType<typeof outline>>();
  readonly #start: number;

  /** `text` must hold a JSON object. */
  constructor(readonly text: string) {
    this.#start = text.indexOf("{");
  }

  /** Appends to the list under a key of the root, which is made where it is missing. */
  append(key: string, items: readonly unknown[]): void {
    if (items.length === 0) return;
    const list = this.#find([key]);
    if (list) this.#insert(list.from, items.map((item) => JSON.stringify(item)).join(","));
    else this.set([], key, items);
  }

  /** Sets a member of the object at `path`. */
  set(path: JsonPath, key: string, value: unknown): void {
    const found = this.#find([...path, key]);
    if (found) this.#change(found.from, found.to, JSON.stringify(value));
    else this.#insert(path.length === 0 ? this.#start : this.#find(path)!.from, members({ [key]: value }));
  }

  /** Puts other members in the place of one. */
  replace(path: JsonPath, key: string, by: Record<string, unknown>): void {
    const { start, to } = this.#find([...path, key])!;
    this.#change(start, to, members(by));
  }

  /** Takes away a member of an object that has others. */
  remove(path: JsonPath, key: string): void {
    const siblings = this.#outline(this.#find(path)!.from).parts;
    const i = siblings.findIndex((sibling) => sibling.key === key);
    if (i + 1 < siblings.length) this.#change(siblings[i].start, siblings[i + 1].start, "");
    else this.#change(siblings[i - 1].to, siblings[i].to, "");
  }

  /** The changed text, without white space after its end. */
  result(): string {
    let text = "";
    let at = 0;
    // The sort is stable: what was inserted first at a place comes first.
    for (const { from, to, content } of this.#changes.toSorted((a, b) => a.from - b.from)) {
      text += this.text.slice(at, from) + content;
      at = to;
    }
    return text + this.text.slice(at, this.#outline(this.#start).end);
  }

  #find(path: JsonPath): Part | undefined {
    let offset = this.#start;
    let part: Part | undefined;
    for (const key of path) {
      const { parts } = this.#outline(offset);
      part = typeof key === "number" ? parts[key] : parts.find((member) => member.key === key);
      if (!part) return undefined;
      offset = part.from;
    }
    return part;
  }

  #outline(offset: number): ReturnType<typeof outline> {
    let found = this.#outlines.get(offset);
    if (!found) {
      found = outline(this.text, offset);
      this.#outlines.set(offset, found);
    }
    return found;
  }

  /** Puts content at the end of the object or list that starts at `offset`. No empty one is ever added to twice. */
  #insert(offset: number, content: string): void {
    const last = this.#outline(offset).parts.at(-1);
    const place = last ? last.to : offset + 1;
    this.#change(place, place, last ? `,${content}` : content);
  }

  #change(from: number, to: number, content: string): void {
    this.#changes.push({ from, to, content });
  }
}

const members = (object: Record<string, unknown>): string => JSON.stringify(object).slice(1, -1);
