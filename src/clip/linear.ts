import type { Flight } from "../flight/flight.js";
import { cbrt } from "../math/elementary.js";
import { RequestError } from "../math/request-error.js";
import type { Body } from "./body.js";
import { greatestCoordinate, leastTolerance } from "./least-tolerance.js";
import { rotationKeys } from "./linear-rotation.js";
import { translationKeys } from "./linear-translation.js";
import { nodePath } from "./node-path.js";
import { type SampledFlight, sampleFlight } from "./sampled-flight.js";
import { type Track, trackBytes } from "./track.js";

export type { Body } from "./body.js";

/**
 * Part of the tolerance that the rotation may use alone. On twelve flights at three tolerances, with the origin at up to the
 * reach from the centre of mass, 0.55 took 0.3 to 1.5 % more bytes than the best of twelve shares.
 */
const SHARE = 0.55;
/** Another share is tried where theory sets the best one further off than this: nearer by, it saved nothing. */
const SHARE_SLACK = 0.2;
/** A part stays for the rounding of the translation. */
const GREATEST_SHARE = 0.95;

/**
 * Few linear keys that move one node over the prop: played as glTF 2.0 Appendix C says, no point of the prop is further than
 * `toleranceMetres` from the true motion at any time, both channels together, with the keys rounded to float32. The
 * model's origin, which the node moves, need not be its centre of mass.
 *
 * Longest segments one after another; the rotation first, with a share of the tolerance, then the translation with what
 * the rotation leaves at each time. The last keys, at the duration rounded to float32, hold the pose at the flight's own
 * end. The error includes what that time's rounding does; a player's own float32 arithmetic may add 2⁻²³ of the greatest
 * coordinate.
 *
 * Throws a RequestError for a tolerance that cannot be held (`leastTolerance`), a RangeError for a flight that lasts no time.
 */
export function linearTrack(flight: Flight, body: Body, toleranceMetres: number): Track {
  const least = leastTolerance(flight, body);
  if (!(toleranceMetres >= least)) throw tooFine(flight, body, toleranceMetres, least);
  const sampled = sampleFlight(flight, body, toleranceMetres);
  const limit = toleranceMetres - sampled.surcharge;
  const first = cut(sampled, limit, SHARE);
  if (!first) throw tooFine(flight, body, toleranceMetres, 2 * toleranceMetres);
  const share = bestShare(first);
  const second = Math.abs(share - SHARE) > SHARE_SLACK ? cut(sampled, limit, share) : undefined;
  return second && trackBytes(second) < trackBytes(first) ? second : first;
}

/** The track whose rotation uses `share` of `limit` m; undefined where float32 does not let it. */
function cut(sampled: SampledFlight, limit: number, share: number): Track | undefined {
  const rotation = rotationKeys(sampled, share * limit);
  const translation = rotation && translationKeys(sampled, nodePath(sampled, rotation), limit);
  if (!translation) return undefined;
  const times = (indices: number[]) => Float32Array.from(indices, sampled.time);
  return {
    duration: sampled.time(sampled.last),
    translation: { times: times(translation.indices), values: translation.values },
    rotation: { times: times(rotation.indices), values: rotation.values },
    error: translation.error + sampled.surcharge,
    interpolation: "LINEAR",
  };
}

/**
 * The share with the fewest bytes if the numbers of segments go with the inverse root of what each channel may use, as
 * chords' do: the minimum of a/√x + b/√(1 − x) lies where x/(1 − x) = (a/b)^⅔.
 */
function bestShare(track: Track): number {
  const rotation = 20 * (track.rotation.times.length - 1) * Math.sqrt(SHARE);
  const translation = 16 * (track.translation.times.length - 1) * Math.sqrt(1 - SHARE);
  const root = cbrt(rotation / translation);
  return Math.min(GREATEST_SHARE, (root * root) / (1 + root * root));
}

function tooFine(flight: Flight, body: Body, tolerance: number, least: number): RequestError {
  const far = greatestCoordinate(flight, body).toPrecision(2);
  // Two digits, rounded up.
  const needed = Number((1.06 * least).toPrecision(2));
  return new RequestError(
    ["bake", "tolerance"],
    `a tolerance of ${tolerance} m is finer than float32 keys can hold over ${flight.duration} s and up to ${Number(far)} m from the world's origin`,
    `needs at least ${needed} m`,
  );
}
