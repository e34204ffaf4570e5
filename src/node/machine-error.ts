/** The machine, not the request, is at fault: a folder that cannot be written, a full disk. Exit code 3. */
export class MachineError extends Error {
  override name = "MachineError";

  constructor(
    message: string,
    /** Whether more room is all it takes. */
    readonly isFull = false,
  ) {
    super(message);
  }
}
