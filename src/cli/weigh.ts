import { basename, dirname, extname } from "node:path";
import { Command } from "commander";
import { type LoadedProp, loadProps } from "../bake/props.js";
import { RequestError } from "../math/request-error.js";
import { length, type Vec3 } from "../math/vec3.js";
import { readModelFile } from "../node/model-files.js";
import { writeFiles } from "../node/output-folder.js";
import { spareInputs } from "../node/spare-inputs.js";
import { openThrowFile } from "../node/throw-file.js";
import { kindOf, WOBBLE_DEGREES } from "../prop/kind.js";
import { nearestModelAxis } from "../prop/model-axis.js";
import { weigh } from "../prop/prop.js";
import { formatRecord } from "../record/format.js";
import { propRecord } from "../record/record-of.js";
import { throwAbout } from "../review/axis-words.js";
import { solidOf } from "../review/outline.js";
import { type WeighSheetProp, weighSheet } from "../review/weigh-sheet.js";
import { positiveNumber } from "./positive-number.js";

export const weighCommand = () =>
  new Command("weigh")
    .description(
      "mass, centre of mass, inertia and principal axes of each prop, and what a throw about each axis does",
    )
    .argument("<model|throwfile>", "a .glb or .gltf file, or a throw file: all its props")
    .option("--density <kg/m3>", "of a bare model (default 1000, water)", positiveNumber("kg/m³"))
    .option("--sheet <file>", "draw each prop with its axes too, into one SVG file")
    .option("--json", "print everything as JSON")
    .addHelpText(
      "after",
      "\nExamples:\n  tossbake weigh props/spanner.glb --density 7850\n  tossbake weigh quay.throws.yaml --sheet props.svg",
    )
    .action(async (path: string, options: { density?: number; sheet?: string; json?: boolean }) => {
      if (options.density !== undefined && !isModel(path))
        throw new RequestError(
          ["--density"],
          `${path} is a throw file`,
          "densities stand there, under props.NAME.density",
        );
      const { props, inputs } = isModel(path)
        ? await weighModel(path, options.density)
        : await weighAll(path);
      if (options.sheet !== undefined) await writeSheet(options.sheet, path, props, inputs);
      process.stdout.write(
        options.json
          ? formatRecord({
              props: Object.fromEntries(Array.from(props, ([name, loaded]) => [name, facts(loaded)])),
            })
          : `${Array.from(props.values(), describe).join("\n\n")}\n`,
      );
    });

const isModel = (path: string) => [".glb", ".gltf"].includes(extname(path).toLowerCase());

interface Weighed {
  props: Map<string, LoadedProp>;
  /** Paths of the files that were read. */
  inputs: Iterable<string>;
}

async function weighModel(path: string, density?: number): Promise<Weighed> {
  const { model, sha256, paths } = await readModelFile(path, path);
  const name = basename(path, extname(path));
  try {
    const prop = await weigh(name, model, { density });
    return { props: new Map([[name, { prop, model, source: path, sha256 }]]), inputs: paths };
  } catch (error) {
    if (!(error instanceof RequestError) || error.path[0] !== "model") throw error;
    throw new RequestError([path], error.fault, error.remedy);
  }
}

async function weighAll(path: string): Promise<Weighed> {
  const { file, models, inputs } = await openThrowFile(path);
  return { props: await loadProps(file, new Set(file.props.keys()), models), inputs };
}

async function writeSheet(
  output: string,
  path: string,
  props: Map<string, LoadedProp>,
  inputs: Iterable<string>,
): Promise<void> {
  const [folder, name] = [dirname(output), basename(output)];
  await spareInputs(folder, [name], inputs);
  const shown: WeighSheetProp[] = [];
  for (const { prop, model } of props.values()) shown.push({ prop, solid: await solidOf(model, prop) });
  await writeFiles(folder, [
    { name, content: weighSheet(isModel(path) ? basename(path) : `Props of ${basename(path)}`, shown) },
  ]);
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
  const place = (v: Vec3) => list(v, prop.reach);
  const [fromOrigin] = withoutRounding([length(prop.centerOfMass)], prop.reach);
  const rows = [
    ["mass", `${short(prop.mass)} kg`],
    ["size", `${prop.size.map(short).join(" × ")} m; reaches ${short(prop.reach)} m from its centre of mass`],
    [
      "centre of mass",
      `${place(prop.centerOfMass)} m, ${short(fromOrigin * 1000)} mm from the model's origin`,
    ],
    ["kind of body", kind],
    ...AXES.flatMap((name, i) => [
      [
        `${name} axis`,
        `${list(prop.names[name], 1)}, ${alongModel(prop.names[name])}, ${short(prop.principal.moments[i])} kg m²`,
      ],
      ["", `a throw about it ${throwAbout(axes[name])}`],
    ]),
    ...Object.entries(prop.points).map(([name, point]) => [`point ${name}`, `${place(point.position)} m`]),
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

const short = (value: number) => String(Number(value.toPrecision(4)));

/** Of the size of what is measured: below the last digit that is printed of it, and above what rounding of stored places makes. */
const ROUNDING = 1e-5;

const withoutRounding = (values: readonly number[], size: number): number[] =>
  values.map((value) => (Math.abs(value) < ROUNDING * size ? 0 : value));

const list = (v: Vec3, size: number) => `[${withoutRounding(v, size).map(short).join(", ")}]`;
