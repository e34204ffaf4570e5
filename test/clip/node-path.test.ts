import { expect, it } from "vitest";
import { linearRotationKeys } from "../../src/clip/linear-rotation.js";
import { nodePath } from "../../src/clip/node-path.js";
import { playTrack } from "../../src/clip/play-track.js";
import { sampleFlight } from "../../src/clip/sampled-flight.js";
import { floatStore } from "../../src/clip/store-rotation.js";
import { angleBetween, conjugate, multiply, rotate } from "../../src/math/quat.js";
import { add, distance, type Vec3 } from "../../src/math/vec3.js";
import { plannedFlights } from "./flights.js";

it("a node on its path carries the centre of mass along the true one, whatever the rotation keys do", () => {
  const body = { centerOfMass: [0.05, -0.1, 0.03], axes: [0, 0, 0, 1], reach: 0.15 } as const;
  const flight = plannedFlights()[4];
  const sampled = sampleFlight(flight, body, 0.004);
  const keys = linearRotationKeys(sampled, 0.002, floatStore, true)!;
  const most = Math.max(...keys.surcharges);
  const path = nodePath(sampled, keys);
  const rotation = {
    interpolation: "LINEAR",
    times: Float32Array.from(keys.indices, sampled.time),
    values: keys.values,
  } as const;
  const track = {
    duration: 1,
    translation: { interpolation: "LINEAR", times: Float32Array.of(0), values: new Float32Array(3) },
    rotation,
    error: 0,
  } as const;
  let moved = 0;
  for (let k = 0; k < path.count; k++) {
    const t = path.times[k];
    const [x, y, z, displacement] = path.wanted.subarray(4 * k, 4 * k + 4);
    const played = playTrack(track, t).rotation;
    const center = add([x, y, z] as Vec3, rotate(played, body.centerOfMass));
    // Rounding of doubles; the played rotation is worked out another way.
    expect(distance(center, flight.centerOfMass(t))).toBeLessThan(1e-13);
    // 2·r·sin(θ/2): the chord of a point on a circle.
    const angle = angleBetween(played, multiply(flight.orientation(t), conjugate(body.axes)));
    const seen = 2 * body.reach * Math.sin(angle / 2);
    expect(displacement).toBeGreaterThan(seen - 1e-13);
    expect(displacement - seen).toBeLessThanOrEqual(most + 1e-13);
    moved = Math.max(moved, displacement);
  }
  expect(moved).toBeLessThanOrEqual(0.002);
  expect(moved).toBeGreaterThan(0.0019);
});
