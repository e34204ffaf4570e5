/** One take: the first of its candidates that has a flight, flown and cut into keys. */

import { type AimedArrival, type ArrivalWish, arrivalArc, solveArrival } from "../aim/arrival.js";
import { solveLanding } from "../aim/landing.js";
import { type AimedLaunch, type LaunchWish, solveLaunch } from "../aim/launch.js";
import type { Body } from "../clip/body.js";
import { defaultTolerance } from "../clip/default-tolerance.js";
import { joinedTrack } from "../clip/join.js";
import type { Track } from "../clip/track.js";
import { candidateOrder } from "../draw/candidate-order.js";
import { drawThrow } from "../draw/draw-throw.js";
import type { DrawnThrow } from "../draw/drawn-throw.js";
import type { FlyingBody } from "../flight/clearance.js";
import { type Flight, fly } from "../flight/flight.js";
import { RequestError } from "../math/request-error.js";
import type { Prop } from "../prop/prop.js";
import { propSupport, type Support } from "../prop/support.js";
import type { ThrowEntry, ThrowFile } from "../throwfile/types.js";
import { type Conversion, hostFrame } from "./host.js";
import { landingOn } from "./land.js";
import { brokenByArc, brokenLimits, UnheldLimits } from "./limits.js";
import { modelRotation } from "./motion.js";
import { cutInParentFrame } from "./parent-frame.js";
import { type Start, startingAs } from "./start.js";
import { gapAtArrival, touchDown } from "./touch-down.js";
import { flyInPlace, turnsAlone } from "./turn-only.js";
import { arrivalWish, launchWish, mayWobble, turningAxis } from "./wish.js";

/** A take solved: what was drawn, what was aimed for, and the flight that does it. World: glTF's, m, s, rad. */
export interface Take {
  number: number;
  /** Which of the take's candidates it is. */
  candidate: number;
  drawn: DrawnThrow;
  wish: LaunchWish | ArrivalWish;
  aimed: AimedLaunch | AimedArrival;
  flight: Flight;
  /** Where a floor ends the flight: how far above it the prop then is, m. */
  gap?: number;
  /** Nothing is known of its flight but how it turns: the centre of mass rests. */
  turnsAlone?: boolean;
}

/** After so many candidates without a flight, all for one and the same reason, nobody waits for the rest: some take long to fail. */
const ENOUGH_ALIKE = 128;

/**
 * Solves a take; nothing of any other take is needed.
 *
 * @throws RequestError, path from the throw inwards, where no candidate has a flight (or the first 128 all fail for one reason): the first one's reason; UnheldLimits where some have,
 *   but none that holds the throw's limits
 */
export function solveTake(file: ThrowFile, entry: ThrowEntry, prop: Prop, number: number): Take {
  const wobblesByDefault = mayWobble(entry, prop);
  const stream = { seed: file.seed, throwName: entry.name, take: number, wobblesByDefault };
  const host = hostFrame(file.host).toWorld;
  const broken = new Map<string, number>();
  let first: RequestError | undefined;
  let alike = true;
  let flightless = 0;
  let tried = 0;
  for (const candidate of candidateOrder(entry, stream)) {
    tried++;
    const drawn = drawThrow(entry, { ...stream, candidate });
    try {
      const faults = arcFaults(file, drawn, prop, host);
      if (faults.length === 0) {
        const flown = flyDrawn(file, drawn, prop, host);
        faults.push(...limitFaults(file, drawn, prop, flown, host));
        if (faults.length === 0) return { number, candidate, drawn, ...flown };
      }
      for (const key of faults) broken.set(key, (broken.get(key) ?? 0) + 1);
    } catch (error) {
      if (!(error instanceof RequestError)) throw error;
      first ??= error;
      alike &&= error.fault === first.fault;
      flightless++;
      if (alike && flightless === tried && tried === ENOUGH_ALIKE) break;
    }
  }
  if (broken.size > 0) throw new UnheldLimits(number, tried, flightless, broken);
  const reason = first as RequestError;
  // what every draw runs into, no draw is to blame for
  if (alike) throw reason;
  throw new RequestError(
    reason.path,
    `take ${number}: none of ${tried} draws has a flight; the first: ${reason.fault}`,
    reason.remedy,
  );
}

/** A take thrown again, with what it has drawn, from another place and pose; with it the limits that it breaks. */
export function retake(
  file: ThrowFile,
  prop: Prop,
  take: Take,
  start: Start,
): { take: Take; broken: readonly string[] } {
  const host = hostFrame(file.host).toWorld;
  const flown = flyDrawn(file, take.drawn, prop, host, start);
  return { take: { ...take, ...flown }, broken: limitFaults(file, take.drawn, prop, flown, host) };
}

type Flown = Pick<Take, "wish" | "aimed" | "flight" | "gap" | "turnsAlone">;

/** The flight of a drawn throw: the arc, and then its end by a touch where it is open. */
function flyDrawn(file: ThrowFile, drawn: DrawnThrow, prop: Prop, host: Conversion, start?: Start): Flown {
  const { facing, floor } = drawn.arrive;
  if (turnsAlone(file, drawn)) {
    const wish =
      facing === undefined
        ? launchWish(drawn, prop, file.gravity, host)
        : arrivalWish(drawn, facing, prop, file.gravity, host);
    return { ...flyInPlace(startingAs(wish, start), prop), turnsAlone: true };
  }
  if (facing !== undefined) {
    const { shape } = file.props.get(drawn.prop) ?? {};
    const wish = startingAs(arrivalWish(drawn, facing, prop, file.gravity, host, shape), start);
    if (floor === undefined) {
      const aimed = solveArrival(wish, prop.principal);
      return { wish, aimed, flight: fly(aimed.launch) };
    }
    const body = bodyOf(file, drawn.prop, prop);
    const landing = { ...wish, landing: landingOn(body, host.length(floor)) };
    const aimed = solveLanding(landing, prop.principal);
    const flight = fly(aimed.launch);
    return { wish: landing, aimed, flight, gap: gapAtArrival({ ...body, flight }, host.length(floor)) };
  }
  const wish = startingAs(launchWish(drawn, prop, file.gravity, host), start);
  const open = solveLaunch(wish, prop.principal);
  if (floor === undefined) return { wish, aimed: open, flight: fly(open.launch) };
  const body = bodyOf(file, drawn.prop, prop);
  const aimed = touchDown(open, wish, body, floor, host);
  const flight = fly(aimed.launch);
  return { wish, aimed, flight, gap: gapAtArrival({ ...body, flight }, host.length(floor)) };
}

/** Limits that are broken whatever spin would be solved: a candidate that breaks one is not worth solving. */
function arcFaults(file: ThrowFile, drawn: DrawnThrow, prop: Prop, host: Conversion): string[] {
  const { facing, floor } = drawn.arrive;
  if (!drawn.limits || facing === undefined || floor !== undefined) return [];
  const known = arrivalArc(arrivalWish(drawn, facing, prop, file.gravity, host), prop.principal);
  return known ? brokenByArc(drawn.limits, known.from, known.arc, host) : [];
}

function limitFaults(
  file: ThrowFile,
  drawn: DrawnThrow,
  prop: Prop,
  { wish, aimed, flight }: Flown,
  host: Conversion,
): string[] {
  if (!drawn.limits) return [];
  const axis = () =>
    turningAxis(drawn, prop, modelRotation(flight, prop, 0), {
      ahead: wish.ahead,
      travel: aimed.arc.velocity,
    });
  return brokenLimits(drawn.limits, { ...bodyOf(file, drawn.prop, prop), flight }, axis, host);
}

/** A mesh's points are put in order once. */
const supports = new WeakMap<Prop, Support>();

function bodyOf(file: ThrowFile, name: string, prop: Prop): Omit<FlyingBody, "flight"> {
  const support = supports.get(prop) ?? propSupport(prop, file.props.get(name)?.shape);
  supports.set(prop, support);
  return { support, axes: prop.principal.axes, reach: prop.reach };
}

/**
 * The take's keys within the throw file's tolerance, in the frame of the parents of the node they move.
 *
 * @throws RequestError where the tolerance cannot be held; its path starts at the top of the file
 */
export const cutTake = (file: ThrowFile, prop: Prop, take: Take): Track => cutParts(file, prop, [take]);

/** The keys of several takes one after the other; as above. */
export function cutParts(file: ThrowFile, prop: Prop, takes: readonly Take[], isLoop = false): Track {
  const body = { centerOfMass: prop.centerOfMass, axes: prop.principal.axes, reach: prop.reach };
  const tolerance = toleranceOf(file, prop);
  const { keys, layout, pack } = file.bake;
  if (prop.node && layout !== "one-node")
    throw new RequestError(
      ["bake", "layout"],
      `"${prop.name}" is a node of its model and moved itself, not by ${layout === "two-node" ? "two nodes" : "one"} over it (found ${layout})`,
      `one-node, or no props.${prop.name}.node`,
    );
  const cut = (flights: readonly Flight[], seen: Body, within: number) => {
    const parts = takes.map(({ drawn }, i) => ({ flight: flights[i], ...drawn.hold }));
    return joinedTrack(parts, seen, within, { keys, layout, pack, frameRate: file.frameRate }, isLoop);
  };
  const flights = takes.map(({ flight }) => flight);
  return prop.node
    ? cutInParentFrame(flights, body, tolerance, prop.node, prop.scale, cut)
    : cut(flights, body, tolerance);
}

export const toleranceOf = (file: ThrowFile, prop: Prop): number =>
  file.bake.tolerance ?? defaultTolerance(prop.reach);
