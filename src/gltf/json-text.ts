import { createScanner } from "jsonc-parser";
import {
  CLOSE_BRACE,
  CLOSE_BRACKET,
  COLON,
  COMMA,
  END,
  OPEN_BRACE,
  OPEN_BRACKET,
  STRING,
} from "./json-tokens.js";
import { ModelError } from "./model.js";

/** Nesting beyond this is refused: no model needs it, and whatever recurses over the value later has a bounded stack. */
const GREATEST_NESTING = 200;
/** 256 MB of JSON: a large model with its data inside. */
const GREATEST_LENGTH = 1 << 28;
/** Members and items in all: about those of seven thousand nodes, each with a mesh and accessors of its own. */
const GREATEST_VALUES = 500_000;

/**
 * Parses the JSON of a model, UTF-8, into an object. Throws ModelError for what is not JSON, is nested too deeply, holds too
 * many values, or names a key twice in one object (glTF 2.0, 2.7.1: names must be unique; which of them counts differs between readers).
 */
export function parseJson(
  model: string,
  bytes: Uint8Array,
): { text: string; value: Record<string, unknown> } {
  if (bytes.length > GREATEST_LENGTH)
    throw new ModelError(model, `its JSON has ${bytes.length} bytes`, `at most ${GREATEST_LENGTH} are read`);
  let text: string;
  let value: unknown;
  try {
    text = new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch (cause) {
    throw new ModelError(model, "its JSON is not UTF-8", "is it a .glb or .gltf file?", { cause });
  }
  checkTokens(model, text);
  try {
    value = JSON.parse(text);
  } catch (cause) {
    throw new ModelError(
      model,
      `it is not JSON (${(cause as Error).message})`,
      "is it a .glb or .gltf file?",
      { cause },
    );
  }
  if (typeof value !== "object" || value === null || Array.isArray(value))
    throw new ModelError(model, "its JSON is not an object", "a glTF file is one object");
  return { text, value: value as Record<string, unknown> };
}

/** Goes through the text once, without recursion. Text that is not JSON is left for the parser to complain of. */
function checkTokens(model: string, text: string): void {
  const scanner = createScanner(text, true);
  const keys: (Set<string> | undefined)[] = []; // of the objects we are in; undefined for arrays
  let word = "";
  let values = 0;
  for (let token = scanner.scan(); token !== END; token = scanner.scan()) {
    if (token === OPEN_BRACE) keys.push(new Set());
    else if (token === OPEN_BRACKET) keys.push(undefined);
    else if (token === CLOSE_BRACE || token === CLOSE_BRACKET) keys.pop();
    else if (token === STRING) word = scanner.getTokenValue();
    else if (token === COLON) {
      const seen = keys.at(-1);
      if (seen?.has(word))
        throw new ModelError(
          model,
          `its JSON has the key "${word}" twice in one object (line ${scanner.getTokenStartLine() + 1})`,
          "keys must be unique",
        );
      seen?.add(word);
    } else if (token === COMMA) values++;
    if (keys.length > GREATEST_NESTING)
      throw new ModelError(
        model,
        `its JSON is nested more than ${GREATEST_NESTING} deep (line ${scanner.getTokenStartLine() + 1})`,
        "no glTF file needs that",
      );
    if (values > GREATEST_VALUES)
      throw new ModelError(
        model,
        `its JSON holds more than ${GREATEST_VALUES} values (line ${scanner.getTokenStartLine() + 1})`,
        "no prop needs that: use a simpler model",
      );
  }
}
