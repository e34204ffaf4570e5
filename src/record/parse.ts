/** takes.json read back and checked. */

import { z } from "zod";
import { RequestError } from "../math/request-error.js";
import type { TakesRecord } from "./clip-record.js";

const number = z.number();
const vector = z.tuple([number, number, number]);
const quaternion = z.tuple([number, number, number, number]);
const state = z.looseObject({
  centerOfMass: vector,
  rotation: quaternion,
  velocity: vector.nullable(),
  angularVelocity: vector,
});

const prop = z.looseObject({
  source: z.string(),
  sha256: z.string(),
  mass: number,
  volume: number,
  centerOfMass: vector,
  inertia: z.tuple([vector, vector, vector]),
  principal: z.object({ moments: vector, axes: quaternion }),
  reach: number,
  warnings: z.array(z.string()),
});

const part = z.looseObject({
  throw: z.string(),
  start: number,
  time: number,
  turns: number,
  release: state,
  arrival: state,
});

const clipKeys = z.looseObject({
  name: z.string(),
  throw: z.string(),
  take: number,
  prop: z.string(),
  file: z.string(),
  duration: number,
  turns: number,
  share: vector,
  apex: z.object({ time: number, rise: number }).nullable(),
  release: state,
  arrival: state,
  miss: z.object({ position: number.nullable(), angle: number.nullable() }),
  tolerance: number,
  error: number,
  keys: z.object({ translation: number, rotation: number }),
  bytes: number,
  candidate: number.optional(),
  draws: z.record(z.string(), z.unknown()),
  flight: z.object({ start: number, time: number }).optional(),
  parts: z.array(part).min(1).optional(),
  nearest: z.object({ take: number, distance: number }).nullable(),
});

const clip = clipKeys
  .refine(({ flight, parts }) => flight !== undefined || parts !== undefined, {
    path: ["flight"],
    message: "neither flight nor parts",
  })
  .refine(({ candidate, parts }) => candidate !== undefined || parts !== undefined, {
    path: ["candidate"],
    message: "Invalid input: expected number, received undefined",
  });

const record = z.looseObject({
  format: z.literal(1),
  tossbake: z.string(),
  throwFile: z.object({ name: z.string(), sha256: z.string() }),
  props: z.record(z.string(), prop),
  clips: z.array(clip),
});

/**
 * @param path of the file, for messages
 * @throws RequestError naming the first thing that is not as a bake writes it
 */
export function parseRecord(path: string, text: string): TakesRecord {
  let json: unknown;
  try {
    json = JSON.parse(text);
  } catch (error) {
    throw new RequestError(
      [path],
      `is not JSON (${onOneLine((error as Error).message)})`,
      "bake again, or restore it from version control",
    );
  }
  const parsed = record.safeParse(json);
  // as it stands, not as it was checked: members that this version does not know are kept
  if (parsed.success) return json as TakesRecord;
  const issue = parsed.error.issues[0];
  throw new RequestError(
    [path],
    `${issue.path.join(".") || "the whole"}: ${issue.message}`,
    "bake again, or restore it from version control",
  );
}

/** The parser quotes the text it stumbled over, line ends and all. */
const onOneLine = (message: string): string => message.replace(/\s+/g, " ");
