import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type ClipStyle, clipTrack } from "../../src/clip/clip-track.js";
import { defaultTolerance } from "../../src/clip/default-tolerance.js";
import type { Body } from "../../src/clip/linear.js";
import { playTrack } from "../../src/clip/play-track.js";
import { type Channel, type Track, trackBytes } from "../../src/clip/track.js";
import type { Flight } from "../../src/flight/flight.js";
import { angleBetween, conjugate, dotQuat, multiply, normalize, type Quat } from "../../src/math/quat.js";
import { RequestError } from "../../src/math/request-error.js";
import { distance, ZERO } from "../../src/math/vec3.js";
import { anyThrow } from "./any-throw.js";
import { worstOf } from "./displacement.js";
import { plannedFlights, thrown } from "./flights.js";

const centered: Body = { centerOfMass: [0, 0, 0], axes: [0, 0, 0, 1], reach: 0.15 };
const offCenter: Body = { ...centered, centerOfMass: [0, 0.1, 0] };

const STYLES: ClipStyle[] = [
  { keys: "cubic" },
  { keys: "smallest" },
  { keys: "linear", pack: "int16" },
  { keys: "smallest", pack: "int16" },
  { keys: "linear", layout: "two-node" },
  { keys: "cubic", layout: "two-node" },
  { keys: "smallest", layout: "two-node", pack: "int16" },
  { keys: "linear", layout: "turn-only" },
  { keys: "cubic", layout: "turn-only" },
];

/** What the track of a style has to follow: with a node of its own the centre of mass is the origin. */
function asPlayed(style: ClipStyle, flight: Flight, body: Body): { flight: Flight; body: Body } {
  if (!style.layout || style.layout === "one-node") return { flight, body };
  const about = { ...body, centerOfMass: ZERO };
  return style.layout === "two-node"
    ? { flight, body: about }
    : { flight: { ...flight, centerOfMass: () => ZERO }, body: about };
}

describe.each(STYLES.map((style) => [Object.values(style).join(", "), style] as const))("%s", (_, style) => {
  it("holds its proved error, which is within the tolerance, whatever is thrown; keys are as players need them", () => {
    fc.assert(
      fc.property(anyThrow, ({ body, flight, tolerance }) => {
        const needed = leastFor(flight, body, tolerance, style);
        const track = clipTrack(flight, body, needed, style);
        expect(track.error).toBeLessThanOrEqual(needed);
        const played = asPlayed(style, flight, body);
        // 1e-12: rounding of this scan.
        expect(worstOf(track, played.flight, played.body, 400)).toBeLessThanOrEqual(track.error + 1e-12);
        checkKeys(track, style);
      }),
      { seed: 11, numRuns: 50 },
    );
  });

  it("begins and ends in the true poses, as nearly as its numbers go", () => {
    const flight = thrown({ spin: [1, 6, 9], duration: 0.7 });
    const track = clipTrack(flight, offCenter, 0.001, style);
    // float32: 1.3e-7 (IEEE 754); int16: half a step of 1/32767 in each of four components, and as much for the length.
    const rounding = style.pack === "int16" ? 8 / 32767 : 1.3e-7;
    for (const [t, true_] of [
      [0, 0],
      [track.duration, flight.duration],
    ])
      expect(
        angleBetween(
          playTrack(track, t).rotation,
          multiply(flight.orientation(true_), conjugate(offCenter.axes)),
        ),
      ).toBeLessThan(rounding);
  });

  it("is the same whichever way the flight's quaternions are signed", () => {
    const flight = thrown({ spin: [1, 6, 9] });
    const jumping: Flight = {
      ...flight,
      orientationInto(t, out, offset = 0) {
        flight.orientationInto(t, out, offset);
        if (out[offset + 3] < 0) for (let i = offset; i < offset + 4; i++) out[i] = -out[i];
      },
    };
    expect(clipTrack(jumping, offCenter, 0.001, style)).toEqual(clipTrack(flight, offCenter, 0.001, style));
  });
});

describe("cubic keys", () => {
  it("take as few on the twelve flights as planning found, 109, at 1 mm and at 5 mm", () => {
    // Planning: 109 at both, where steps under 180° set the number.
    for (const tolerance of [0.001, 0.005]) {
      const keys = plannedFlights().map(
        (flight) => clipTrack(flight, centered, tolerance, { keys: "cubic" }).rotation.times.length,
      );
      expect(keys.reduce((a, b) => a + b, 0)).toBeLessThanOrEqual(109);
    }
  });

  it("take two for a translation that is a parabola, exact to float32", () => {
    const flight = thrown({ spin: [1, 6, 9], velocity: [3, 5, 0] });
    const track = clipTrack(flight, offCenter, 0.001, { keys: "cubic", layout: "two-node" });
    expect(track.translation.times).toHaveLength(2);
    for (let i = 0; i <= 50; i++) {
      const t = (track.duration * i) / 50;
      // A float32 step below 4 m (IEEE 754), for each of value and tangent.
      expect(
        distance(playTrack(track, t).translation, flight.centerOfMass(Math.min(t, flight.duration))),
      ).toBeLessThan(5e-7);
    }
  });

  it("are proved between the samples: no key could stand half a turn from the next", () => {
    const flight = thrown({ spin: [0, 0, 10], gravity: [0, 0, 0], duration: 3 });
    const track = clipTrack(flight, centered, 0.05, { keys: "cubic" });
    expect(track.rotation.times.length).toBeGreaterThanOrEqual(Math.ceil(30 / Math.PI) + 1);
  });

  it("do not go with int16", () => {
    expect(() => clipTrack(thrown({}), centered, 0.001, { keys: "cubic", pack: "int16" })).toThrow(
      RequestError,
    );
  });
});

describe("smallest", () => {
  it("takes no more bytes than linear or cubic keys, and shares the error where a segment has room", () => {
    for (const flight of plannedFlights())
      for (const body of [centered, offCenter]) {
        const bytes = (keys: ClipStyle["keys"]) => trackBytes(clipTrack(flight, body, 0.003, { keys }));
        const smallest = clipTrack(flight, body, 0.003, { keys: "smallest" });
        expect(trackBytes(smallest)).toBeLessThanOrEqual(Math.min(bytes("linear"), bytes("cubic")));
      }
    // The parabola of half a second sags by 0.306 m, g·T²/8; chords of it by less than they may, since their number is whole.
    const clean = thrown({ spin: [0, 0, 10], duration: 0.5 });
    expect(clipTrack(clean, centered, 0.02, { keys: "smallest" }).error).toBeLessThan(0.8 * 0.02);
  });
});

describe("frames", () => {
  it("put a key on every frame: 24 frames make 24 intervals", () => {
    const track = clipTrack(thrown({ duration: 24 / 30, spin: [1, 6, 9] }), offCenter, 0.001, {
      keys: "frames",
      frameRate: 30,
    });
    for (const { times } of [track.translation, track.rotation]) {
      expect(times).toHaveLength(25);
      times.forEach((t, i) => {
        expect(t).toBe(Math.fround(i / 30));
      });
    }
  });

  it("put the last key at the end of a flight that is no whole number of frames", () => {
    const track = clipTrack(thrown({ duration: 0.71 }), offCenter, 0.001, { keys: "frames", frameRate: 30 });
    expect(Array.from(track.rotation.times.slice(-2))).toEqual([Math.fround(21 / 30), Math.fround(0.71)]);
  });

  it("state the error they have, whatever is thrown, be it half turns between frames", () => {
    fc.assert(
      fc.property(anyThrow, fc.constantFrom(4, 30, 60), ({ body, flight }, frameRate) => {
        const track = clipTrack(flight, body, 0.001, { keys: "frames", frameRate });
        const worst = worstOf(track, flight, body, 500);
        expect(worst).toBeLessThanOrEqual(track.error + 1e-12);
        for (let i = 1; i < track.rotation.times.length; i++)
          expect(dotQuat(keyRotation(track.rotation, i), keyRotation(track.rotation, i - 1))).toBeGreaterThan(
            -1e-6,
          );
      }),
      { seed: 5, numRuns: 80 },
    );
  });
});

/** The tolerance, or the one that is asked for instead where it cannot be held. */
function leastFor(flight: Flight, body: Body, tolerance: number, style: ClipStyle): number {
  try {
    clipTrack(flight, body, tolerance, style);
    return tolerance;
  } catch (error) {
    if (!(error instanceof RequestError)) throw error;
    return Number(/at least (\S+) m/.exec(error.remedy)?.[1]);
  }
}

function checkKeys(track: Track, style: ClipStyle): void {
  expect(track.duration).toBe(track.rotation.times.at(-1));
  const channels = style.layout === "turn-only" ? [track.rotation] : [track.translation, track.rotation];
  if (style.layout === "turn-only") expect(track.translation.times).toHaveLength(0);
  for (const { times } of channels) {
    expect(times[0]).toBe(0);
    expect(times.at(-1)).toBe(track.duration);
    for (let i = 1; i < times.length; i++) expect(times[i]).toBeGreaterThan(times[i - 1]);
  }
  const { rotation } = track;
  const cubic = rotation.interpolation === "CUBICSPLINE";
  expect(rotation.values instanceof Int16Array).toBe(style.pack === "int16" && !cubic);
  for (let i = 0; i < rotation.times.length; i++) {
    const q = keyRotation(rotation, i);
    const size = Math.hypot(...q) / (rotation.values instanceof Int16Array ? 32767 : 1);
    expect(Math.abs(size - 1)).toBeLessThan(rotation.values instanceof Int16Array ? 2.1e-5 : 1e-6);
    // Under 90°, or 180° for cubic: cosines of the half angles.
    if (i > 0)
      expect(dotQuat(normalize(q), normalize(keyRotation(rotation, i - 1)))).toBeGreaterThan(
        cubic ? 0 : Math.SQRT1_2,
      );
  }
}

function keyRotation({ values, interpolation }: Channel, key: number): Quat {
  const at = interpolation === "CUBICSPLINE" ? 12 * key + 4 : 4 * key;
  return [values[at], values[at + 1], values[at + 2], values[at + 3]];
}

it("a prop's default tolerance can be held by 16-bit keys too", () => {
  const flight = thrown({ spin: [1, 6, 9] });
  for (const reach of [0.05, 0.5, 2]) {
    const body = { ...centered, reach };
    expect(() => clipTrack(flight, body, defaultTolerance(reach), { pack: "int16" })).not.toThrow();
  }
});
