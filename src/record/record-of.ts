/** The record of a bake. */

import type { Bake } from "../bake/bake.js";
import type { BakedTake } from "../bake/bake-take.js";
import { hostFrame } from "../bake/host.js";
import type { LoadedProp } from "../bake/props.js";
import { axisShares, turnsAboutMomentum } from "../flight/turns.js";
import { textSha256 } from "../math/hash.js";
import type { Prop } from "../prop/prop.js";
import type { ThrowEntry, ThrowFile } from "../throwfile/types.js";
import { chainRecord } from "./chain-record.js";
import type { ClipRecord, PropRecord, TakesRecord } from "./clip-record.js";
import { missAngle, missedBy, trackRecord } from "./take-record.js";
import { VERSION } from "./version.js";

/** @param text of the throw file, for its hash */
export async function recordOf(file: ThrowFile, text: string, bake: Bake): Promise<TakesRecord> {
  return {
    ...(await recordHead(file, text, bake.props)),
    clips: [
      ...bake.throws.flatMap((baked) => {
        const { prop } = bake.props.get(baked.entry.prop) as LoadedProp;
        return baked.takes.map((take) => ({
          ...clipRecord(file, prop, baked.entry, take),
          nearest: take.nearest,
        }));
      }),
      ...bake.chains.flatMap((chain) => {
        const { prop } = bake.props.get(chain.prop) as LoadedProp;
        return chain.takes.map((take) => ({
          ...chainRecord(file, prop, chain.entry, take),
          nearest: take.nearest,
        }));
      }),
    ],
  };
}

/** What stands before the clips. */
export async function recordHead(
  file: ThrowFile,
  text: string,
  props: ReadonlyMap<string, LoadedProp>,
): Promise<Omit<TakesRecord, "clips">> {
  return {
    format: 1,
    tossbake: VERSION,
    throwFile: { name: file.name.replace(/^.*[\\/]/, ""), sha256: await textSha256(text) },
    props: Object.fromEntries(Array.from(props, ([name, loaded]) => [name, propRecord(loaded)])),
  };
}

export function propRecord({ prop, source, sha256 }: LoadedProp): PropRecord {
  const { mass, volume, centerOfMass, inertia, principal, reach, warnings } = prop;
  return {
    source,
    sha256,
    mass,
    volume,
    centerOfMass,
    inertia,
    principal,
    reach,
    warnings: [...warnings],
  };
}

/** All but its nearest, which takes the others. */
export function clipRecord(
  file: ThrowFile,
  prop: Prop,
  entry: ThrowEntry,
  baked: Omit<BakedTake, "nearest">,
): Omit<ClipRecord, "nearest"> {
  const { take, track, release, arrival } = baked;
  const { flight, aimed } = take;
  const { before, after } = take.drawn.hold;
  return {
    name: baked.name,
    throw: entry.name,
    take: take.number,
    prop: entry.prop,
    file: baked.file,
    duration: before + flight.duration + after,
    turns: turnsAboutMomentum(flight),
    share: axisShares(flight),
    apex: take.turnsAlone
      ? null
      : {
          time: before + aimed.arc.apex.time,
          rise: hostFrame(file.host).fromWorld.length(aimed.arc.apex.rise),
        },
    release,
    arrival,
    miss: { position: missedBy(take, prop), angle: missAngle(take) },
    ...trackRecord(file, prop, track),
    candidate: take.candidate,
    draws: take.drawn.draws,
    flight: { start: before, time: flight.duration },
  };
}
