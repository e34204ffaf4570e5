/** The demo, read and baked in memory. */

import { fileURLToPath } from "node:url";
import { bake } from "../../src/bake/bake.js";
import { loadProps } from "../../src/bake/props.js";
import type { Flight } from "../../src/flight/flight.js";
import { openThrowFile } from "../../src/node/throw-file.js";
import { recordOf } from "../../src/record/record-of.js";

export const DEMO = fileURLToPath(new URL("../../assets/quay.throws.yaml", import.meta.url));

export async function openDemo() {
  const opened = await openThrowFile(DEMO);
  const { file, models } = opened;
  return { ...opened, props: await loadProps(file, new Set(file.props.keys()), models) };
}

/** Where a clip's motion is at a time of the clip: in which flight, and when in that; it stands still before and after. */
export type Moment = (t: number) => { flight: Flight; time: number };

export function momentOf(parts: readonly { flight: Flight; start: number }[]): Moment {
  return (t) => {
    const { flight, start } =
      parts.find((part) => t <= part.start + part.flight.duration) ?? parts[parts.length - 1];
    return { flight, time: Math.max(0, Math.min(flight.duration, t - start)) };
  };
}

export async function bakeDemo() {
  const { file, text, models, props } = await openDemo();
  const baked = await bake(file, models);
  const moments = new Map<string, Moment>();
  for (const { takes } of baked.throws)
    for (const { name, take } of takes)
      moments.set(name, momentOf([{ flight: take.flight, start: take.drawn.hold.before }]));
  for (const { takes } of baked.chains)
    for (const { name, parts } of takes)
      moments.set(name, momentOf(parts.map(({ take, start }) => ({ flight: take.flight, start }))));
  return {
    file,
    props,
    moments,
    files: baked.files,
    record: await recordOf(file, text, baked),
  };
}
