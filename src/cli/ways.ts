import { Command } from "commander";
import { type ListedWay, type TakeWays, throwWays } from "../bake/ways.js";
import type { WrittenSpin } from "../bake/written-spin.js";
import { openThrowFile } from "../node/throw-file.js";
import { formatRecord } from "../record/format.js";
import { ExitCode } from "./exit-code.js";
import { progress } from "./progress.js";
import { table } from "./table.js";
import { takeRange } from "./take-range.js";

interface Options {
  only: string;
  takes?: [number, number];
  json?: boolean;
}

export const waysCommand = (answer: (code: number) => void) =>
  new Command("ways")
    .description(
      "list the ways a throw's prop can get from its release pose to its arrival pose, and the spin to write for each",
    )
    .argument("<throwfile>", "what is thrown and how (YAML or JSON)")
    .requiredOption("--only <name>", "the throw; it has an arrive.facing")
    .option("--takes <a-b>", "these takes alone, such as 3-7", takeRange)
    .option("--json", "print everything as JSON")
    .addHelpText(
      "after",
      `
Each line is a way: turns about the angular momentum, shares of the turning
about the axes long, middle and short, speed of the centre of mass and turns a
second at release, and by how much the pose is missed. The starred way is what
the throw file gets now. A way with a dash is one that no spin gets: others are
nearer to whatever could be written. Where arrive.facing fixes one direction
alone there are endlessly many ways; some near the wish are listed.

Example:
  tossbake ways quay.throws.yaml --only spanner-caught --takes 1-1`,
    )
    .action(async (path: string, { only, takes, json }: Options) => {
      const { file, models } = await openThrowFile(path);
      const shown = progress();
      const list = await throwWays(file, models, only, { takes, onTake: shown.update }).finally(shown.end);
      const unit = file.host && file.host.unit !== 1 ? "speed units/s" : "speed m/s";
      process.stdout.write(
        json
          ? formatRecord({ throw: only, takes: list.map(facts) })
          : `${list.map((take) => describe(only, take, unit)).join("\n\n")}\n`,
      );
      if (list.some(({ unheld }) => unheld)) answer(ExitCode.checkFailed);
    });

const facts = ({ unheld, ...take }: TakeWays) => ({ ...take, unheld: unheld ? unheld.message : null });

function describe(name: string, take: TakeWays, unit: string): string {
  const { ways, duration, isEvery, family, leastTurns, mostTurns, warnings, unheld } = take;
  const extent = isEvery
    ? `the ${ways.length} ways of ${leastTurns} to ${mostTurns} turns`
    : family === undefined
      ? `${ways.length} of the ways, near the wish: one direction leaves the roll free`
      : `${ways.length} of the ways of ${leastTurns} to ${mostTurns} turns: the end pose is a case of its own (${family}), whose ways may come in continua`;
  const head = ["", "turns", "long", "middle", "short", unit, "spin /s", "miss °", "spin to write"];
  return [
    `${name}, take ${take.take}, ${duration.toFixed(3)} s: ${extent}`,
    ...(unheld ? [`limits: ${unheld.message}`] : []),
    ...warnings,
    table(
      head,
      ways.map((way, i) => row(way, i + 1)),
    ),
  ].join("\n");
}

const row = (way: ListedWay, number: number): string[] => [
  `${number}${way.taken ? " *" : "  "}`,
  way.turns.toFixed(3),
  ...way.share.map((share) => share.toFixed(2)),
  way.speed.toFixed(2),
  way.rate.toFixed(2),
  ((way.miss * 180) / Math.PI).toExponential(0),
  spinText(way.spin),
];

function spinText(spin: WrittenSpin | null): string {
  if (!spin) return "–";
  const { axis, turns, rate } = spin;
  const parts = [
    axis === undefined ? [] : `axis: ${typeof axis === "string" ? axis : `[${axis.map(short).join(", ")}]`}`,
    turns === undefined ? [] : `turns: ${short(turns)}`,
    rate === undefined ? [] : `rate: ${short(rate)}`,
  ].flat();
  return parts.length === 0 ? "no spin" : `{ ${parts.join(", ")} }`;
}

const short = (value: number) => String(Number(value.toPrecision(4)));
