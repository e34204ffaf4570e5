/**
 * What the core throws when a request cannot be met: which key, what is wrong with it, what would be right. Lives in the
 * room furthest up so that every room can throw it; `src/throwfile` turns the key's path into line and column.
 */
export class RequestError extends Error {
  override name = "RequestError";

  constructor(
    /** Keys from the throw inwards, e.g. ["arc", "speed"]; whoever knows more of the way puts it in front. */
    readonly path: readonly (string | number)[],
    /** What is wrong, with the value found: "a speed of 3 m/s cannot reach the mark". */
    readonly fault: string,
    /** What would be right: "needs at least 7.4 m/s". */
    readonly remedy: string,
  ) {
    super(`${path.join(".")}: ${fault}; ${remedy}`);
  }

  /** The same, told by somebody who knows more of the way to the key. */
  under(...keys: readonly (string | number)[]): RequestError {
    return new RequestError([...keys, ...this.path], this.fault, this.remedy);
  }
}
