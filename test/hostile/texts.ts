/** Throw files changed as text, by their words, as trees and as bytes. */

import { parse, stringify } from "yaml";
import type { Chance } from "./chance.js";
import { mutateTree } from "./trees.js";
import { anyValue, otherNumber } from "./values.js";

const NOISE =
  "{ } [ ] : , - ? # & * ! | > ' \" % @ ` ~ .. ± +- f <<: *a &a !!int --- ... \\ \t \n \r \u0000 \ufeff \u2028 \ud800 💥".split(
    " ",
  );

export function mutateText(text: string, others: readonly string[], chance: Chance): string {
  const way = chance.below(10);
  if (way < 2) return asText(text, others, chance);
  if (way < 4) return asWords(text, chance);
  if (way < 9) return asTree(text, chance, way < 8 ? 0.15 : 0.7);
  return asBytes(text, chance);
}

function asText(text: string, others: readonly string[], chance: Chance): string {
  let changed = text;
  for (let count = chance.few(4); count > 0; count--) {
    const [at, length] = [chance.below(changed.length + 1), chance.few(200)];
    const other = chance.pick([changed, chance.pick(others)]);
    const from = chance.below(other.length);
    const piece = chance.pick([
      "",
      "",
      chance.pick(NOISE),
      chance.pick(NOISE).repeat(chance.few(300)),
      other.slice(from, from + chance.few(400)),
    ]);
    changed =
      changed.slice(0, at) + piece + changed.slice(at + (chance.below(2) === 0 ? 0 : Math.min(length, 60)));
  }
  const lines = changed.split("\n");
  const line = chance.below(lines.length);
  const way = chance.below(8);
  if (way === 0) lines.splice(line, 1);
  else if (way === 1) lines.splice(chance.below(lines.length), 0, lines[line]);
  else if (way === 2) lines[line] = " ".repeat(chance.below(6)) + lines[line];
  else if (way === 3) lines[line] = lines[line].trimStart();
  else if (way === 4) lines.length = line;
  return lines.join("\n");
}

function asWords(text: string, chance: Chance): string {
  const words = text.match(/[\w.±+-]+|\s+|[^\w\s]/g) ?? [];
  for (let count = chance.few(4); count > 0; count--) {
    const at = chance.below(words.length);
    const word = words[at] ?? "";
    const way = chance.below(6);
    if (/\d/.test(word) && way > 1)
      words[at] = word.replace(/-?[\d.]+(?:e[+-]?\d+)?/, (number) =>
        String(otherNumber(chance, Number(number) || 1)),
      );
    else if (way === 0) words.splice(at, 1);
    else if (way === 1) words.splice(chance.below(words.length), 0, word);
    else if (way === 2) {
      const value = anyValue(chance);
      words[at] = typeof value === "string" ? value : JSON.stringify(value);
    } else words[at] = chance.pick(words);
  }
  return words.join("");
}

function asTree(text: string, chance: Chance, harsh: number): string {
  const tree = parse(text);
  mutateTree(tree, chance, harsh);
  return chance.below(4) === 0 ? stringify(tree) : JSON.stringify(tree);
}

function asBytes(text: string, chance: Chance): string {
  const bytes = new TextEncoder().encode(text);
  for (let count = chance.few(20); count > 0; count--)
    bytes[chance.below(bytes.length)] ^= 1 << chance.below(8);
  return new TextDecoder().decode(bytes);
}
