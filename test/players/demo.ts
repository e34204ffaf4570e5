/** The demo, read and baked in memory. */

import { fileURLToPath } from "node:url";
import { bake } from "../../src/bake/bake.js";
import { loadProps } from "../../src/bake/props.js";
import { openThrowFile } from "../../src/node/throw-file.js";
import { recordOf } from "../../src/record/record-of.js";

export const DEMO = fileURLToPath(new URL("../../assets/quay.throws.yaml", import.meta.url));

export async function openDemo() {
  const opened = await openThrowFile(DEMO);
  const { file, models } = opened;
  return { ...opened, props: await loadProps(file, new Set(file.props.keys()), models) };
}

export async function bakeDemo() {
  const { file, text, models, props } = await openDemo();
  const baked = await bake(file, models);
  return {
    file,
    props,
    files: baked.files,
    record: await recordOf(file, text, baked),
  };
}
