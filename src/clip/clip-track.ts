import type { Flight } from "../flight/flight.js";
import { RequestError } from "../math/request-error.js";
import { ZERO } from "../math/vec3.js";
import type { Body } from "./body.js";
import { type Cut, cutMotion } from "./cut.js";
import { framesTrack } from "./frames.js";
import { greatestCoordinate, leastTolerance } from "./least-tolerance.js";
import { sampleFlight } from "./sampled-flight.js";
import { smallestTrack } from "./smallest.js";
import { floatStore, int16Store } from "./store-rotation.js";
import { fromOrigin } from "./time-grid.js";
import type { Track } from "./track.js";

/** What keys a clip has. */
export interface ClipStyle {
  /**
   * `linear` (default): straight and slerp between keys. `cubic`: glTF's cubic spline with fitted tangents. `smallest`: of both, channel
   * by channel, what takes fewer bytes, its error then made as small as that many keys let it. `frames`: true poses on every
   * frame and at the end; the tolerance is not looked at, the error is what it is.
   */
  keys?: "linear" | "cubic" | "smallest" | "frames";
  /**
   * `one-node` (default): both channels move one node over the model. `two-node`: the translation is that of the centre of mass, on an outer
   * node; the rotation turns an inner one about it. `turn-only`: that rotation alone; the translation has no keys.
   */
  layout?: "one-node" | "two-node" | "turn-only";
  /** Of linear rotation keys: `float` (default) or normalised `int16`. */
  pack?: "float" | "int16";
  /** Frames per second, for `frames`; default 30. */
  frameRate?: number;
}

/** m: what is thrown further than this is more likely thrown in another unit. */
const ANOTHER_UNIT = 500;

/** m a point may be moved by int16 keys, for each m from the origin, and as much again for the search's room. */
const INT16_TURN = 2.5e-4;

/**
 * Few keys that move a prop: played as glTF 2.0 Appendix C says, no point of the prop is further than `toleranceMetres` from
 * the true motion at any time, both channels together, with the keys as rounded in the file. The model's origin, which a single
 * node moves, need not be its centre of mass.
 *
 * The first key holds the flight's own start, the last, at the duration rounded to float32, its own end. The error includes
 * what that time's rounding does; a player's own float32 arithmetic may add 2⁻²³ of the greatest coordinate.
 *
 * Throws a RequestError for a tolerance that cannot be held (`leastTolerance`) or int16 with cubic keys, a RangeError for a flight
 * that lasts no time.
 */
export function clipTrack(flight: Flight, body: Body, toleranceMetres: number, style: ClipStyle = {}): Track {
  const { keys = "linear", layout = "one-node", pack = "float", frameRate = 30 } = style;
  if (pack === "int16" && keys === "cubic")
    throw new RequestError(
      ["bake", "pack"],
      "int16 does not go with cubic keys: their tangents would not fit",
      "float, or other keys",
    );
  const store = pack === "int16" ? int16Store : floatStore;
  const moved = layout === "turn-only" ? standing(flight) : flight;
  const about = layout === "one-node" ? body : { ...body, centerOfMass: ZERO };
  const withTranslation = layout !== "turn-only";
  if (keys === "frames") return framesTrack(moved, about, frameRate, store, withTranslation);

  const least = leastTolerance(moved, about) + (pack === "int16" ? INT16_TURN * fromOrigin(about) : 0);
  if (!(toleranceMetres >= least)) throw tooFine(moved, about, toleranceMetres, least);
  const motion = sampleFlight(moved, about, toleranceMetres);
  const limit = toleranceMetres - motion.surcharge;
  const cut = (curve: "linear" | "cubic"): Cut => ({
    rotation: curve,
    translation: withTranslation ? curve : "none",
    store,
  });
  const track =
    keys === "smallest"
      ? smallestTrack(motion, limit, store, withTranslation)
      : cutMotion(motion, limit, cut(keys));
  if (!track) throw tooFine(moved, about, toleranceMetres, 2 * toleranceMetres);
  return track;
}

/** The same turning about a centre of mass that rests at the origin. */
const standing = (flight: Flight): Flight => ({
  ...flight,
  launch: { ...flight.launch, centerOfMass: ZERO, velocity: ZERO, gravity: ZERO },
  centerOfMass: () => ZERO,
  velocity: () => ZERO,
});

function tooFine(flight: Flight, body: Body, tolerance: number, least: number): RequestError {
  const far = Number(greatestCoordinate(flight, body).toPrecision(2));
  // Two digits, rounded up.
  const needed = Number((1.06 * least).toPrecision(2));
  if (far >= ANOTHER_UNIT)
    return new RequestError(
      ["bake", "tolerance"],
      `the flight goes up to ${far} m from the world's origin, where the keys' numbers cannot hold a tolerance of ${tolerance} m`,
      `likeliest the places are meant in another unit: write metres (1.2 for 1200 mm), or name the unit with host.unit; else needs at least ${needed} m`,
    );
  return new RequestError(
    ["bake", "tolerance"],
    `a tolerance of ${tolerance} m is finer than the keys' numbers can hold over ${flight.duration} s and up to ${far} m from the world's origin`,
    `needs at least ${needed} m`,
  );
}
