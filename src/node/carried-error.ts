/** Errors of ours on their way between threads, which keep nothing of an error but its message. */

import { ModelError } from "../gltf/model.js";
import { RequestError } from "../math/request-error.js";
import { ThrowFileError } from "../throwfile/errors.js";
import { MachineError } from "./machine-error.js";

/** Of the class's constructor. */
export interface CarriedError {
  kind: "request" | "throw file" | "model" | "machine";
  arguments: unknown[];
}

/** Undefined for an error that nobody foresaw: it is left to be what it is. */
export function carried(error: unknown): CarriedError | undefined {
  if (error instanceof RequestError)
    return { kind: "request", arguments: [error.path, error.fault, error.remedy] };
  if (error instanceof ThrowFileError)
    return { kind: "throw file", arguments: [error.file, error.faults, error.more] };
  if (error instanceof ModelError)
    return { kind: "model", arguments: [error.model, error.fault, error.hint] };
  if (error instanceof MachineError) return { kind: "machine", arguments: [error.message, error.isFull] };
  return undefined;
}

export function revived({ kind, arguments: given }: CarriedError): Error {
  switch (kind) {
    case "request":
      return new RequestError(...(given as ConstructorParameters<typeof RequestError>));
    case "throw file":
      return new ThrowFileError(...(given as ConstructorParameters<typeof ThrowFileError>));
    case "model":
      return new ModelError(...(given as ConstructorParameters<typeof ModelError>));
    case "machine":
      return new MachineError(...(given as ConstructorParameters<typeof MachineError>));
  }
}
