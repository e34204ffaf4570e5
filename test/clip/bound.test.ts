import { describe, expect, it } from "vitest";
import { cubicRotationKeys } from "../../src/clip/cubic-rotation.js";
import { linearRotationKeys } from "../../src/clip/linear-rotation.js";
import type { RotationKeys } from "../../src/clip/rotation-keys.js";
import { sampleOn } from "../../src/clip/sampled-flight.js";
import { bendSurcharge, type SampledMotion } from "../../src/clip/sampled-motion.js";
import { floatStore } from "../../src/clip/store-rotation.js";
import { trueBend } from "../../src/clip/time-grid.js";
import type { Flight } from "../../src/flight/flight.js";
import { plannedFlights } from "./flights.js";

const body = { centerOfMass: [0, 0, 0], axes: [0, 0, 0, 1], reach: 0.15 } as const;

/** So few samples that what happens between them counts; `share` of the bound's constants, M of |f″| ≤ M, is believed. */
function coarsely(flight: Flight, share: number): SampledMotion {
  const last = 8 * Math.ceil(flight.duration * 4 * flight.greatestRate);
  const step = Math.fround(flight.duration) / last;
  const interval = 8 * step * Math.sqrt(share);
  return sampleOn(flight, body, {
    last,
    stride: 8,
    time: (index) => index * step,
    interval,
    surcharge: bendSurcharge(trueBend(flight, body), interval),
  });
}

/** How far the played rotation takes the furthest point from where the true one has it, at most, m: 2·reach·sin(θ/2). */
function greatestDisplacement(flight: Flight, motion: SampledMotion, keys: RotationKeys): number {
  const played = new Float64Array(4);
  let greatest = 0;
  for (let i = 0; i + 1 < keys.indices.length; i++) {
    const at = keys.played(i);
    const [from, to] = [motion.time(keys.indices[i]), motion.time(keys.indices[i + 1])];
    for (let n = 0; n <= 400; n++) {
      const t = Math.min(from + ((to - from) * n) / 400, flight.duration);
      at(t, played);
      const along = flight.orientation(t).reduce((sum, q, k) => sum + q * played[k], 0);
      greatest = Math.max(greatest, 2 * body.reach * Math.sqrt(Math.max(0, 1 - along * along)));
    }
  }
  return greatest;
}

/** By flight: the greatest displacement as a share of the limit, 0 where nothing is cut since the bound says that it cannot be held. */
const reached = (
  cut: (motion: SampledMotion, limit: number) => RotationKeys | undefined,
  limit: number,
  share: number,
) =>
  plannedFlights().map((flight) => {
    const motion = coarsely(flight, share);
    const keys = cut(motion, limit - motion.surcharge);
    return keys === undefined ? 0 : greatestDisplacement(flight, motion, keys) / limit;
  });

// f is no further from its chord than M·h²/8, M a bound of |f″| (Davis, Interpolation and Approximation, 1963, §3.1)
describe.each([
  ["cubic", cubicRotationKeys],
  ["linear", (motion: SampledMotion, limit: number) => linearRotationKeys(motion, limit, floatStore, true)],
] as const)("the bound between the samples of %s rotation keys", (_, cut) => {
  it("holds with the constant it has, on flights looked at so seldom that it counts", () => {
    const shares = [...reached(cut, 0.005, 1), ...reached(cut, 0.0005, 1)];
    expect(shares.filter((share) => share > 0).length).toBeGreaterThan(5);
    expect(Math.max(...shares)).toBeLessThanOrEqual(1);
  });

  it("fails with none: what happens between the samples is no rounding", () => {
    expect(Math.max(...reached(cut, 0.0005, 0))).toBeGreaterThan(1);
  });
});
