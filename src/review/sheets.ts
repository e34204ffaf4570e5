/** The sheets of a bake, from plain data that may have crossed threads. */

import type { Bake } from "../bake/bake.js";
import { chainMotion, motionOf, type TakeMotion, takeMotion } from "../bake/take-motion.js";
import type { Model } from "../gltf/model.js";
import type { Prop } from "../prop/prop.js";
import type { ThrowFile } from "../throwfile/types.js";
import { solidOf } from "./outline.js";
import { type SheetProp, type SheetTake, sheetProp, type ThrowSheetInput } from "./sheet-input.js";
import { takesSheet } from "./takes-sheet.js";
import { throwSheet } from "./throw-sheet.js";

export interface SheetsInput {
  /** Of the takes' sheet: the throw file's name. */
  title: string;
  props: ReadonlyMap<string, { prop: Prop; model: Model }>;
  /** In the throw file's order, chains after the throws; each with at least one take. */
  throws: readonly {
    name: string;
    prop: string;
    takes: readonly { motion: TakeMotion; turns?: number }[];
    /** How many there are in all, where these are but the first of them. */
    takeCount?: number;
  }[];
}

export interface NamedSheet {
  /** "THROW.svg" or "takes.svg" */
  name: string;
  /** SVG, UTF-8. */
  content: string;
}

/** A sheet for each throw and chain, of the first take that is given, and one of all takes; the same text for the same data. */
export async function sheetsOf(input: SheetsInput): Promise<NamedSheet[]> {
  const groups = await sheetInputs(input);
  if (groups.length === 0) return [];
  return [
    ...groups.map((group) => ({ name: `${group.title}.svg`, content: throwSheet(group) })),
    { name: "takes.svg", content: takesSheet({ title: input.title, throws: groups }) },
  ];
}

/** Of a whole bake. */
export const sheetsInput = (
  file: ThrowFile,
  { props, throws, chains }: Pick<Bake, "props" | "throws" | "chains">,
): SheetsInput => ({
  title: file.name.replace(/^.*[\\/]/, ""),
  props,
  throws: [
    ...throws.map((baked) => ({
      name: baked.entry.name,
      prop: baked.entry.prop,
      takes: baked.takes.map((take) => ({ motion: takeMotion(file, baked, take) })),
    })),
    ...chains.map((baked) => ({
      name: baked.entry.name,
      prop: baked.prop,
      takes: baked.takes.map((take) => ({ motion: chainMotion(file, baked, take) })),
    })),
  ],
});

/** What the sheets are drawn from; each prop's surface is read once. */
export async function sheetInputs({ props, throws }: SheetsInput): Promise<ThrowSheetInput[]> {
  const ready = new Map<string, SheetProp>();
  for (const [name, { prop, model }] of props) ready.set(name, sheetProp(prop, await solidOf(model, prop)));
  return throws.map(({ name, prop, takes, takeCount }) => {
    const own = ready.get(prop) as SheetProp;
    return {
      title: name,
      prop: own,
      takeCount,
      takes: takes.map(
        ({ motion, turns }): SheetTake => ({
          name: motion.name,
          motion: motionOf(motion, own.axes),
          take: motion,
          turns,
        }),
      ),
    };
  });
}
