import type { YAMLError } from "yaml";

/** The parser's complaint in plain words. */
export function syntaxFault(error: YAMLError): { fault: string; remedy: string } {
  switch (error.code) {
    case "TAB_AS_INDENT":
      return { fault: "a tab as indentation", remedy: "indent with spaces" };
    case "MISSING_CHAR":
      return /quote/.test(error.message)
        ? { fault: "a quote that is never closed", remedy: "close it" }
        : {
            fault: "something is missing here",
            remedy: "a key is followed by a colon and a space, list items in brackets by a comma",
          };
    case "BAD_INDENT":
      return /Flow/.test(error.message)
        ? {
            fault: "a bracket opened before is not closed here",
            remedy: "close it with the ] or } that belongs to it",
          }
        : { fault: "the indentation fits nothing above", remedy: "keys of one map start in the same column" };
    case "BLOCK_AS_IMPLICIT_KEY":
      return {
        fault: "a second colon within one value, or a key indented too far",
        remedy: "put each key on a line of its own, level with its neighbours",
      };
    case "MULTILINE_IMPLICIT_KEY":
      return {
        fault: "a key over several lines",
        remedy: "is a colon missing after the key on the first of them?",
      };
    case "BLOCK_IN_FLOW":
      return { fault: "keys without a comma between", remedy: "put commas between what stands in braces" };
    case "MULTIPLE_DOCS":
      return { fault: "a second document begins", remedy: "one throw file is one document; remove the ---" };
    case "BAD_SCALAR_START":
      return { fault: "a value that starts with a reserved sign", remedy: "put the value in quotes" };
    case "BAD_DQ_ESCAPE":
      return {
        fault: "an unknown escape after a backslash",
        remedy: "write \\\\ for a backslash, or use single quotes",
      };
    case "TAG_RESOLVE_FAILED":
      return {
        fault: "a tag (a word after !) that means nothing here",
        remedy: "leave it out, or put the value in quotes",
      };
    case "DUPLICATE_KEY":
      return { fault: "a key written twice", remedy: "keep one of the two" };
    default:
      return {
        fault: `not YAML (${error.message.replace(/\s+/g, " ")})`,
        remedy: "mend it, or put the value in quotes",
      };
  }
}
