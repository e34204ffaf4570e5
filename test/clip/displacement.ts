import type { Body } from "../../src/clip/linear.js";
import { playTrack } from "../../src/clip/play-track.js";
import type { Track } from "../../src/clip/track.js";
import type { Flight } from "../../src/flight/flight.js";
import { conjugate, multiply, rotate, rotateBack } from "../../src/math/quat.js";
import { add, length, normalize, scale, subtract, type Vec3 } from "../../src/math/vec3.js";

/**
 * Where the played prop is furthest from the true one at time `t`: found among actual points on the ball of the reach,
 * by climbing from `start` (a direction in the model) to a point that none near it exceeds.
 */
export function worstDisplacement(track: Track, flight: Flight, body: Body, t: number, start: Vec3): number {
  const played = playTrack(track, t);
  const time = Math.min(t, flight.duration);
  const turn = multiply(flight.orientation(time), conjugate(body.axes));
  const center = flight.centerOfMass(time);
  const displacement = (p: Vec3): Vec3 =>
    subtract(
      add(played.translation, rotate(played.rotation, add(body.centerOfMass, p))),
      add(center, rotate(turn, p)),
    );
  let worst = 0;
  let direction = start;
  for (let i = 0; i < 6; i++) {
    const e = displacement(scale(direction, body.reach));
    worst = Math.max(worst, length(e));
    // The ball's point whose displacement grows most along e.
    const uphill = subtract(rotateBack(played.rotation, e), rotateBack(turn, e));
    if (length(uphill) === 0) break;
    direction = normalize(uphill);
  }
  return worst;
}

/** A fixed row of numbers spread over 0 to 1: the golden ratio's multiples. */
const spread = (n: number, salt: number): number =>
  ((n + 1) * 0.6180339887498949 + salt * 0.7548776662466927) % 1;
const someDirection = (n: number): Vec3 =>
  normalize([spread(n, 1) - 0.5, spread(n * 3, 2) - 0.5, spread(n * 7, 3) - 0.5]);

/** The same at `times` times all over the track. */
export function worstOf(track: Track, flight: Flight, body: Body, times: number): number {
  let worst = 0;
  for (let n = 0; n < times; n++) {
    const t = spread(n, 0) * track.duration;
    worst = Math.max(worst, worstDisplacement(track, flight, body, t, someDirection(n)));
  }
  return worst;
}
