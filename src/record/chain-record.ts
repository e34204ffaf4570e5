/** The record of a chain's take. */

import type { BakedChainTake } from "../bake/bake-chain.js";
import type { ChainTake } from "../bake/chain.js";
import { hostFrame } from "../bake/host.js";
import { axisShares, turnsAboutMomentum } from "../flight/turns.js";
import type { Prop } from "../prop/prop.js";
import type { ChainEntry, ThrowFile } from "../throwfile/types.js";
import type { ClipRecord } from "./clip-record.js";
import { missAngle, missedBy, trackRecord } from "./take-record.js";

/** What a start taken from the throw before leaves of a throw's draws. */
const REPLACED = /^release\.(at|facing|scatter)(\.|$)/;

/** All but its nearest, which takes the others. */
export function chainRecord(
  file: ThrowFile,
  prop: Prop,
  entry: ChainEntry,
  baked: Omit<BakedChainTake, "nearest">,
): Omit<ClipRecord, "nearest"> {
  const { parts, track } = baked;
  const flights = parts.map(({ take }) => take.flight);
  return {
    name: baked.name,
    throw: entry.name,
    take: baked.number,
    prop: prop.name,
    file: baked.file,
    duration: baked.duration,
    turns: flights.reduce((sum, flight) => sum + turnsAboutMomentum(flight), 0),
    share: axisShares(...flights),
    apex: highest(file, baked),
    release: parts[0].release,
    arrival: parts[parts.length - 1].arrival,
    miss: {
      position: greatest(parts.map(({ take }) => missedBy(take, prop))),
      angle: greatest(parts.map(({ take }) => missAngle(take))),
    },
    ...trackRecord(file, prop, track),
    draws: drawsOf(baked),
    parts: parts.map(({ throw: name, take, start, release, arrival }) => ({
      throw: name,
      start,
      time: take.flight.duration,
      turns: turnsAboutMomentum(take.flight),
      release,
      arrival,
    })),
  };
}

/** Of all parts, above the first one's release. */
function highest(file: ThrowFile, { parts }: ChainTake): ClipRecord["apex"] {
  const [first] = parts;
  if (parts.every(({ take }) => take.turnsAlone)) return null;
  const tops = parts.map(({ take, start }) => ({
    time: start + take.aimed.arc.apex.time,
    rise: take.flight.centerOfMass(0)[1] - first.take.flight.centerOfMass(0)[1] + take.aimed.arc.apex.rise,
  }));
  const top = tops.reduce((best, other) => (other.rise > best.rise ? other : best));
  return { ...top, rise: hostFrame(file.host).fromWorld.length(top.rise) };
}

/** Keys with the throw's name before them. */
const drawsOf = ({ parts }: ChainTake): ClipRecord["draws"] =>
  Object.fromEntries(
    parts.flatMap(({ throw: name, take }, i) =>
      Object.entries(take.drawn.draws)
        .filter(([key]) => i === 0 || !REPLACED.test(key))
        .map(([key, value]) => [`${name}.${key}`, value]),
    ),
  );

function greatest(misses: readonly (number | null)[]): number | null {
  const asked = misses.filter((miss) => miss !== null);
  return asked.length > 0 ? Math.max(...asked) : null;
}
