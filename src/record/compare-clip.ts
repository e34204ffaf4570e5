/** What drifted in one take, in words of the motion. */

import { type Conversion, hostFrame } from "../bake/host.js";
import { atan2, sin } from "../math/elementary.js";
import { angleBetween, type Quat } from "../math/quat.js";
import { cross, distance, dot, length, subtract, type Vec3, ZERO } from "../math/vec3.js";
import type { Host } from "../throwfile/types.js";
import type { ClipRecord } from "./clip-record.js";
import { airtime, gravity, hostChange } from "./compare-host.js";
import { type Change, changes } from "./compare-values.js";
import {
  amount,
  degrees,
  displaced,
  faster,
  joined,
  lastDigits,
  later,
  levelDirection,
  longer,
  metres,
  moreTurns,
  spinsFaster,
} from "./compare-words.js";

/** Of the motion; what else there is follows from these, mostly, and is in `changes`. */
const MOST_PHRASES = 4;

export interface ClipDrift {
  /** "arrives 14 mm further, turns 0.2 more" */
  text: string;
  changes: Change[];
  /** m: no point of the prop is further than this from where it was, at release or at arrival. */
  displacement: number;
}

/** One of the two, in metres and glTF's axes. */
interface Side {
  clip: ClipRecord;
  release: State;
  arrival: State;
  rise: number;
  /** m/s² */
  gravity: number;
}

interface State {
  centerOfMass: Vec3;
  velocity: Vec3;
  angularVelocity: Vec3;
}

/**
 * Undefined where nothing drifted. `nearest` is no motion of the take's own: it tells which other takes were made in the same run, and is
 * passed over.
 *
 * @param host whose numbers both records hold
 * @param reach of the prop, m
 */
export function compareClips(
  before: ClipRecord,
  now: ClipRecord,
  reach: number,
  host?: Host,
): ClipDrift | undefined {
  const found = changes(before, now, ["nearest"]);
  if (found.length === 0) return undefined;
  const { toWorld } = hostFrame(host);
  const old = side(before, toWorld);
  const fresh = side(now, toWorld);
  const motion = [...arrives(old, fresh), ...turns(old, fresh), ...leaves(old, fresh), ...starts(old, fresh)];
  const otherHost = hostChange(before, now);
  const words = [...(otherHost ? [otherHost] : motion.slice(0, MOST_PHRASES)), ...isMade(before, now)];
  const displacement = (moment: "release" | "arrival") =>
    found.some(({ key }) => key.startsWith(moment))
      ? distance(old[moment].centerOfMass, fresh[moment].centerOfMass) +
        2 * reach * sin(angleBetween(before[moment].rotation, now[moment].rotation) / 2)
      : 0;
  const draws = found.some(({ key }) => key === "candidate" || key.startsWith("draws."));
  return {
    text: `${words.length > 0 ? words.join(", ") : lastDigits(found.map(({ key }) => key))}${draws ? "; drawn anew" : ""}`,
    changes: found,
    displacement: Math.max(displacement("release"), displacement("arrival")),
  };
}

function side(clip: ClipRecord, host: Conversion): Side {
  const state = ({ centerOfMass, velocity, angularVelocity }: ClipRecord["release"]): State => ({
    centerOfMass: host.vector(centerOfMass),
    velocity: velocity ? host.vector(velocity) : ZERO,
    angularVelocity: host.angular(angularVelocity),
  });
  const release = state(clip.release);
  const arrival = state(clip.arrival);
  return {
    clip,
    release,
    arrival,
    rise: host.length(clip.apex?.rise ?? 0),
    gravity: host.length(length(gravity(clip))),
  };
}

const arrives = (old: Side, now: Side): string[] =>
  said("arrives", [
    ...displaced(subtract(now.arrival.centerOfMass, old.arrival.centerOfMass), course(old)),
    ...later(airtime(now.clip) - airtime(old.clip)),
    ...faster(length(now.arrival.velocity) - length(old.arrival.velocity)),
    ...turned(old.clip.arrival.rotation, now.clip.arrival.rotation),
  ]);

const turns = (old: Side, now: Side): string[] => said("turns", moreTurns(now.clip.turns - old.clip.turns));

function leaves({ release: old }: Side, { release: now }: Side): string[] {
  const rate = spinsFaster(length(now.angularVelocity) - length(old.angularVelocity));
  const axis = degrees(angle(old.angularVelocity, now.angularVelocity), "off");
  return [
    ...said("leaves", [
      ...faster(length(now.velocity) - length(old.velocity)),
      ...degrees(elevation(now.velocity) - elevation(old.velocity), "steeper", "flatter"),
      ...degrees(toTheLeft(old.velocity, now.velocity), "to the left", "to the right"),
    ]),
    ...said("spins", rate.length > 0 ? rate : axis.map((text) => `about an axis ${text}`)),
  ];
}

const starts = (old: Side, now: Side): string[] => [
  ...said("starts", [
    ...displaced(subtract(now.release.centerOfMass, old.release.centerOfMass), course(old)),
    ...turned(old.clip.release.rotation, now.clip.release.rotation),
  ]),
  ...(Math.abs(now.gravity - old.gravity) < 1e-3
    ? []
    : [`falls at ${amount(now.gravity)} m/s² instead of ${amount(old.gravity)}`]),
  ...said("rises", longer(now.rise - old.rise, "higher", "less high")),
];

const turned = (from: Quat, to: Quat): string[] =>
  degrees(angleBetween(from, to), "differently").map((text) => `turned ${text}`);

/** How it is cut and written, and what is amiss with it. */
function isMade(before: ClipRecord, now: ClipRecord): string[] {
  const keys = now.keys.translation + now.keys.rotation - before.keys.translation - before.keys.rotation;
  const [old, fresh] = [metres(before.tolerance), metres(now.tolerance)];
  const number = `${Math.abs(keys)} ${Math.abs(keys) === 1 ? "key" : "keys"}`;
  return [
    ...misses(before, now),
    ...(old === fresh ? [] : [`is cut to ${fresh} instead of ${old}`]),
    ...(keys === 0 ? [] : [`is cut into ${number} ${keys > 0 ? "more" : "fewer"}`]),
    ...(now.prop === before.prop ? [] : [`throws ${now.prop} instead of ${before.prop}`]),
    ...(now.file === before.file ? [] : [`is in ${now.file} instead of ${before.file}`]),
  ];
}

function misses(before: ClipRecord, now: ClipRecord): string[] {
  const [old, fresh] = [before, now].map(({ miss }) =>
    joined([...longer(miss.position ?? 0, "", ""), ...degrees(miss.angle ?? 0, "")]),
  );
  if (old === fresh) return [];
  return [fresh ? `misses its mark by ${fresh}` : "no longer misses its mark"];
}

const said = (verb: string, parts: readonly string[]): string[] =>
  parts.length > 0 ? [`${verb} ${joined(parts)}`] : [];

const course = ({ release, arrival }: Side): Vec3 | undefined =>
  levelDirection(subtract(arrival.centerOfMass, release.centerOfMass), release.velocity);

const levelSpeed = (v: Vec3): number => length([v[0], 0, v[2]]);

/** Of a direction above level, rad. */
const elevation = (v: Vec3): number => atan2(v[1], levelSpeed(v));

/** From one heading to another about +Y, rad; 0 where one of them is upright. */
function toTheLeft(from: Vec3, to: Vec3): number {
  if (!levelDirection(from) || !levelDirection(to)) return 0;
  return atan2(from[2] * to[0] - from[0] * to[2], from[0] * to[0] + from[2] * to[2]);
}

const angle = (a: Vec3, b: Vec3): number => atan2(length(cross(a, b)), dot(a, b));
