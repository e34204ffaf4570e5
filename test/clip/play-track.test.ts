import { QuaternionKeyframeTrack, VectorKeyframeTrack } from "three";
import { describe, expect, it } from "vitest";
import { linearTrack } from "../../src/clip/linear.js";
import { playTrack } from "../../src/clip/play-track.js";
import type { Channel, Track } from "../../src/clip/track.js";
import { plannedFlights } from "./flights.js";

const body = { centerOfMass: [0.1, 0, 0.05], axes: [0, 0, 0, 1], reach: 0.15 } as const;

function dotOfKeysAround({ times, values }: Channel, t: number): number {
  const next = Math.max(
    1,
    times.findIndex((time) => time >= t),
  );
  return [0, 1, 2, 3].reduce((sum, k) => sum + values[4 * next - 4 + k] * values[4 * next + k], 0);
}

describe("a track is played", () => {
  it("as three plays it", () => {
    for (const flight of plannedFlights().slice(0, 6)) {
      const track = linearTrack(flight, body, 0.005);
      const { translation, rotation } = track;
      const place = new VectorKeyframeTrack(
        "a.position",
        translation.times,
        translation.values,
      ).InterpolantFactoryMethodLinear(new Float64Array(3));
      const turn = new QuaternionKeyframeTrack(
        "a.quaternion",
        rotation.times,
        rotation.values,
      ).InterpolantFactoryMethodLinear(new Float64Array(4));
      for (let i = 0; i <= 400; i++) {
        const t = (track.duration * i) / 400;
        const pose = playTrack(track, t);
        const p = place.evaluate(t);
        const q = turn.evaluate(t);
        for (let k = 0; k < 3; k++) expect(Math.abs(pose.translation[k] - p[k])).toBeLessThan(1e-12);
        // 1e-7: three does not bring stored quaternions to unit length. Where their dot product is above 0.9995 it goes straight
        // from one to the other and then to unit length, at most 5.1e-7 off slerp at that angle (both formulas, compared).
        const most = dotOfKeysAround(rotation, t) < 0.9995 ? 1e-7 : 6e-7;
        for (let k = 0; k < 4; k++) expect(Math.abs(pose.rotation[k] - q[k])).toBeLessThan(most);
      }
    }
  });

  const half = Math.SQRT1_2;
  const quarterTurn = (sign: number): Track => ({
    duration: 2,
    translation: {
      interpolation: "LINEAR",
      times: Float32Array.of(0, 2),
      values: Float32Array.of(0, 1, 2, 4, 1, 0),
    },
    rotation: {
      interpolation: "LINEAR",
      times: Float32Array.of(0, 2),
      values: Float32Array.of(0, 0, 0, 1, 0, sign * half, 0, sign * half),
    },
    error: 0,
  });

  it("straight between two translations, at an even rate between two rotations", () => {
    // glTF 2.0, Appendix C: a quarter of the time is a quarter of the way and of the 90° about y.
    const pose = playTrack(quarterTurn(1), 0.5);
    expect(pose.translation).toEqual([1, 1, 1.5]);
    expect(pose.rotation[1]).toBeCloseTo(Math.sin(Math.PI / 16), 7);
    expect(pose.rotation[3]).toBeCloseTo(Math.cos(Math.PI / 16), 7);
  });

  it("the short way where the signs differ", () => {
    // glTF 2.0, Appendix C: s = d/|d| turns the second quaternion round.
    const [same, turned] = [1, -1].map((sign) => playTrack(quarterTurn(sign), 0.5).rotation);
    expect(turned).toEqual(same);
  });

  it("standing still before the first and after the last key", () => {
    expect(playTrack(quarterTurn(1), -1).translation).toEqual([0, 1, 2]);
    expect(playTrack(quarterTurn(1), 9).translation).toEqual([4, 1, 0]);
  });
});
