/**
 * `npm run bench`: all tables, or those that are named, e.g. `npm run bench -- clips vary`. Ratios within one run are
 * what counts; times are this machine's.
 */

import { table } from "../../src/cli/table.js";
import { againstEngine } from "./against-engine.js";
import { againstOdeSolver } from "./against-ode-solver.js";
import { againstPipeline } from "./against-pipeline.js";
import { aiming } from "./aiming.js";
import { batch } from "./batch.js";
import { evenness } from "./evenness.js";
import { keys } from "./keys.js";
import { bakeForTable, manyTakes } from "./many-takes.js";
import { outlines } from "./outlines.js";
import { sheets } from "./sheets.js";
import { vary } from "./vary.js";
import { weighForTable, weighing } from "./weighing.js";

const SECTIONS = [
  againstOdeSolver,
  againstEngine,
  againstPipeline,
  keys,
  manyTakes,
  batch,
  vary,
  evenness,
  weighing,
  aiming,
  outlines,
  sheets,
];

const [first, ...rest] = process.argv.slice(2);
if (first === "--bake") await bakeForTable(Number(rest[0]));
else if (first === "--weigh") await weighForTable(rest[0]);
else await printTables(process.argv.slice(2).filter((name) => name !== "--all"));

async function printTables(names: readonly string[]): Promise<void> {
  for (const name of names)
    if (!SECTIONS.some((section) => section.name === name))
      throw new Error(
        `there is no table "${name}"; there are ${SECTIONS.map((section) => section.name).join(", ")}`,
      );
  for (const { name, about, run } of SECTIONS) {
    if (names.length > 0 && !names.includes(name)) continue;
    const { head, rows } = await run();
    process.stdout.write(`\n${name}\n${about}\n\n${table(head, rows)}\n`);
  }
}
