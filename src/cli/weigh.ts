import { basename, extname } from "node:path";
import { Command } from "commander";
import { type LoadedProp, loadProps } from "../bake/props.js";
import { RequestError } from "../math/request-error.js";
import { length, type Vec3 } from "../math/vec3.js";
import { readModelFile } from "../node/model-files.js";
import { openThrowFile } from "../node/throw-file.js";
import { type AxisBehaviour, kindOf, WOBBLE_DEGREES } from "../prop/kind.js";
import { nearestModelAxis } from "../prop/model-axis.js";
import { weigh } from "../prop/prop.js";
import { formatRecord } from "../record/format.js";
import { propRecord } from "../record/record-of.js";
import { positiveNumber } from "./positive-number.js";

export const weighCommand = () =>
  new Command("weigh")
    .description(
      "mass, centre of mass, inertia and principal axes of each prop, and what a throw about each axis does",
    )
    .argument("<model|throwfile>", "a .glb or .gltf file, or a throw file: all its props")
    .option("--density <kg/m3>", "of a bare model (default 1000, water)", positiveNumber("kg/m³"))
    .option("--json", "print everything as JSON")
    .addHelpText(
      "after",
      "\nExamples:\n  tossbake weigh props/spanner.glb --density 7850\n  tossbake weigh quay.throws.yaml",
    )
    .action(async (path: string, options: { density?: number; json?: boolean }) => {
      if (options.density !== undefined && !isModel(path))
        throw new RequestError(
          ["--density"],
          `${path} is a throw file`,
          "densities stand there, under props.NAME.density",
        );
      const props = isModel(path) ? await weighModel(path, options.density) : await weighAll(path);
      process.stdout.write(
        options.json
          ? formatRecord({
              props: Object.fromEntries(Array.from(props, ([name, loaded]) => [name, facts(loaded)])),
            })
          : `${Array.from(props.values(), describe).join("\n\n")}\n`,
      );
    });

const isModel = (path: string) => [".glb", ".gltf"].includes(extname(path).toLowerCase());

async function weighModel(path: string, density?: number): Promise<Map<string, LoadedProp>> {
  const { model, sha256 } = await readModelFile(path, path);
  const name = basename(path, extname(path));
  try {
    return new Map([[name, { prop: await weigh(name, model, { density }), model, source: path, sha256 }]]);
  } catch (error) {
    if (!(error instanceof RequestError) || error.path[0] !== "model") throw error;
    throw new RequestError([path], error.fault, error.remedy);
  }
}

async function weighAll(path: string): Promise<Map<string, LoadedProp>> {
  const { file, models } = await openThrowFile(path);
  return loadProps(file, new Set(file.props.keys()), models);
}

const AXES = ["long", "middle", "short"] as const;

const facts = (loaded: LoadedProp) => {
  const { prop } = loaded;
  return {
    ...propRecord(loaded),
    size: prop.size,
    fromOrigin: length(prop.centerOfMass),
    names: prop.names,
    modelAxes: Object.fromEntries(AXES.map((name) => [name, nearestModelAxis(prop.names[name])])),
    wobbleDegrees: WOBBLE_DEGREES,
    ...kindOf(prop.principal.moments),
    points: prop.points,
  };
};

function describe({ prop, source }: LoadedProp): string {
  const { kind, axes } = kindOf(prop.principal.moments);
  const fromOrigin = length(prop.centerOfMass) * 1000;
  const rows = [
    ["mass", `${short(prop.mass)} kg`],
    ["size", `${prop.size.map(short).join(" × ")} m; reaches ${short(prop.reach)} m from its centre of mass`],
    ["centre of mass", `${list(prop.centerOfMass)} m, ${short(fromOrigin)} mm from the model's origin`],
    ["kind of body", kind],
    ...AXES.flatMap((name, i) => [
      [
        `${name} axis`,
        `${list(prop.names[name])}, ${alongModel(prop.names[name])}, ${short(prop.principal.moments[i])} kg m²`,
      ],
      ["", `a throw about it ${behaviour(axes[name])}`],
    ]),
    ...Object.entries(prop.points).map(([name, point]) => [`point ${name}`, `${list(point.position)} m`]),
    ...prop.warnings.map((text) => ["warning", text]),
  ];
  const width = Math.max(...rows.map(([title]) => title.length));
  return [
    `${prop.name}  ${source}`,
    ...rows.map(([title, text]) => `  ${title.padEnd(width)}  ${text}`),
  ].join("\n");
}

function alongModel(direction: Vec3): string {
  const { axis, degrees } = nearestModelAxis(direction);
  return degrees < 0.05 ? `the model's ${axis}` : `${degrees.toFixed(1)}° off the model's ${axis}`;
}

function behaviour(axis: AxisBehaviour): string {
  const wobble = `a wobble of ${WOBBLE_DEGREES}°`;
  switch (axis.behaviour) {
    case "steady":
      return `is steady: a small wobble goes round ${short(axis.wobblesPerTurn)} times a turn, one of ${WOBBLE_DEGREES}° ${short(axis.wobblesPerTurnAtWobble)} times`;
    case "tumbles":
      return `tumbles: a small wobble grows ${short(axis.growthPerTurn)} times a turn; with ${wobble} it ${turning(axis)}`;
    case "leans":
      return `is steady without a wobble only: ${wobble} leans the spin to the ${axis.turnsRound} axis, and it ${turning(axis)}`;
    case "drifts":
      return `drifts: with ${wobble} it ${turning(axis)}`;
  }
}

function turning({ turnsPerFlip, turnsRound }: Exclude<AxisBehaviour, { behaviour: "steady" }>): string {
  return turnsPerFlip < 0.5
    ? `rolls round the ${turnsRound} axis ${short(1 / (2 * turnsPerFlip))} times a turn`
    : `turns over every ${short(turnsPerFlip)} turns, round the ${turnsRound} axis`;
}

const short = (value: number) => String(Number(value.toPrecision(4)));
const list = (v: Vec3) => `[${v.map((value) => (Math.abs(value) < 1e-9 ? 0 : short(value))).join(", ")}]`;
