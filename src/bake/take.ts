/** One take: the first of its candidates that has a flight, flown and cut into keys. */

import { type AimedLaunch, type LaunchWish, solveLaunch } from "../aim/launch.js";
import { defaultTolerance } from "../clip/default-tolerance.js";
import { linearTrack } from "../clip/linear.js";
import type { Track } from "../clip/track.js";
import { candidateOrder } from "../draw/candidate-order.js";
import { drawThrow } from "../draw/draw-throw.js";
import type { DrawnThrow } from "../draw/drawn-throw.js";
import { type Flight, fly } from "../flight/flight.js";
import { RequestError } from "../math/request-error.js";
import type { Prop } from "../prop/prop.js";
import type { ThrowEntry, ThrowFile } from "../throwfile/types.js";
import { hostFrame } from "./host.js";
import { cutInParentFrame } from "./parent-frame.js";
import { launchWish, mayWobble } from "./wish.js";

export interface Take {
  number: number;
  /** Which of the take's candidates it is. */
  candidate: number;
  drawn: DrawnThrow;
  wish: LaunchWish;
  aimed: AimedLaunch;
  flight: Flight;
}

/**
 * Solves a take; nothing of any other take is needed.
 *
 * @throws RequestError, path from the throw inwards, where no candidate has a flight: the first one's reason
 */
export function solveTake(file: ThrowFile, entry: ThrowEntry, prop: Prop, number: number): Take {
  const wobblesByDefault = mayWobble(entry, prop);
  const stream = { seed: file.seed, throwName: entry.name, take: number, wobblesByDefault };
  const host = hostFrame(file.host).toWorld;
  let first: RequestError | undefined;
  let tried = 0;
  for (const candidate of candidateOrder(entry, stream)) {
    const drawn = drawThrow(entry, { ...stream, candidate });
    try {
      const wish = launchWish(drawn, prop, file.gravity, host);
      const aimed = solveLaunch(wish, prop.principal);
      return { number, candidate, drawn, wish, aimed, flight: fly(aimed.launch) };
    } catch (error) {
      if (!(error instanceof RequestError)) throw error;
      first ??= error;
      tried++;
    }
  }
  const reason = first as RequestError;
  if (tried === 1) throw reason;
  throw new RequestError(
    reason.path,
    `take ${number}: none of ${tried} draws has a flight; the first: ${reason.fault}`,
    reason.remedy,
  );
}

/**
 * The take's keys within the throw file's tolerance, in the frame of the parents of the node they move.
 *
 * @throws RequestError where the tolerance cannot be held; its path starts at the top of the file
 */
export function cutTake(file: ThrowFile, prop: Prop, take: Take): Track {
  const body = { centerOfMass: prop.centerOfMass, axes: prop.principal.axes, reach: prop.reach };
  const tolerance = toleranceOf(file, prop);
  return prop.node
    ? cutInParentFrame(take.flight, body, tolerance, prop.node, prop.scale, linearTrack)
    : linearTrack(take.flight, body, tolerance);
}

export const toleranceOf = (file: ThrowFile, prop: Prop): number =>
  file.bake.tolerance ?? defaultTolerance(prop.reach);
