import { basename, extname } from "node:path";
import { Command, InvalidArgumentError } from "commander";
import { type LoadedProp, loadProps } from "../bake/props.js";
import { RequestError } from "../math/request-error.js";
import { length, type Vec3 } from "../math/vec3.js";
import { readModelFile } from "../node/model-files.js";
import { openThrowFile } from "../node/throw-file.js";
import { type AxisBehaviour, kindOf } from "../prop/kind.js";
import { weigh } from "../prop/prop.js";
import { formatRecord } from "../record/format.js";
import { propRecord } from "../record/record-of.js";

export const weighCommand = () =>
  new Command("weigh")
    .description(
      "mass, centre of mass, inertia and principal axes of each prop, and what a throw about each axis does",
    )
    .argument("<model|throwfile>", "a .glb or .gltf file, or a throw file: all its props")
    .option("--density <kg/m3>", "of a bare model (default 1000, water)", positiveNumber)
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

function positiveNumber(text: string): number {
  const value = Number(text);
  if (!(value > 0 && value < Number.POSITIVE_INFINITY))
    throw new InvalidArgumentError("It is a number above 0, in kg/m³.");
  return value;
}

const isModel = (path: string) => [".glb", ".gltf"].includes(extname(path).toLowerCase());

async function weighModel(path: string, density?: number): Promise<Map<string, LoadedProp>> {
  const { model, sha256 } = await readModelFile(path, path);
  const name = basename(path, extname(path));
  return new Map([[name, { prop: await weigh(name, model, { density }), model, source: path, sha256 }]]);
}

async function weighAll(path: string): Promise<Map<string, LoadedProp>> {
  const { file, models } = await openThrowFile(path);
  return loadProps(file, new Set(file.props.keys()), models);
}

const facts = (loaded: LoadedProp) => ({
  ...propRecord(loaded),
  size: loaded.prop.size,
  names: loaded.prop.names,
  ...kindOf(loaded.prop.principal.moments),
  points: loaded.prop.points,
});

function describe({ prop, source }: LoadedProp): string {
  const { kind, axes } = kindOf(prop.principal.moments);
  const fromOrigin = length(prop.centerOfMass) * 1000;
  const axisLine = (name: "long" | "middle" | "short", i: number) => [
    `${name} axis`,
    `${list(prop.names[name])}, ${short(prop.principal.moments[i])} kg m²: ${behaviour(axes[name])}`,
  ];
  const rows = [
    ["mass", `${short(prop.mass)} kg`],
    ["size", `${prop.size.map(short).join(" × ")} m; reaches ${short(prop.reach)} m from its centre of mass`],
    ["centre of mass", `${list(prop.centerOfMass)} m, ${short(fromOrigin)} mm from the model's origin`],
    ["kind of body", kind],
    axisLine("long", 0),
    axisLine("middle", 1),
    axisLine("short", 2),
    ...Object.entries(prop.points).map(([name, point]) => [`point ${name}`, `${list(point.position)} m`]),
    ...prop.warnings.map((text) => ["warning", text]),
  ];
  const width = Math.max(...rows.map(([title]) => title.length));
  return [
    `${prop.name}  ${source}`,
    ...rows.map(([title, text]) => `  ${title.padEnd(width)}  ${text}`),
  ].join("\n");
}

function behaviour(axis: AxisBehaviour): string {
  switch (axis.behaviour) {
    case "steady":
      return `a throw about it is steady; a small wobble goes round ${short(axis.wobblesPerTurn)} times a turn`;
    case "tumbles":
      return `a throw about it tumbles; a small wobble grows ${short(axis.growthPerTurn)} times a turn`;
    case "drifts":
      return "one of several equal axes: a throw about it is steady, but drifts round the odd one when it wobbles";
  }
}

const short = (value: number) => String(Number(value.toPrecision(4)));
const list = (v: Vec3) => `[${v.map((value) => (Math.abs(value) < 1e-9 ? 0 : short(value))).join(", ")}]`;
