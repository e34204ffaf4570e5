import { bake } from "../../src/bake/bake.js";
import { readModel } from "../../src/gltf/read.js";
import { sheetInputs, sheetsInput } from "../../src/review/sheets.js";
import { takesSheet } from "../../src/review/takes-sheet.js";
import { throwSheet } from "../../src/review/throw-sheet.js";
import { openDemo, withThrow } from "./demo.js";
import { duration, type Section } from "./section.js";
import { ball } from "./weighing.js";

const TAKES = 64;
const THROWS = ["spanner-tumble", "lantern-to-deck", "quoit-to-peg"];

export const sheets: Section = {
  name: "sheets",
  about: `Pictures of ${TAKES} takes of one demo throw, from motions and model in memory: made ready is reading the prop's surface; then the throw's
sheet and the sheet of all takes, as a bake writes them. Processor time.`,
  async run() {
    const rows: string[][] = [];
    for (const name of THROWS) rows.push(await row(name));
    rows.push(await row("quoit-to-peg", ball()));
    return { head: ["throw", "triangles", "made ready", "its two sheets"], rows };
  },
};

/** @param other bytes of a model thrown instead of the demo's */
async function row(name: string, other?: Uint8Array): Promise<string[]> {
  const { file, models, throwOf } = await openDemo();
  const { entry, loaded } = throwOf(name);
  const baked = await bake(withThrow(file, entry, { takes: TAKES }), models, { only: [name] });
  const model = other ? await readModel("ball", other) : loaded.model;
  const data = sheetsInput(file, baked);
  const prop = { prop: baked.props.get(entry.prop)!.prop, model };
  const input = { ...data, props: new Map([[entry.prop, prop]]) };
  const [ready, [group]] = await timed(() => sheetInputs(input));
  const [both] = await timed(async () => [throwSheet(group), takesSheet({ title: name, throws: [group] })]);
  const triangles = group.prop.solid.triangles.length / 3;
  return [name, String(triangles), duration(ready), duration(both)];
}

async function timed<T>(run: () => Promise<T>): Promise<[number, T]> {
  const start = process.cpuUsage();
  const result = await run();
  const { user, system } = process.cpuUsage(start);
  return [(user + system) / 1e6, result];
}
