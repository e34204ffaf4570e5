import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { ClipStyle } from "../../src/clip/clip-track.js";
import { clipTrack } from "../../src/clip/clip-track.js";
import { type ClipPart, joinedTrack, partTimes } from "../../src/clip/join.js";
import { leastTolerance } from "../../src/clip/least-tolerance.js";
import type { Body } from "../../src/clip/linear.js";
import { playTrack } from "../../src/clip/play-track.js";
import type { Flight } from "../../src/flight/flight.js";
import { dotQuat, type Quat } from "../../src/math/quat.js";
import { subtract, type Vec3, ZERO } from "../../src/math/vec3.js";
import { anyThrow } from "./any-throw.js";
import { worstDisplacement, worstOf } from "./displacement.js";
import { thrown } from "./flights.js";

const body: Body = { centerOfMass: [0, 0.1, 0.02], axes: [0, 0, 0, 1], reach: 0.2 };

const STYLES: ClipStyle[] = [
  { keys: "linear" },
  { keys: "cubic" },
  { keys: "smallest" },
  { keys: "frames" },
  { keys: "linear", pack: "int16" },
  { keys: "smallest", pack: "int16" },
  { keys: "smallest", layout: "two-node" },
  { keys: "cubic", layout: "two-node" },
  { keys: "linear", layout: "turn-only" },
];

/** The motion of a whole clip, from its definition: still, then the flight, then still. */
function wholeOf(parts: readonly ClipPart[], withPlace: boolean): Flight {
  const times = partTimes(
    parts,
    parts.map(({ flight }) => flight.duration),
  );
  const last = parts.length - 1;
  const at = (t: number): [Flight, number] => {
    // the part that flies, or the next to come, which stands still until then
    const i = times.findIndex(({ end }) => t <= end);
    const part = i < 0 ? last : i;
    const { flight } = parts[part];
    return [flight, Math.max(0, Math.min(flight.duration, t - times[part].start))];
  };
  return {
    ...parts[0].flight,
    duration: times[last].end + parts[last].after,
    centerOfMass: (t) => {
      const [flight, s] = at(t);
      return withPlace ? flight.centerOfMass(s) : ZERO;
    },
    orientation: (t) => {
      const [flight, s] = at(t);
      return flight.orientation(s);
    },
  };
}

/** A flight that starts where and as another ends, of the same body. */
function next(flight: Flight, spin: Vec3, velocity: Vec3, duration: number): Flight {
  return thrown({
    ...flight.launch,
    centerOfMass: flight.centerOfMass(flight.duration),
    orientation: flight.orientation(flight.duration),
    spin,
    velocity,
    duration,
  });
}

const seenBody = (style: ClipStyle, seen: Body): Body =>
  (style.layout ?? "one-node") === "one-node" ? seen : { ...seen, centerOfMass: ZERO };

const hold = fc.constantFrom(0, 14 / 30, 0.2, 1 / 3, 7.7);

describe.each(STYLES.map((style) => [Object.values(style).join(", "), style] as const))("%s", (_, style) => {
  it("holds its proved error over holds and joints, whatever is thrown", () => {
    fc.assert(
      fc.property(anyThrow, hold, hold, hold, ({ body: seen, flight, tolerance }, before, between, after) => {
        const second = next(flight, [2, -5, 3], [1, 3, -2], 0.437);
        const parts = [
          { flight, before, after: between },
          { flight: second, before: 0, after },
        ];
        const about = seenBody(style, seen);
        // int16 alone moves a point by some 2e-4 of its distance
        const rough = style.pack === "int16" ? 6e-4 * (2 * seen.reach) : 0;
        const needed =
          Math.max(tolerance, 3 * leastTolerance(flight, seen), 3 * leastTolerance(second, seen), 1e-4) +
          rough;
        const track = joinedTrack(parts, seen, needed, style);
        if (style.keys !== "frames") expect(track.error).toBeLessThanOrEqual(needed);
        const whole = wholeOf(parts, style.layout !== "turn-only");
        expect(track.duration).toBe(Math.fround(whole.duration));
        // 1e-12: rounding of this scan
        expect(worstOf(track, whole, about, 400)).toBeLessThanOrEqual(track.error + 1e-12);
      }),
      { seed: 5, numRuns: 25 },
    );
  });

  it("stands still through its holds, which cost two keys a channel", () => {
    const flight = thrown({ spin: [1, 6, 9], velocity: [2, 4, 1], duration: 0.7 });
    const held = joinedTrack([{ flight, before: 14 / 30, after: 0.2 }], body, 0.002, style);
    for (const path of ["translation", "rotation"] as const) {
      const { times } = held[path];
      const none = style.layout === "turn-only" && path === "translation";
      expect(times.length === 0).toBe(none);
      if (none) continue;
      // of a flight's keys the first and last are at its ends
      expect([times[0], times[1]]).toEqual([0, Math.fround(14 / 30)]);
      expect([times.at(-2), times.at(-1)]).toEqual([Math.fround(14 / 30 + 0.7), Math.fround(14 / 30 + 0.9)]);
    }
    const pose = (t: number) => {
      const { translation, rotation } = playTrack(held, t);
      return [...translation, ...rotation];
    };
    for (let i = 0; i <= 20; i++) {
      const early = pose((Math.fround(14 / 30) * i) / 20);
      const late = pose(0.7 + 14 / 30 + 1e-6 + (0.2 * i) / 20);
      // 1e-14: interpolation between equal numbers, in double (IEEE 754)
      for (const [k, c] of pose(0).entries()) expect(Math.abs(early[k] - c)).toBeLessThan(1e-14);
      for (const [k, c] of pose(5).entries()) expect(Math.abs(late[k] - c)).toBeLessThan(1e-14);
    }
  });

  it("closes a loop with the key it began with; neighbouring quaternions are on one side", () => {
    const flight = thrown({ spin: [1, 6, 9], velocity: [0, 3, 0], gravity: [0, -9.8, 0], duration: 0.6 });
    const there = flight.launch;
    // a motion back to the start: a turn by the same flight reversed in time
    const back = next(flight, [0, 0, 0], [0, 0, 0], 0.6);
    const reversed: Flight = {
      ...flight,
      launch: { ...there, velocity: [0, 3 - 9.8 * 0.6, 0] },
      duration: back.duration,
      centerOfMass: (t) => flight.centerOfMass(0.6 - t),
      velocity: (t) => subtract(ZERO, flight.velocity(0.6 - t)),
      orientation: (t) => flight.orientation(0.6 - t),
      orientationInto: (t, out, offset) => flight.orientationInto(0.6 - t, out, offset),
    };
    const parts = [
      { flight, before: 0.1, after: 0 },
      { flight: reversed, before: 0, after: 0.3 },
    ];
    const { translation, rotation, error } = joinedTrack(parts, body, 0.002, style, true);
    if (style.keys !== "frames") expect(error).toBeLessThanOrEqual(0.002);
    const value = (channel: typeof rotation, size: number, key: number) => {
      const at = channel.interpolation === "LINEAR" ? key : 3 * key + 1;
      return Array.from(channel.values.subarray(size * at, size * at + size));
    };
    const ends = (channel: typeof rotation, size: number) => {
      const last = channel.times.length - 1;
      return [value(channel, size, 0), value(channel, size, last), value(channel, size, last - 1)];
    };
    const [first, last, held] = ends(rotation, 4);
    expect(last).toEqual(held);
    expect([first, first.map((c) => 0 - c)]).toContainEqual(last.map((c) => c + 0));
    if (translation.times.length > 0) expect(new Set(ends(translation, 3).map(String)).size).toBe(1);
    for (let key = 1; key < rotation.times.length; key++)
      expect(
        dotQuat(value(rotation, 4, key - 1) as unknown as Quat, value(rotation, 4, key) as unknown as Quat),
      ).toBeGreaterThanOrEqual(0);
  });
});

describe("a clip that stands still", () => {
  it("is refused where its times are too coarse for the tolerance: seven digits of an hour are a quarter of a millisecond", () => {
    const flight = thrown({ spin: [1, 6, 9], velocity: [2, 4, 1], duration: 0.7 });
    expect(() => joinedTrack([{ flight, before: 3600, after: 0 }], body, 0.001)).toThrow(/3600\.7 s/);
    // float32 (IEEE 754): 2⁻¹² s between neighbours over 2048 s; at some 8 m/s that is 2 mm
    expect(joinedTrack([{ flight, before: 3600, after: 0 }], body, 0.02).error).toBeGreaterThan(0.001);
  });

  it("without holds is cut as ever", () => {
    const flight = thrown({ spin: [1, 6, 9], duration: 0.7 });
    expect(joinedTrack([{ flight, before: 0, after: 0 }], body, 0.001)).toEqual(
      clipTrack(flight, body, 0.001),
    );
  });
});

describe("the rounding of moved times", () => {
  it("is in the error: a thousand seconds into a clip, float32's times alone move a fast prop further than its keys do", () => {
    const flight = thrown({ spin: [1, 6, 9], velocity: [9, 4, 1], duration: 0.5 });
    const style: ClipStyle = { keys: "frames", frameRate: 240 };
    const parts = [{ flight, before: 1000 + 1 / 7, after: 0 }];
    const track = joinedTrack(parts, body, 0.001, style);
    const whole = wholeOf(parts, true);
    let worst = 0;
    for (let i = 0; i <= 4000; i++) {
      const t = parts[0].before + (0.5 * i) / 4000;
      worst = Math.max(worst, worstDisplacement(track, whole, body, t, [0.6, 0, 0.8]));
    }
    expect(worst).toBeLessThanOrEqual(track.error);
    expect(worst).toBeGreaterThan(1.5 * clipTrack(flight, body, 0.001, style).error);
  });
});
