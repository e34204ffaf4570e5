/** One plain sentence that tells a stranger what a sheet shows. */

import { rotate } from "../math/quat.js";
import { add, length, subtract, type Vec3 } from "../math/vec3.js";
import type { Stretch } from "./course.js";
import { capital, metres, seconds, turnsText, withArticle } from "./figures.js";
import type { Turning } from "./picked-axis.js";
import type { SheetProp, SheetTake } from "./sheet-input.js";
import { turningPhrase } from "./turning-words.js";

export interface ToldStretch {
  stretch: Stretch;
  turning: Turning;
  /** Level unit vector. */
  ahead: Vec3;
}

/** "A spanner flies 3.00 m, from a height of 1.20 m over 1.73 m to 1.25 m, in 0.67 s, and spins flat, …" */
export function throwSentence(prop: SheetProp, take: SheetTake, told: readonly ToldStretch[]): string {
  const [only] = told;
  const who = capital(withArticle(prop.name));
  if (told.length > 1) return chainSentence(who, take, told);
  const { stretch } = only;
  const turning = turningPhrase(only.turning, stretch.turns, only.ahead, stretch.part?.launch.velocity);
  const still = standing(take, stretch);
  if (!stretch.travels)
    return `${who} ${turning}, in ${seconds(stretch.to - stretch.from)}: the turning alone, about its centre of mass${still}.`;
  return `${who} ${courseWords(take, stretch)}, and ${turning}${still}.`;
}

/** "flies 3.00 m, from a height of 1.20 m over 1.73 m to 1.25 m, in 0.67 s" */
export function courseWords({ motion }: SheetTake, { from, to, part }: Stretch): string {
  const place = (t: number, offset: Vec3): Vec3 =>
    add(motion.centerOfMass(t), rotate(motion.rotation(t), offset));
  const start = place(from, part?.release.offset ?? [0, 0, 0]);
  const end = place(to, part?.arrival.offset ?? [0, 0, 0]);
  const [x, , z] = subtract(end, start);
  const apex = part?.apex;
  const top = apex != null && apex > from && apex < to ? motion.centerOfMass(apex)[1] : undefined;
  const isHigher = top !== undefined && top > Math.max(start[1], end[1]) + 0.005;
  const over = isHigher ? `over a top at ${metres(top)} ` : "";
  return `flies ${metres(length([x, 0, z]))}, from a height of ${metres(start[1])} ${over}to ${metres(end[1])}, in ${seconds(to - from)}`;
}

function standing({ motion }: SheetTake, { from, to }: Stretch): string {
  const [before, after] = [from, motion.duration - to];
  const parts = [
    ...(before > 1e-9 ? [`${seconds(before)} before`] : []),
    ...(after > 1e-9 ? [`${seconds(after)} after`] : []),
  ];
  return parts.length > 0 ? `; it stands still for ${parts.join(" and ")}` : "";
}

function chainSentence(who: string, { motion }: SheetTake, told: readonly ToldStretch[]): string {
  const turns = told.reduce((sum, { stretch }) => sum + stretch.turns, 0);
  const gap = length(subtract(motion.centerOfMass(motion.duration), motion.centerOfMass(0)));
  const end = gap < 1e-3 ? "and ends where it began" : `and ends ${metres(gap)} from where it began`;
  return `${who} is thrown ${told.length} times in one clip of ${seconds(motion.duration)}, ${turnsText(turns)} in all, ${end}.`;
}
