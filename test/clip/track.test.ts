import { expect, it } from "vitest";
import { linearTrack } from "../../src/clip/linear.js";
import { trackBytes } from "../../src/clip/track.js";
import { thrown } from "./flights.js";

it("a translation key takes 16 bytes, a rotation key 20", () => {
  // float32 numbers: a time and three, a time and four (glTF 2.0, §3.11).
  const track = linearTrack(
    thrown({ spin: [1, 5, 2] }),
    { centerOfMass: [0, 0, 0], axes: [0, 0, 0, 1], reach: 0.2 },
    0.002,
  );
  expect(trackBytes(track)).toBe(16 * track.translation.times.length + 20 * track.rotation.times.length);
});
