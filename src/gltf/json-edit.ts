import { findNodeAtLocation, type JSONPath, type Node, parseTree } from "jsonc-parser";

/**
 * Changes to a JSON text that leave every other character as it was: numbers keep their literals, keys their order,
 * unknown members their place. Paths are those of the text as given; changes are put in all at once by `result`.
 */
export class JsonEdit {
  readonly #root: Node;
  readonly #changes: { from: number; to: number; content: string }[] = [];
  readonly #grown = new Set<Node>();

  /** `text` must hold a JSON object. */
  constructor(readonly text: string) {
    this.#root = parseTree(text)!;
  }

  /** Appends to the list under a key of the root, which is made where it is missing. */
  append(key: string, items: readonly unknown[]): void {
    if (items.length === 0) return;
    const list = findNodeAtLocation(this.#root, [key]);
    if (list) this.#insert(list, items.map((item) => JSON.stringify(item)).join(","));
    else this.set([], key, items);
  }

  /** Sets a member of the object at `path`. */
  set(path: JSONPath, key: string, value: unknown): void {
    const found = findNodeAtLocation(this.#root, [...path, key]);
    if (found) this.#change(found.offset, end(found), JSON.stringify(value));
    else this.#insert(this.#find(path), members({ [key]: value }));
  }

  /** Puts other members in the place of one. */
  replace(path: JSONPath, key: string, by: Record<string, unknown>): void {
    const member = this.#find([...path, key]).parent!;
    this.#change(member.offset, end(member), members(by));
  }

  /** Takes away a member of an object that has others. */
  remove(path: JSONPath, key: string): void {
    const member = this.#find([...path, key]).parent!;
    const siblings = member.parent!.children!;
    const i = siblings.indexOf(member);
    if (i + 1 < siblings.length) this.#change(member.offset, siblings[i + 1].offset, "");
    else this.#change(end(siblings[i - 1]), end(member), "");
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
    return text + this.text.slice(at, end(this.#root));
  }

  #find(path: JSONPath): Node {
    return path.length === 0 ? this.#root : findNodeAtLocation(this.#root, path)!;
  }

  #insert(container: Node, content: string): void {
    const last = container.children!.at(-1);
    const place = last ? end(last) : container.offset + 1;
    this.#change(place, place, last || this.#grown.has(container) ? `,${content}` : content);
    this.#grown.add(container);
  }

  #change(from: number, to: number, content: string): void {
    this.#changes.push({ from, to, content });
  }
}

const end = (node: Node): number => node.offset + node.length;

const members = (object: Record<string, unknown>): string => JSON.stringify(object).slice(1, -1);
