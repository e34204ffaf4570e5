import type { Drawing } from "./drawing.js";
import type { DriftPair, DriftPose } from "./drift-layers.js";
import { driftOutline } from "./drift-panel.js";
import { degreesBetween, UNSEEN_DEGREES } from "./drift-words.js";
import { fixed } from "./figures.js";
import { textAt } from "./svg.js";
import { sideView } from "./view.js";

/** Of a pose in place, and of the text below it, px. */
const CELL = { most: 104, text: 30 };

/** What there is to say of a turning that is as it was, px. */
const LINE = 28;

/** The same poses about their centres of mass, side by side. */
export function driftRow({ name, before, now, ahead }: DriftPair, isNamed: boolean, width: number): Drawing {
  const count = Math.max(before?.poses.length ?? 0, now?.poses.length ?? 0);
  const cell = width / count;
  const room = Math.min(cell - 6, CELL.most);
  const scale = room / (2 * Math.max(before?.prop.reach ?? 0, now?.prop.reach ?? 0));
  const view = sideView(ahead);
  const isTurned = before?.poses.some((pose, i) => isOther(pose, now?.poses[i]));
  const top = 30;
  const whose = isNamed && name ? `${name}: the` : "The";
  if (before && now && !isTurned && before.prop.reach === now.prop.reach)
    return {
      width,
      height: LINE,
      body: textAt(0, 14, `${whose} poses are turned as they were`, { class: "heading" }),
    };
  const cells = Array.from({ length: count }, (_, i) => {
    const place = [cell * (i + 0.5), top + room / 2] as const;
    const [old, fresh] = [before?.poses[i], now?.poses[i]];
    const turned = old && fresh ? `${fixed(degreesBetween(old, fresh), 1)}°` : "";
    return [
      ...(now && fresh ? [driftOutline(now.prop, fresh, view, scale, place, "now")] : []),
      ...(before && old ? [driftOutline(before.prop, old, view, scale, place, "before")] : []),
      textAt(place[0], top + room + 14, String(i + 1), { class: "number", "text-anchor": "middle" }),
      textAt(place[0], top + room + 27, turned, { class: "small", "text-anchor": "middle" }),
    ].join("\n");
  });
  const which = !now ? " (gone)" : before ? ", and by how much they are turned from each other" : " (new)";
  const title = `${whose} same poses in place, turning only${which}`;
  return {
    width,
    height: top + room + CELL.text + 12,
    body: [textAt(0, 14, title, { class: "heading" }), ...cells].join("\n"),
  };
}

const isOther = (pose: DriftPose, other: DriftPose | undefined): boolean =>
  other !== undefined && degreesBetween(pose, other) >= UNSEEN_DEGREES;
