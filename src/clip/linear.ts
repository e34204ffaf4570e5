import type { Flight } from "../flight/flight.js";
import type { Body } from "./body.js";
import { clipTrack } from "./clip-track.js";
import type { Track } from "./track.js";

export type { Body } from "./body.js";

/** Few linear keys that move one node over the prop: `clipTrack` in its plainest style. */
export const linearTrack = (flight: Flight, body: Body, toleranceMetres: number): Track =>
  clipTrack(flight, body, toleranceMetres);
