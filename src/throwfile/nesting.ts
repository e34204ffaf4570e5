/**
 * How deep a YAML text is nested, found without recursion. The parser recurses: 100,000 brackets would exhaust the
 * stack, and an engine may abort where it is nearly exhausted, so such a text must not reach it.
 */

import { Lexer } from "yaml";

/**
 * The offset at which `text` is nested deeper than `most`, else undefined. Counts open brackets and the columns at
 * which something still open began: a block inside another starts further right, save a list in a map, so the
 * parser's depth is at most twice that.
 */
export function tooDeep(text: string, most: number): number | undefined {
  const columns: number[] = [];
  let brackets = 0;
  let offset = 0;
  let lineStart = 0;
  let opens = true; // the next token may begin a block: first on its line, or after an indicator
  for (const token of new Lexer().lex(text)) {
    if (token === "\u0002" || token === "\u0018" || token === "\u001f") continue; // the lexer's own marks, no text
    if (/^[\r\n]/.test(token)) opens = true;
    else if (brackets > 0 || !/^(?:[ \t#]|$)/.test(token)) {
      if (opens && brackets === 0) {
        const column = offset - lineStart;
        while (columns.length > 0 && columns[columns.length - 1] > column) columns.pop();
        if (columns[columns.length - 1] !== column) columns.push(column);
      }
      if (token === "[" || token === "{") brackets++;
      else if ((token === "]" || token === "}") && brackets > 0) brackets--;
      opens = /^(?:[-?:]|[&!].*)$/.test(token);
      if (brackets + columns.length > most) return offset;
    }
    offset += token.length;
    const newline = token.lastIndexOf("\n");
    if (newline >= 0) lineStart = offset - (token.length - newline - 1);
  }
  return undefined;
}
