/** What the process answers its caller with. */
export const ExitCode = {
  done: 0,
  /** Done, but a check failed. */
  checkFailed: 1,
  /** Usage, throw file or model. */
  wrongRequest: 2,
  /** No fault of the request: a folder that cannot be written, a full disk, or a fault of this program's own. */
  machine: 3,
  interrupted: 130,
} as const;
