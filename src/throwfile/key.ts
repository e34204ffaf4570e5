/** Keys of the grammar as zod schemas made of forms. */

import * as z from "zod";
import type { Form, Tell } from "./form.js";

/** A value of a form. Faults travel as `params` of custom issues. */
export const leaf = <T>(form: Form<T>, description: string) =>
  z
    .any()
    .transform((value, context): T => {
      const tell: Tell = (fault, remedy, ...path) =>
        context.addIssue({ code: "custom", message: fault, params: { remedy }, path });
      if (value === undefined) tell("this key is missing", form.expects);
      return (value === undefined ? undefined : form.read(value, tell)) as T;
    })
    .meta({ description, ...form.json });

/** A map of known keys; for a fault of the map itself the message is the keys known. */
export const keys = <S extends z.ZodRawShape>(shape: S, description: string) =>
  z
    .strictObject(shape, {
      error: (issue) =>
        issue.code === "unrecognized_keys" || issue.code === "invalid_type"
          ? Object.keys(shape).join(" ")
          : undefined,
    })
    .meta({ description });

export const optional = <T>(form: Form<T>, description: string) => leaf(form, description).optional();

/** A key with a default that the JSON Schema tells too. */
export const defaulting = <T>(form: Form<T>, value: T, description: string) =>
  leaf(form, description).default(value as never);
