import { createScanner } from "jsonc-parser";
import { CLOSE_BRACE, CLOSE_BRACKET, COMMA, OPEN_BRACE, OPEN_BRACKET } from "./json-tokens.js";

/** A member of an object or an item of a list, by its places in the text. */
export interface Part {
  key: string | number;
  /** Where the member starts: at its key, or the item itself. */
  start: number;
  /** Where its value starts and ends. */
  from: number;
  to: number;
}

/**
 * The parts of the object or list that starts at `offset` of a valid JSON text, and where it ends. One level only: what is
 * inside them is passed over, so that a large model's lists cost neither memory nor depth.
 */
export function outline(text: string, offset: number): { parts: Part[]; end: number } {
  const scanner = createScanner(text, true);
  scanner.setPosition(offset);
  const parts: Part[] = [];
  const list = scanner.scan() === OPEN_BRACKET;
  let token = scanner.scan();
  while (token !== CLOSE_BRACE && token !== CLOSE_BRACKET) {
    if (token === COMMA) token = scanner.scan();
    const start = scanner.getTokenOffset();
    let key: string | number = parts.length;
    if (!list) {
      key = scanner.getTokenValue();
      scanner.scan(); // the colon
      token = scanner.scan();
    }
    const from = scanner.getTokenOffset();
    for (let depth = 0; ; token = scanner.scan()) {
      if (token === OPEN_BRACE || token === OPEN_BRACKET) depth++;
      else if (token === CLOSE_BRACE || token === CLOSE_BRACKET) depth--;
      if (depth === 0) break;
    }
    parts.push({ key, start, from, to: scanner.getPosition() });
    token = scanner.scan();
  }
  return { parts, end: scanner.getPosition() };
}
