/** Sheets of clips that lie in glTF files, whoever made them. */

import type { FlownPart, Motion, TakeMotion } from "../bake/take-motion.js";
import type { Model } from "../gltf/model.js";
import { conjugate, multiply } from "../math/quat.js";
import { distance } from "../math/vec3.js";
import { type ClipMotion, clipMotions } from "./clip-motion.js";
import { fileNames } from "./file-names.js";
import type { ThrowSheetInput } from "./sheet-input.js";
import { takesSheet } from "./takes-sheet.js";
import { throwSheet } from "./throw-sheet.js";

/** A file, and what is known of its clips besides. */
export interface ClipFile {
  model: Model;
  /** By name, what a record tells of its clips, if it can be used: these alone are shown. Default: all are. */
  known?: ReadonlyMap<string, KnownTake | undefined>;
}

export interface KnownTake {
  take: TakeMotion;
  turns: number;
}

export interface ClipSheets {
  /** CLIP.svg each, and of several clips takes.svg. */
  sheets: { name: string; content: string }[];
  /** What was passed over, why, and what is to be known of what is shown. */
  notes: string[];
}

/** Name of the sheet that holds all of them. */
const ALL = "takes";

/**
 * @param title of the sheet of all clips
 * @throws ModelError for a file whose keys or meshes cannot be read
 */
export async function clipSheets(title: string, files: readonly ClipFile[]): Promise<ClipSheets> {
  const notes = new Set<string>();
  const groups: ThrowSheetInput[] = [];
  for (const { model, known } of files) {
    const motions = (await clipMotions(model)).map((motion, i) => ({
      ...motion,
      name: motion.name || `animation ${i + 1}`,
    }));
    for (const motion of motions) {
      if (known && !known.has(motion.name)) continue;
      if ("reason" in motion) {
        notes.add(`${motion.name} is passed over: ${motion.reason}`);
        continue;
      }
      for (const note of notesOf(motion)) notes.add(note);
      groups.push(group(motion, known?.get(motion.name)));
    }
  }
  const names = fileNames(
    groups.map(({ title }) => title),
    "animation",
    [ALL],
  );
  const sheets = groups.map((input, i) => ({ name: `${names[i]}.svg`, content: throwSheet(input) }));
  if (groups.length > 1) sheets.push({ name: `${ALL}.svg`, content: takesSheet({ title, throws: groups }) });
  return { sheets, notes: [...notes] };
}

function group(
  { name, motion, flights, body: { prop } }: ClipMotion,
  known: KnownTake | undefined,
): ThrowSheetInput {
  if (!known) return { title: name, prop, takes: [{ name, motion, flights }] };
  const { take, turns } = known;
  const [{ start, launch }] = take.parts;
  // the piece's own axes may lie otherwise than the model's, and be weighed otherwise
  const axes = multiply(conjugate(motion.rotation(start)), launch.orientation);
  const shown = travels(motion) ? take : { ...take, parts: take.parts.map(turningAlone) };
  // the clip's own end is rounded to float32
  const whole = { ...motion, duration: take.duration };
  return {
    title: name,
    prop: { ...prop, axes, name: take.prop },
    takes: [{ name, motion: whole, take: shown, turns }],
  };
}

/** A clip may leave it to the game where a thing flies, though the record knows. */
const turningAlone = (part: FlownPart): FlownPart => ({ ...part, turnsAlone: true, apex: null });

const SAMPLES = 16;
/** m */
const IN_PLACE = 1e-6;

function travels({ centerOfMass, duration }: Motion): boolean {
  const first = centerOfMass(0);
  return Array.from({ length: SAMPLES }, (_, i) => centerOfMass((duration * (i + 1)) / SAMPLES)).some(
    (place) => distance(first, place) > IN_PLACE,
  );
}

function notesOf({ name, start, body: { prop, warnings } }: ClipMotion): string[] {
  return [
    ...(start > 0 ? [`${name} is shown from its first key on, at ${Number(start.toPrecision(6))} s`] : []),
    ...warnings.map((text) => (prop.name ? `${prop.name}: ${text}` : text)),
  ];
}
