import { ThrowFileError } from "../../src/throwfile/errors.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";

/** What is wrong with a text, none where it parses. */
export function errorOf(text: string): ThrowFileError | undefined {
  try {
    parseThrowFile("quay.throws.yaml", text);
    return undefined;
  } catch (error) {
    if (error instanceof ThrowFileError) return error;
    throw error;
  }
}

/** The faults but for keys that are only not there yet. */
export const faultsOf = (text: string) =>
  (errorOf(text)?.faults ?? []).filter((f) => !f.fault.startsWith("not there yet"));

/** A text with `»` where the fault is expected → the text without it, and its line and column. */
export function marked(text: string): { text: string; line: number; column: number } {
  const offset = text.indexOf("»");
  if (offset < 0 || text.indexOf("»", offset + 1) >= 0) throw new Error(`needs one » : ${text}`);
  const before = text.slice(0, offset).split("\n");
  return {
    text: text.replace("»", ""),
    line: before.length,
    column: before[before.length - 1].length + 1,
  };
}
