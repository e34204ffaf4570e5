/** What drifted between two bakes: their records, and the files that lie in a folder. */

import { rounded } from "../math/rounded.js";
import type { Host } from "../throwfile/types.js";
import type { ClipRecord, TakesRecord } from "./clip-record.js";
import { compareClips } from "./compare-clip.js";
import { fileDrift } from "./compare-files.js";
import { compareProps } from "./compare-prop.js";
import { lineThatDiffers } from "./compare-text.js";
import type { Change } from "./compare-values.js";

/** One thing that is not as it was. */
export interface Drift {
  kind: "throwFile" | "prop" | "throw" | "take" | "file" | "record";
  /** Of the throw file, prop, throw, clip or file. */
  name: string;
  what: "changed" | "added" | "removed" | "missing" | "stray" | "edited";
  /** A sentence for people, with the name. */
  text: string;
  throw?: string;
  takes?: number[];
  /** m: the greatest way a point of the prop is from where it was, at release or at arrival. */
  displacement?: number;
  changes?: Change[];
}

/** A folder's record and what the folder holds. */
export interface BakedFolder {
  record: TakesRecord;
  /** Of takes.json; absent for a bake in memory. */
  text?: string;
}

export interface FolderFile {
  name: string;
  /** As the other bake's to the byte, not so; or amiss in its own folder: named and not there, or there and not named. */
  state: "same" | "different" | "missing" | "stray";
  /** Of a sheet, the throws and chains that it shows. */
  shows?: readonly string[];
}

/**
 * Compares what is in a folder (`before`) with what a bake makes, or with another folder (`now`). Values are equal where their twelve
 * digits are; another version of tossbake is no drift, nor is `nearest`, which depends on what was made in the same run.
 *
 * @param files that both have, and those that are missing or stray
 * @param host whose axes and unit the records are in
 */
export function compareBakes(
  before: BakedFolder,
  now: BakedFolder,
  files: readonly FolderFile[],
  host?: Host,
): Drift[] {
  const states = new Map(files.map(({ name, state }) => [name, state]));
  // what is not rounded yet is about to be compared with what was rounded to be written
  const [old, fresh] = [rounded(before.record), rounded(now.record)];
  const props = propDrifts(old, fresh);
  const throws = throwDrifts(old, fresh, states, host);
  const drifts = [
    ...props,
    ...throws,
    ...files.flatMap((file) => fileDrift(file, old, fresh, [...props, ...throws])),
  ];
  const recordDrifts = props.length + throws.length > 0 ? [] : textDrift(before, now);
  return [...throwFileDrift(old, fresh, drifts.length > 0), ...drifts, ...recordDrifts];
}

function throwFileDrift(before: TakesRecord, now: TakesRecord, isMore: boolean): Drift[] {
  const { name } = now.throwFile;
  const row = (text: string): Drift[] => [{ kind: "throwFile", name, what: "changed", text }];
  if (before.throwFile.sha256 !== now.throwFile.sha256)
    return row(
      `${name} changed${isMore ? "" : ", but no motion: every take is as recorded; bake again to record that"}`,
    );
  return before.throwFile.name === name ? [] : row(`${name} was called ${before.throwFile.name}`);
}

function propDrifts(before: TakesRecord, now: TakesRecord): Drift[] {
  return union(Object.keys(now.props), Object.keys(before.props)).flatMap((name): Drift[] => {
    const [old, fresh] = [own(before.props, name), own(now.props, name)];
    if (!old) return [{ kind: "prop", name, what: "added", text: `${name} is a new prop` }];
    if (!fresh) return [{ kind: "prop", name, what: "removed", text: `${name} is no longer thrown` }];
    const drift = compareProps(old, fresh);
    return drift
      ? [{ kind: "prop", name, what: "changed", text: `${name} ${drift.text}`, changes: drift.changes }]
      : [];
  });
}

function throwDrifts(
  before: TakesRecord,
  now: TakesRecord,
  states: ReadonlyMap<string, FolderFile["state"]>,
  host?: Host,
): Drift[] {
  const [old, fresh] = [byThrow(before), byThrow(now)];
  return union([...fresh.keys()], [...old.keys()]).flatMap((name): Drift[] => {
    const [olds, news] = [old.get(name) ?? [], fresh.get(name) ?? []];
    return [
      ...cameAndWent(name, olds, news, states),
      ...news.flatMap((clip) => {
        const earlier = olds.find((other) => other.name === clip.name);
        return earlier ? takeDrift(earlier, clip, before, now, states, host) : [];
      }),
    ];
  });
}

/** Takes that only one of the bakes has. */
function cameAndWent(
  name: string,
  olds: readonly ClipRecord[],
  news: readonly ClipRecord[],
  states: ReadonlyMap<string, FolderFile["state"]>,
): Drift[] {
  const row = (clips: readonly ClipRecord[], others: readonly ClipRecord[], what: "added" | "removed") => {
    const lone = clips.filter((clip) => !others.some((other) => other.name === clip.name));
    if (lone.length === 0) return [];
    const takes = lone.map((clip) => clip.take);
    const file = lone[0].file;
    const isWhole = others.length === 0;
    const which = isWhole ? `throw ${name} (${count(takes.length)})` : `${name}: ${numbered(takes)}`;
    const verb = isWhole || takes.length === 1 ? "is" : "are";
    const drift: Drift = {
      kind: "throw",
      name,
      what,
      takes,
      text: `${which} ${verb} ${what === "added" ? "new" : "gone"}`,
    };
    // with the same bytes in both bakes it can only be the record that changed
    return states.get(file) === "same"
      ? [
          {
            ...drift,
            kind: "record" as const,
            what: "edited" as const,
            text: `takes.json was edited by hand: ${which} ${verb} ${what === "added" ? "not in it" : "in it"}, but ${file} is the same`,
          },
        ]
      : [drift];
  };
  return [...row(news, olds, "added"), ...row(olds, news, "removed")];
}

function takeDrift(
  old: ClipRecord,
  clip: ClipRecord,
  before: TakesRecord,
  now: TakesRecord,
  states: ReadonlyMap<string, FolderFile["state"]>,
  host?: Host,
): Drift[] {
  const [oldProp, prop] = [own(before.props, old.prop), own(now.props, clip.prop)];
  const drift = compareClips(old, clip, prop?.reach ?? 0, host);
  if (!drift) return [];
  const { changes, displacement } = drift;
  const row = { name: clip.name, throw: clip.throw, takes: [clip.take], displacement, changes };
  const isSameProp = JSON.stringify(oldProp) === JSON.stringify(prop);
  // a tolerance may change without a key; all else in a clip's record comes of what its file holds
  if (states.get(clip.file) === "same" && isSameProp && changes.some(({ key }) => key !== "tolerance"))
    return [
      {
        kind: "record",
        what: "edited",
        ...row,
        text: `takes.json was edited by hand: ${clip.name} has ${values(changes)}, but ${clip.file} is the same`,
      },
    ];
  const cause = oldProp && prop && oldProp.sha256 !== prop.sha256 ? `; ${prop.source} changed` : "";
  return [{ kind: "take", what: "changed", ...row, text: `${clip.name} ${drift.text}${cause}` }];
}

function values(changes: readonly Change[]): string {
  const shown = changes
    .slice(0, 2)
    .map((change) => `${change.key} ${written(change, "before")} instead of ${written(change, "now")}`);
  return `${shown.join(", ")}${changes.length > 2 ? ` and ${changes.length - 2} values more` : ""}`;
}

const written = (change: Change, side: "before" | "now") =>
  side in change ? JSON.stringify(change[side]) : "nothing";

function textDrift(before: BakedFolder, now: BakedFolder): Drift[] {
  const line = lineThatDiffers(before, now.record) ?? lineThatDiffers(now, before.record);
  if (line === undefined) return [];
  return [
    {
      kind: "record",
      name: "takes.json",
      what: "edited",
      text: `takes.json was edited by hand: no value differs, but line ${line} is not as a bake writes it`,
    },
  ];
}

function byThrow({ clips }: TakesRecord): Map<string, ClipRecord[]> {
  const throws = new Map<string, ClipRecord[]>();
  for (const clip of clips) {
    const list = throws.get(clip.throw);
    if (list) list.push(clip);
    else throws.set(clip.throw, [clip]);
  }
  return throws;
}

const own = <T>(record: Record<string, T>, name: string): T | undefined =>
  Object.hasOwn(record, name) ? record[name] : undefined;

const union = (a: readonly string[], b: readonly string[]): string[] => [...new Set([...a, ...b])];

const count = (takes: number) => `${takes} ${takes === 1 ? "take" : "takes"}`;

const numbered = (takes: readonly number[]) =>
  takes.length === 1
    ? `take ${takes[0]}`
    : takes.length <= 5
      ? `takes ${takes.join(", ")}`
      : `${takes.length} takes`;
