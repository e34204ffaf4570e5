import { fly } from "../flight/flight.js";
import { turnsAboutMomentum } from "../flight/turns.js";
import { conjugate, multiply } from "../math/quat.js";
import { distance, length, scale } from "../math/vec3.js";
import type { AimedArrival, ArrivalWish } from "./arrival.js";
import type { AimedBody } from "./launch.js";
import { nearness } from "./ranking.js";
import type { Way, WayWish } from "./way.js";
import { allWays } from "./ways.js";

/** How many are answered, and how many turns more and fewer than wished they may have. */
const MOST = 12;
const AROUND = 2;
/** Spins nearer to each other than this share are one. */
const SAME = 1e-6;

/** Ways other than the one found, those nearest the wish first. */
export function otherWays(wish: ArrivalWish, body: AimedBody, { turn, launch, arc }: AimedArrival): Way[] {
  const pose = multiply(turn.start, conjugate(body.axes));
  const asked = wish.turning(pose, turn.duration, { ahead: wish.ahead, travel: arc.velocity });
  const turns = Math.abs(asked.turns ?? turnsAboutMomentum(fly(launch)));
  const most = turns + AROUND;
  const sign = (asked.turns ?? 0) < 0 ? -1 : 1;
  const ordered: WayWish = {
    turns,
    axis: asked.axis && scale(asked.axis, sign / length(asked.axis)),
  };
  return allWays({ ...turn, leastTurns: Math.max(0, turns - AROUND), mostTurns: most, mostTurning: most })
    .filter(({ spin }) => distance(spin, launch.spin) > SAME * length(launch.spin))
    .map((way) => ({ way, cost: nearness(way, ordered) }))
    .sort((a, b) => a.cost - b.cost)
    .slice(0, MOST)
    .map(({ way }) => way);
}
