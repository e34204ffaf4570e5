/** What a shard's record must be like before anything follows it: it may come from another machine, and names files that are copied. */

import { z } from "zod";

const number = z.number();
const vector = z.tuple([number, number, number]);
const quaternion = z.tuple([number, number, number, number]);
const span = z.object({ index: z.int().min(1), of: z.int().min(1) });

/** A file beside the record, and none elsewhere. */
const file = z.string().regex(/^[A-Za-z0-9][\w-]*\.(glb|gltf)$/);

const head = z.looseObject({
  shard: span,
  record: z.looseObject({
    tossbake: z.string(),
    throwFile: z.looseObject({}),
    props: z.record(z.string(), z.looseObject({ source: z.string(), sha256: z.string(), mass: number })),
  }),
  entries: z.array(
    z.looseObject({
      name: z.string(),
      prop: z.string(),
      reach: number,
      throws: z.array(z.string()).optional(),
    }),
  ),
});

const launch = z.looseObject({
  centerOfMass: vector,
  velocity: vector,
  gravity: vector,
  orientation: quaternion,
  spin: vector,
  moments: vector,
  duration: number,
});

const line = z.union([
  z.object({ end: number }),
  z.looseObject({ of: z.string(), left: z.looseObject({ name: z.string(), reason: z.string() }) }),
  z.looseObject({
    of: z.string(),
    figures: z.looseObject({
      name: z.string(),
      take: z.int().min(1),
      file,
      duration: number,
      turns: number,
      keys: z.object({ translation: number, rotation: number }),
      bytes: number,
      error: number,
      miss: z.object({ position: number.nullable(), angle: number.nullable() }),
    }),
    note: z.looseObject({
      name: z.string(),
      take: number,
      greatestRate: number,
      warnings: z.array(z.string()),
    }),
    compared: z.looseObject({
      course: z.looseObject({
        duration: number,
        parts: z.array(z.looseObject({ start: number, launch })).min(1),
      }),
    }),
    text: z.string(),
  }),
]);

export const isShardHead = (value: unknown): boolean => head.safeParse(value).success;

export const isShardLine = (value: unknown): boolean => line.safeParse(value).success;
