/** Pictures of what drifted between two bakes, from their records and what their files hold. */

import { motionOf } from "../bake/take-motion.js";
import { conjugate, multiply } from "../math/quat.js";
import type { ClipRecord, PropRecord, TakesRecord } from "../record/clip-record.js";
import type { Drift } from "../record/compare.js";
import { hostChange } from "../record/compare-host.js";
import { worldClip } from "../record/world-clip.js";
import type { Host } from "../throwfile/types.js";
import type { DriftSide } from "./drift-layers.js";
import type { DriftShape, DriftShapes } from "./drift-shapes.js";
import { driftSheet } from "./drift-sheet.js";
import { fileNames } from "./file-names.js";
import { motionOfRecord } from "./page-of-record.js";

/** One of the two bakes. */
export interface DriftSource {
  /** As the sheets call it. */
  name: string;
  record: TakesRecord;
  shapes: DriftShapes;
}

export interface DriftSheets {
  sheets: { name: string; content: string }[];
  /** What was left out, and why. */
  notes: string[];
}

/** More pictures than these nobody looks through. */
const MOST_SHEETS = 40;

/** Values of which a change is one of the motion. */
const MOTION = /^(duration|turns|release|arrival|apex|flight|parts|prop)(\.|$)/;

/**
 * A sheet for each take whose motion drifted, of those that drifted furthest; in the order of the drifts.
 *
 * @param host whose coordinates both records are in
 */
export async function driftSheets(
  drifts: readonly Drift[],
  before: DriftSource,
  now: DriftSource,
  host?: Host,
): Promise<DriftSheets> {
  const notes: string[] = [];
  const takes = drifts.filter(({ kind }) => kind === "take");
  const moved = takes.filter(({ changes = [] }) => changes.some(({ key }) => MOTION.test(key)));
  const shown = furthest(moved);
  if (moved.length < takes.length)
    notes.push(`${takes.length - moved.length} drifted in no motion: not drawn`);
  if (shown.length < moved.length)
    notes.push(`the ${shown.length} that drifted furthest are drawn, ${moved.length - shown.length} are not`);
  const drawn: { name: string; content: string }[] = [];
  for (const { name, text } of shown) {
    const [old, fresh] = [clipOf(before, name, host), clipOf(now, name, host)];
    if (!old || !fresh) continue;
    if (hostChange(old.clip, fresh.clip)) {
      notes.push(`${name} is not drawn: it is recorded for another host`);
      continue;
    }
    const [was, is] = [await before.shapes(old.clip), await now.shapes(fresh.clip)];
    const [oldShape, newShape] = [was ?? is, is ?? was];
    if (!oldShape || !newShape) {
      notes.push(`${name} is not drawn: no file of clips has its shape`);
      continue;
    }
    const sides = { before: sideOf(old, oldShape), now: sideOf(fresh, newShape) };
    drawn.push({
      name,
      content: driftSheet({ name, text, ...sides, beforeName: before.name, nowName: now.name }),
    });
  }
  const names = fileNames(
    drawn.map(({ name }) => name),
    "take",
  );
  return { sheets: drawn.map(({ content }, i) => ({ name: `${names[i]}.svg`, content })), notes };
}

interface RecordedClip {
  clip: ClipRecord;
  prop: PropRecord;
}

function clipOf({ record }: DriftSource, name: string, host?: Host): RecordedClip | undefined {
  const clip = record.clips.find((clip) => clip.name === name);
  if (!clip || !Object.hasOwn(record.props, clip.prop)) return undefined;
  return { clip: worldClip(clip, host), prop: record.props[clip.prop] };
}

/** In the order that they came in. */
function furthest(drifts: readonly Drift[]): Drift[] {
  const sorted = [...drifts].sort((a, b) => (b.displacement ?? 0) - (a.displacement ?? 0));
  const chosen = new Set(sorted.slice(0, MOST_SHEETS));
  return drifts.filter((drift) => chosen.has(drift));
}

function sideOf({ clip, prop }: RecordedClip, { prop: shape, toModel }: DriftShape): DriftSide {
  const take = motionOfRecord(clip, prop);
  const { axes } = prop.principal;
  const motion = motionOf(take, axes);
  return {
    prop: { ...shape, reach: prop.reach, axes: multiply(conjugate(toModel), axes) },
    take: {
      name: clip.name,
      take,
      turns: clip.turns,
      motion: { ...motion, rotation: (t) => multiply(motion.rotation(t), toModel) },
    },
  };
}
