/** What the preview page is told of a bake: plain data, lengths in metres in glTF's world unless said otherwise. */

import type { Bake } from "../bake/bake.js";
import { takeNote } from "../bake/bake-take.js";
import { clipName, fileName } from "../bake/files.js";
import { chainMotion, type TakeMotion, takeMotion } from "../bake/take-motion.js";
import type { Quat } from "../math/quat.js";
import { rounded } from "../math/rounded.js";
import type { Vec3 } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { ClipRecord, TakesRecord } from "../record/clip-record.js";
import { VERSION } from "../record/version.js";
import { type Host, type ThrowEntry, type ThrowFile, takeNumbers } from "../throwfile/types.js";
import { type SpinWords, spinWords } from "./spin-words.js";

export interface PageData {
  /** The throw file's name, or the baked folder's. */
  title: string;
  /** Of tossbake. */
  version: string;
  /** Frames per second. */
  frameRate: number;
  /** In whose coordinates the records' places and velocities are; none: glTF's. */
  host?: Host;
  /** Why what is shown is older than the throw file. */
  error?: PageError;
  props: Record<string, PageProp>;
  /** In the throw file's order, chains last. */
  throws: PageThrow[];
}

export interface PageError {
  /** Ready to be shown; lines parted by line ends. */
  message: string;
  /** Of the first fault in the throw file, from 1. */
  line?: number;
  column?: number;
}

/** The model's scene frame. */
export interface PageProp {
  name: string;
  /** kg */
  mass: number;
  centerOfMass: Vec3;
  /** Turns x, y, z onto the axes long, middle and short. */
  axes: Quat;
  /** About those, kg m². */
  moments: Vec3;
  /** Of the furthest point from the centre of mass. */
  reach: number;
  /** Bounding box; none where only a record is known. */
  size?: Vec3;
  /** Of that box. */
  middle?: Vec3;
  points: Record<string, Vec3>;
  warnings: string[];
}

export interface PageThrow {
  name: string;
  isChain: boolean;
  /** Name of its prop; none while nothing of it is baked. */
  prop?: string;
  /** What it was baked of: another one is another motion. None: not baked yet, takes will come. */
  stamp?: string;
  takes: PageTake[];
  /** Takes that were left out: the clip that would have been, and why. */
  unheld: { name: string; reason: string }[];
  /** As the throw file has it, in words. */
  spin?: SpinWords;
}

export interface PageTake {
  motion: TakeMotion;
  record: ClipRecord;
  /** Name of the .glb that `Source.file` hands over. */
  file: string;
  /** Name of the animation in it. */
  clip: string;
  /** What is to be known of it, in words; none where only a record is known. */
  warnings?: readonly string[];
}

/** Takes of a throw that a page shows; more are for machines to go through. */
const MOST_TAKES = 500;

/**
 * The throw file as it is baked for the page: one .glb for each throw, with its mesh, whatever files are asked for, and of very many takes the
 * first ones.
 */
export const shownFile = (file: ThrowFile): ThrowFile => ({
  ...file,
  bake: { ...file.bake, files: "per-throw", container: "glb", mesh: true },
  throws: new Map(
    Array.from(file.throws, ([name, entry]) => [
      name,
      { ...entry, takes: takeNumbers(entry.takes).slice(0, MOST_TAKES) },
    ]),
  ),
});

/** Everything of a whole bake, that of `file` or of its `shownFile`. */
export const pageData = (file: ThrowFile, bake: Bake, record: TakesRecord): PageData => ({
  ...pageHead(file),
  props: pageProps(bake),
  throws: pageThrows(file, bake, record).map((shown) => ({ ...shown, stamp: record.throwFile.sha256 })),
});

/** What is known of a throw file that cannot be read yet. */
export const emptyPage = (title: string): PageData => ({
  title,
  version: VERSION,
  frameRate: 30,
  props: {},
  throws: [],
});

/** What is known before anything is baked. */
export function pageHead(file: ThrowFile): PageData {
  const entries = [...file.throws.values(), ...file.chains.values()];
  return {
    ...emptyPage(file.name.replace(/^.*[\\/]/, "")),
    frameRate: file.frameRate,
    ...(file.host && { host: file.host }),
    throws: entries.map((entry) => ({
      name: entry.name,
      isChain: "throws" in entry,
      takes: [],
      unheld: [],
      ...("spin" in entry && entry.spin && { spin: spinWords(entry.spin) }),
    })),
  };
}

export const pageProps = ({ props }: Pick<Bake, "props">): PageData["props"] =>
  Object.fromEntries(Array.from(props, ([name, { prop }]) => [name, rounded(pageProp(prop))]));

const pageProp = (prop: Prop): PageProp => ({
  name: prop.name,
  mass: prop.mass,
  centerOfMass: prop.centerOfMass,
  axes: prop.principal.axes,
  moments: prop.principal.moments,
  reach: prop.reach,
  size: prop.size,
  middle: middleOf(prop.extremes),
  points: Object.fromEntries(Object.entries(prop.points).map(([name, { position }]) => [name, position])),
  warnings: [...prop.warnings],
});

function middleOf(points: Float64Array): Vec3 {
  const along = (axis: number): number => {
    let [low, high] = [points[axis], points[axis]];
    for (let i = axis; i < points.length; i += 3) {
      low = Math.min(low, points[i]);
      high = Math.max(high, points[i]);
    }
    return (low + high) / 2;
  };
  return [along(0), along(1), along(2)];
}

/**
 * The throws and chains that were baked, those of which every take was left out too, without their stamps; records say where the throw file has its
 * clips.
 */
export function pageThrows(file: ThrowFile, bake: Bake, record: TakesRecord): PageThrow[] {
  const records = new Map(record.clips.map((clip) => [clip.name, clip]));
  const motions = motionsOf(file, bake);
  const warnings = new Map(
    bake.throws.flatMap(({ takes }) => takes.map((take) => [take.name, takeNote(take).warnings])),
  );
  const unheld = new Map(bake.unheld.map(({ name, reason }) => [name, reason.message]));
  return pageHead(file).throws.flatMap((shown) => {
    const { prop, clips } = expected(file, shown);
    const takes = clips.flatMap((clip): PageTake[] => {
      const [motion, found] = [motions.get(clip), records.get(clip)];
      if (!motion || !found) return [];
      const record = { ...rounded(found), file: fileName(file, found.throw, clip) };
      const warned = warnings.get(clip) ?? [];
      return [{ motion, record, file: found.file, clip, ...(warned.length > 0 && { warnings: warned }) }];
    });
    const left = clips.flatMap((name) => {
      const reason = unheld.get(name);
      return reason === undefined ? [] : [{ name, reason }];
    });
    if (takes.length + left.length > 0 && clips.length > MOST_TAKES)
      left.push({
        name: `${clips[MOST_TAKES]} and those after it`,
        reason: `a page shows the first ${MOST_TAKES} takes of a throw`,
      });
    return takes.length + left.length === 0 ? [] : [{ ...shown, prop, takes, unheld: left }];
  });
}

function motionsOf(file: ThrowFile, { throws, chains }: Bake): Map<string, TakeMotion> {
  const flown = throws.flatMap((baked) => baked.takes.map((take) => takeMotion(file, baked, take)));
  const chained = chains.flatMap((baked) => baked.takes.map((take) => chainMotion(file, baked, take)));
  return new Map([...flown, ...chained].map((motion) => [motion.name, motion]));
}

/** The clips that a throw or chain should have, by their names. */
function expected(file: ThrowFile, { name, isChain }: PageThrow): { prop: string; clips: string[] } {
  const first = isChain ? file.chains.get(name)?.throws[0] : name;
  const { prop, takes } = file.throws.get(first as string) as ThrowEntry;
  return { prop, clips: takeNumbers(takes).map((number) => clipName({ name }, number)) };
}
